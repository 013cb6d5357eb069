import { nearest } from '../messages/nearest.js';
import { scenarioGrammar } from './grammar.js';
import { keysAt } from './grammar-keys.js';
import type { Entry, MapNode, TreeNode } from './tree.js';
import { nodeAt, plainData } from './tree.js';

type Path = readonly PropertyKey[];

/** A tree that follows the grammar, for finding further mistakes in what is left; it is never valued. */
export interface Remainder {
  readonly root: MapNode;
  /** Constants and drivers that were taken out: nothing is said of what uses them. */
  readonly names: ReadonlySet<string>;
}

/** Sections whose keys are names that expressions use. */
const declaring: ReadonlySet<PropertyKey> = new Set(['constants', 'drivers']);

/** Rounds of taking out; each can bring up a key that is missing now, with which a whole driver goes. */
const mostRounds = 4;

/**
 * Takes out of a tree what breaks the grammar, so that the mistakes of meaning in the rest can be told in the same
 * breath: a misspelt key is read as its only near one, other faults go with the smallest part that may be left out.
 *
 * @returns null when what is left does not make a scenario
 */
export function setFaultsAside(root: MapNode): Remainder | null {
  const names = new Set<string>();
  let current = root;
  for (let round = 0; round < mostRounds; round++) {
    const outcome = scenarioGrammar.safeParse(plainData(current));
    if (outcome.success) return { root: names.size > 0 ? without(current, ['correlation']) : current, names };
    for (const issue of outcome.error.issues) {
      if (issue.code === 'unrecognized_keys') {
        for (const key of issue.keys) current = renamedOrGone(current, issue.path, key);
        continue;
      }
      const path = removable(issue.path);
      if (path === null) return null;
      if (path.length === 2 && declaring.has(path[0]!)) names.add(String(path[1]));
      current = without(current, path);
    }
  }
  return null;
}

/**
 * The part that goes with a fault: a constant, a driver or the clause `ends when` as a whole, elsewhere the key. Null for what must be there, and
 * for `at expiry`, whose absence would be a mistake of its own for an issuer.
 */
function removable(path: Path): Path | null {
  const [section, name] = path;
  if (section !== undefined && declaring.has(section) && name !== undefined) return [section, name];
  if (section === 'contract' && name === 'at expiry') return null;
  if (section === 'contract' && name === 'ends when') return [section, name];
  const firstItem = path.findIndex((step) => typeof step === 'number');
  const keys = firstItem < 0 ? path : path.slice(0, firstItem);
  return keys.length === 0 ? null : keys;
}

function renamedOrGone(root: MapNode, path: Path, key: string): MapNode {
  const group = nodeAt(root, path);
  if (group?.kind !== 'map') return root;
  const near = nearest(
    key,
    keysAt(scenarioGrammar, path).filter((name) => !group.entries.has(name)),
  );
  const entry = group.entries.get(key);
  const gone = without(root, [...path, key]);
  return near.length === 1 && entry !== undefined ? withEntry(gone, path, { ...entry, key: near[0]! }) : gone;
}

function without(root: MapNode, path: Path): MapNode {
  return changed(root, path.slice(0, -1), (group) => {
    const entries = new Map(group.entries);
    entries.delete(String(path.at(-1)));
    return { ...group, entries };
  });
}

function withEntry(root: MapNode, path: Path, entry: Entry): MapNode {
  return changed(root, path, (group) => ({ ...group, entries: new Map(group.entries).set(entry.key, entry) }));
}

/** A copy of the tree with the group at a path of keys and positions replaced. */
function changed(root: MapNode, path: Path, change: (group: MapNode) => MapNode): MapNode {
  const recurse = (node: TreeNode, depth: number): TreeNode => {
    if (depth === path.length) return node.kind === 'map' ? change(node) : node;
    const step = path[depth]!;
    if (node.kind === 'list') {
      return { ...node, items: node.items.map((item, index) => (index === step ? recurse(item, depth + 1) : item)) };
    }
    const entry = node.kind === 'map' ? node.entries.get(String(step)) : undefined;
    if (node.kind !== 'map' || entry === undefined) return node;
    const value = recurse(entry.value, depth + 1);
    return { ...node, entries: new Map(node.entries).set(entry.key, { ...entry, value }) };
  };
  return recurse(root, 0) as MapNode;
}
