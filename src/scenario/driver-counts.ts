import { figure } from '../messages/figures.js';
import { quoted } from '../messages/printable.js';
import { readNumber } from './read-expression.js';
import type { Reading } from './reading.js';
import type { TextSpan } from './source-text.js';
import { entriesOf, type TreeNode, under } from './tree.js';

/** The most drivers that a scenario may have, all families together. */
export const mostDrivers = 1000;

/** Completes the names of families by their counts, which may be formulas of constants. */
export function readCounts(reading: Reading): void {
  let total = 0;
  let passing: TextSpan | null = null;
  for (const { key, keySpan, value } of entriesOf(under(reading.root, 'drivers'))) {
    const symbol = reading.symbols.get(key);
    if (symbol?.kind === 'driver') {
      total += 1;
      if (total > mostDrivers) passing ??= keySpan;
    }
    if (symbol?.kind !== 'family') continue;
    const node = under(value, 'count')!;
    const count = readNumber(node, `the count of ${quoted(key)}`, reading)?.value ?? null;
    const isCount = count !== null && Number.isInteger(count) && count >= 1;
    if (count !== null && !isCount) badCount(key, count, node, reading);
    reading.symbols.set(key, { ...symbol, count: isCount ? count : null });
    total += isCount ? count : 0;
    if (total > mostDrivers) passing ??= node.span;
  }
  if (passing !== null) tooManyDrivers(total, passing, reading);
}

function badCount(name: string, count: number, node: TreeNode, reading: Reading): void {
  reading.findings.add({
    code: 'value-out-of-range',
    at: node.span,
    what: `The count of ${quoted(name)} is ${figure(count)}; it must be a whole number, 1 or more.`,
    why: 'A family has a whole number of members.',
    mend: 'Write a whole number, 1 or more.',
    evidence: { value: count },
  });
}

/** Placed at the family or driver with which there are too many. */
function tooManyDrivers(total: number, at: TextSpan, reading: Reading): void {
  reading.findings.add({
    code: 'too-many-drivers',
    at,
    what: `The scenario has ${figure(total)} drivers; at most ${mostDrivers} are taken.`,
    why: 'Their correlations alone would take more memory and time than a valuation may.',
    mend: 'Take a smaller family, or model groups by one driver each.',
    evidence: { total, mostDrivers },
  });
}
