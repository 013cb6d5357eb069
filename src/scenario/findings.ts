import { mistake } from '../messages/build.js';
import type { MistakeCode } from '../messages/codes.js';
import type { Message } from '../messages/message.js';
import { nearest } from '../messages/nearest.js';
import { listed } from '../messages/printable.js';
import type { SourceText, TextSpan } from './source-text.js';

/** One mistake, before it is written as a message. */
export interface Finding {
  readonly code: MistakeCode;
  /** Null for what does not stand in the text, such as an option of the command line. */
  readonly at: TextSpan | null;
  readonly what: string;
  readonly why: string;
  readonly mend: string;
  readonly evidence?: Readonly<Record<string, unknown>>;
  /** Near names are added to the remedy. */
  readonly near?: { readonly word: string; readonly among: Iterable<string> };
}

const most = 200;

/**
 * Gathers the mistakes of a phase and gives them in the order of the text.
 *
 * No more than 200 are kept: a text can be made to hold a mistake in every character, and nobody reads further.
 */
export class Findings {
  private readonly found: { offset: number; message: Message }[] = [];

  constructor(private readonly source: SourceText) {}

  /** Whether further mistakes would be dropped; loops over hostile lengths end early on it. */
  get isFull(): boolean {
    return this.found.length >= most;
  }

  get count(): number {
    return this.found.length;
  }

  add(finding: Finding): void {
    if (this.isFull) return;
    const { code, at, what, why, mend, evidence = {}, near } = finding;
    const names = near === undefined ? [] : nearest(near.word, near.among);
    const place = at === null ? null : this.source.placeOf(at);
    const message = mistake(code, {
      place,
      sourceLine: place === null ? null : this.source.shownLine(place.line),
      what,
      why,
      mend:
        names.length === 0 ? mend : `${mend} Near ${names.length === 1 ? 'name' : 'names'}: ${listed(names, 'and')}.`,
      evidence: near === undefined ? evidence : { ...evidence, near: names },
    });
    this.found.push({ offset: at?.start ?? Number.POSITIVE_INFINITY, message });
  }

  /** All mistakes in the order of the text; those without a place come last. */
  messages(): Message[] {
    const sorted = [...this.found].sort((a, b) => (a.offset === b.offset ? 0 : a.offset - b.offset));
    const messages = sorted.map(({ message }) => message);
    if (!this.isFull) return messages;
    const cut = mistake('too-many-mistakes', {
      what: `The list ends after ${most} mistakes; there may be more.`,
      why: 'A longer list is of no use before the first ones are mended.',
      mend: 'Mend the mistakes above and check again.',
      evidence: { listed: most },
    });
    return [...messages, cut];
  }
}
