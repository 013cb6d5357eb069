import type { TextSpan } from './source-text.js';

/** The scenario as read from YAML: groups, lists and single values, each with its place in the text. */
export type TreeNode = MapNode | ListNode | ScalarNode;

/** A group of keys. */
export interface MapNode {
  readonly kind: 'map';
  readonly span: TextSpan;
  readonly entries: ReadonlyMap<string, Entry>;
}

/** A key of a group with its value. */
export interface Entry {
  readonly key: string;
  readonly keySpan: TextSpan;
  readonly value: TreeNode;
}

/** A list. */
export interface ListNode {
  readonly kind: 'list';
  readonly span: TextSpan;
  readonly items: readonly TreeNode[];
}

/** A single value: a text, a number, yes or no, or nothing. */
export interface ScalarNode {
  readonly kind: 'scalar';
  readonly span: TextSpan;
  readonly value: string | number | boolean | null;
  /** As somebody wrote it, without quotes: `0.10` stays `0.10`. */
  readonly text: string;
  /** Where `text` begins if it stands in the file character for character on one line; null otherwise. */
  readonly textStart: number | null;
}

/** The value under a key of a group; undefined if the key is absent or the node is no group. */
export function under(node: TreeNode | undefined, key: string): TreeNode | undefined {
  return entryOf(node, key)?.value;
}

/** Key and value under a key of a group. */
export function entryOf(node: TreeNode | undefined, key: string): Entry | undefined {
  return node?.kind === 'map' ? node.entries.get(key) : undefined;
}

/** The entries of a group in file order; none if the node is absent or no group. */
export function entriesOf(node: TreeNode | undefined): readonly Entry[] {
  return node?.kind === 'map' ? [...node.entries.values()] : [];
}

/** The items of a list; none if the node is absent or no list. */
export function itemsOf(node: TreeNode | undefined): readonly TreeNode[] {
  return node?.kind === 'list' ? node.items : [];
}

/** The node at a path of keys and list positions. */
export function nodeAt(root: TreeNode, path: readonly PropertyKey[]): TreeNode | undefined {
  let node: TreeNode | undefined = root;
  for (const step of path) {
    node = typeof step === 'number' ? itemsOf(node)[step] : under(node, String(step));
  }
  return node;
}

/** Plain data with the same content. Groups have no prototype, so that no key can mean anything but itself. */
export function plainData(node: TreeNode): unknown {
  if (node.kind === 'scalar') return node.value;
  if (node.kind === 'list') return node.items.map(plainData);
  const data: Record<string, unknown> = Object.create(null);
  for (const { key, value } of node.entries.values()) data[key] = plainData(value);
  return data;
}

/** What stands at a place, in words for a message. */
export function describe(node: TreeNode): string {
  if (node.kind === 'map') return 'a group of keys';
  if (node.kind === 'list') return 'a list';
  if (node.value === null) return 'nothing';
  if (typeof node.value === 'number') return 'a number';
  return typeof node.value === 'boolean' ? `\`${node.value}\`` : 'a text';
}
