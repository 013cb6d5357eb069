import type { z } from 'zod';
import { nearest } from '../messages/nearest.js';
import { listed, quoted } from '../messages/printable.js';
import { foreignWhiteSpace } from '../messages/white-space.js';
import type { Findings } from './findings.js';
import { scenarioGrammar } from './grammar.js';
import { keysAt, placesOfKey } from './grammar-keys.js';
import type { TextSpan } from './source-text.js';
import { describe, entryOf, type MapNode, nodeAt, plainData, type TreeNode } from './tree.js';

type Issue = z.core.$ZodIssue;
type Path = readonly PropertyKey[];

/**
 * Holds a tree against the grammar: unknown keys, missing keys, values of the wrong kind.
 *
 * @fails adds `unknown-key`, `missing-key`, `wrong-type`, `wrong-choice` and `not-finite-value`
 */
export function checkStructure(root: MapNode, findings: Findings): void {
  const outcome = scenarioGrammar.safeParse(plainData(root));
  if (outcome.success) return;
  const { issues } = outcome.error;
  const excused = misspeltKeys(root, issues);
  for (const issue of issues) {
    if (findings.isFull) return;
    if (excused.has(JSON.stringify(issue.path))) continue;
    report(root, [], issue, findings);
  }
}

/** Paths of keys that are missing because a near one, told as unknown, stands in their place. */
function misspeltKeys(root: MapNode, issues: readonly Issue[]): Set<string> {
  const unknown = new Map<string, string[]>();
  for (const issue of issues) {
    if (issue.code === 'unrecognized_keys') unknown.set(JSON.stringify(issue.path), issue.keys);
  }
  const excused = new Set<string>();
  for (const { path, code } of issues) {
    if (code === 'unrecognized_keys' || nodeAt(root, path) !== undefined) continue;
    const here = unknown.get(JSON.stringify(path.slice(0, -1))) ?? [];
    if (nearest(String(path.at(-1)), here).length > 0) excused.add(JSON.stringify(path));
  }
  return excused;
}

function report(root: MapNode, before: Path, issue: Issue, findings: Findings): void {
  const path = [...before, ...issue.path];
  if (issue.code === 'unrecognized_keys') {
    for (const key of issue.keys) if (!findings.isFull) unknownKey(root, path, key, findings);
    return;
  }
  const node = nodeAt(root, path);
  if (node === undefined) missingKey(root, path, findings);
  else if (issue.code === 'invalid_union') reportChoice(root, path, node, issue, findings);
  else wrongValue(root, path, node, issue, findings);
}

/** If the value has the outer form of exactly one of several allowed ones, what is wrong within that form is told. */
function reportChoice(
  root: MapNode,
  path: Path,
  node: TreeNode,
  issue: Issue & { code: 'invalid_union' },
  findings: Findings,
): void {
  const meant = issue.errors.filter(
    (issues) => !issues.some((inner) => inner.path.length === 0 && inner.code !== 'unrecognized_keys'),
  );
  if (meant.length !== 1 || node.kind === 'scalar') wrongValue(root, path, node, issue, findings);
  else for (const inner of meant[0]!) if (!findings.isFull) report(root, path, inner, findings);
}

function unknownKey(root: MapNode, path: Path, key: string, findings: Findings): void {
  const node = nodeAt(root, path);
  const entry = entryOf(node, key);
  if (entry === undefined || node?.kind !== 'map') return;
  const known = keysAt(scenarioGrammar, path);
  const elsewhere = placesOfKey(scenarioGrammar, key);
  const near = nearest(
    key,
    known.filter((name) => !node.entries.has(name)),
  );
  findings.add({
    code: 'unknown-key',
    at: entry.keySpan,
    what: `${quoted(key)} is not a key of ${place(path)}.`,
    why: 'A key that is not known would be passed over in silence, and with it what it was meant to say.',
    mend: `${spaceMend(key)}${keyMend(known, near, elsewhere)}`,
    evidence: { key: key.slice(0, 100), known, near },
  });
}

/** A space that only looks like one makes a key another key. */
function spaceMend(key: string): string {
  const space = foreignWhiteSpace(key);
  return space === null ? '' : `There is ${space.name} in it: write an ordinary space. `;
}

function keyMend(known: readonly string[], near: readonly string[], elsewhere: readonly string[][]): string {
  if (near.length > 0) return `Correct the key; near ${near.length === 1 ? 'it is' : 'it are'} ${listed(near, 'and')}.`;
  if (elsewhere.length === 1) return `It belongs to ${place(elsewhere[0]!)}.`;
  return `Take it away, or write one of ${known.join(', ')}.`;
}

function missingKey(root: MapNode, path: Path, findings: Findings): void {
  const key = String(path.at(-1));
  findings.add({
    code: 'missing-key',
    at: groupSpan(root, path.slice(0, -1)),
    what: `${place(path.slice(0, -1), true)} has no ${quoted(key)}.`,
    why: 'It cannot be left out, because nothing that could be assumed in its place would be safe.',
    mend: `Add the key ${quoted(key)}.`,
    evidence: { key },
  });
}

/** A group is pointed at by its own key; the top of the scenario by its first. */
function groupSpan(root: MapNode, path: Path): TextSpan {
  const parent = nodeAt(root, path.slice(0, -1));
  const entry = path.length === 0 ? root.entries.values().next().value : entryOf(parent, String(path.at(-1)));
  return entry?.keySpan ?? nodeAt(root, path)?.span ?? root.span;
}

function wrongValue(root: MapNode, path: Path, node: TreeNode, issue: Issue, findings: Findings): void {
  const where = `${quoted(
    path
      .map(String)
      .filter((_, k) => typeof path[k] === 'string')
      .at(-1) ?? 'scenario',
  )}`;
  const name = typeof path.at(-1) === 'number' ? `Item ${Number(path.at(-1)) + 1} of ${where}` : where;
  if (node.kind === 'scalar' && typeof node.value === 'number' && !Number.isFinite(node.value)) {
    notFinite(name, node.span, findings);
    return;
  }
  const choices = node.kind === 'scalar' && typeof node.value === 'string' ? choicesOf(issue) : [];
  const isChoice = choices.length > 0;
  findings.add({
    code: isChoice ? 'wrong-choice' : 'wrong-type',
    at: node.kind === 'scalar' ? node.span : groupOrItemSpan(root, path, node),
    what: `${name} must be ${issue.message}, but ${isChoice && node.kind === 'scalar' ? quoted(node.text) : describe(node)} stands here.`,
    why: 'Nothing else has a meaning in this place, and nothing is guessed.',
    mend: `Write ${issue.message}${isAnswer(node) && /number|formula/.test(issue.message) ? '; yes and no have no amount' : ''}.`,
    ...(isChoice && node.kind === 'scalar' ? { near: { word: node.text, among: choices } } : {}),
  });
}

function isAnswer(node: TreeNode): boolean {
  return node.kind === 'scalar' && typeof node.value === 'boolean';
}

/** The words that the grammar takes at this place, if it takes words. */
function choicesOf(issue: Issue): string[] {
  if (issue.code === 'invalid_value') return issue.values.map(String);
  return issue.code === 'invalid_union'
    ? issue.errors
        .flat()
        .filter(({ path }) => path.length === 0)
        .flatMap(choicesOf)
    : [];
}

function groupOrItemSpan(root: MapNode, path: Path, node: TreeNode): TextSpan {
  return typeof path.at(-1) === 'number' ? { start: node.span.start, end: node.span.start + 1 } : groupSpan(root, path);
}

/** Infinity or not-a-number where a number is meant. */
export function notFinite(name: string, at: TextSpan | null, findings: Findings): void {
  findings.add({
    code: 'not-finite-value',
    at,
    what: `${name} is not a finite number.`,
    why: 'Everything computed from it would be without meaning.',
    mend: 'Write a finite number.',
  });
}

/** A place in the scenario, in words. */
function place(path: Path, atBeginning = false): string {
  if (path.length === 0) return atBeginning ? 'The scenario' : 'the scenario';
  return quoted(path.map((step) => (typeof step === 'number' ? `item ${step + 1}` : String(step))).join(' / '));
}
