import type { Setting } from './model.js';
import type { SourceText } from './source-text.js';
import type { TreeNode } from './tree.js';

/** Gathers every setting as it was used, in the order in which it is read. */
export class Settings {
  private readonly list: Setting[] = [];

  constructor(private readonly source: SourceText) {}

  /** A setting that stands in the text. */
  fromText(name: string, value: string, node: TreeNode): void {
    this.list.push({ name, value, origin: { kind: 'line', line: this.source.lineOf(node.span.start) } });
  }

  fromCommandLine(name: string, value: string): void {
    this.list.push({ name, value, origin: { kind: 'command line' } });
  }

  byDefault(name: string, value: string): void {
    this.list.push({ name, value, origin: { kind: 'default' } });
  }

  all(): readonly Setting[] {
    return [...this.list];
  }
}
