import { quoted } from '../messages/printable.js';
import { checkExpression } from '../program/check-expression.js';
import type { Scope } from '../program/scope.js';
import { addProblem, computed, parseAt } from './read-expression.js';
import { constantScope, type Reading } from './reading.js';
import { entriesOf, type ScalarNode, type TreeNode, under } from './tree.js';

/** Where each driver and family begins in the order of the correlation matrix; null while a count is not known. */
export function driverOffsets(
  reading: Reading,
): { readonly offsets: ReadonlyMap<string, number>; readonly size: number } | null {
  const offsets = new Map<string, number>();
  let size = 0;
  for (const { key } of entriesOf(under(reading.root, 'drivers'))) {
    const symbol = reading.symbols.get(key);
    if (symbol?.kind !== 'driver' && symbol?.kind !== 'family') return null;
    offsets.set(key, size);
    const count = symbol.kind === 'family' ? symbol.count : 1;
    if (count === null) return null;
    size += count;
  }
  return { offsets, size };
}

/** The names of all drivers in the order of the correlation matrix: `fuel`, `lot[1]`. */
export function driverLabels(reading: Reading): string[] {
  return entriesOf(under(reading.root, 'drivers')).flatMap(({ key }) => {
    const symbol = reading.symbols.get(key);
    if (symbol?.kind !== 'family') return [key];
    return Array.from({ length: symbol.count ?? 0 }, (_, index) => `${key}[${index + 1}]`);
  });
}

/** The positions of the drivers that a name stands for: one driver, a whole family, or a member `lot[2]`. */
export function readDriverName(
  node: TreeNode,
  offsets: ReadonlyMap<string, number>,
  reading: Reading,
): number[] | null {
  if (node.kind !== 'scalar' || reading.findings.isFull) return null;
  const placed = parseAt(node, reading);
  if (placed === null) return null;
  const { tree } = placed;
  if (tree.kind === 'name') {
    const symbol = reading.symbols.get(tree.name);
    if (symbol?.kind !== 'driver' && symbol?.kind !== 'family') return unknownDriver(tree.name, node, reading);
    const first = offsets.get(tree.name)!;
    return Array.from({ length: symbol.kind === 'family' ? symbol.count! : 1 }, (_, index) => first + index);
  }
  if (tree.kind !== 'member') return unknownDriver(node.text, node, reading);
  const constants = constantScope(reading, 'the name of a driver');
  const scope: Scope = { ...constants, allowed: new Set(['constant', 'family', 'driver']) };
  const problems = checkExpression(tree, scope);
  for (const problem of problems) addProblem(problem, node, reading);
  const index = problems.length > 0 ? null : computed(tree.index, reading);
  return index === null ? null : [offsets.get(tree.family)! + index - 1];
}

function unknownDriver(name: string, node: ScalarNode, reading: Reading): null {
  const drivers = [...reading.symbols]
    .filter(([, { kind }]) => kind === 'driver' || kind === 'family')
    .map(([known]) => known);
  reading.findings.add({
    code: 'unknown-name',
    at: node.span,
    what: `${quoted(name)} is not a driver of this scenario.`,
    why: 'A correlation is between drivers that the scenario states.',
    mend: 'Write the name of a driver, of a family, or of a member as "lot[2]" in quotes.',
    evidence: { name: name.slice(0, 100) },
    near: { word: name, among: drivers },
  });
  return null;
}
