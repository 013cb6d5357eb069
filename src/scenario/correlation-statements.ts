import { figure } from '../messages/figures.js';
import { quoted } from '../messages/printable.js';
import { type CorrelationTable, statePair } from './correlation-table.js';
import { readDriverName } from './driver-names.js';
import { capital, readNumber } from './read-expression.js';
import type { Reading } from './reading.js';
import type { TextSpan } from './source-text.js';
import { type Entry, entriesOf, itemsOf, type TreeNode, under } from './tree.js';

const forms: readonly (readonly string[])[] = [
  ['among', 'value'],
  ['between', 'value'],
  ['of', 'matrix'],
];

/**
 * Reads one statement about correlations into the table.
 *
 * @fails adds `mixed-forms`, `missing-key`, `correlation-with-itself`, `correlation-stated-twice`, `matrix-…`,
 * `value-out-of-range` and the mistakes of names and expressions
 */
export function readCorrelationStatement(
  node: TreeNode,
  position: number,
  table: CorrelationTable,
  reading: Reading,
): void {
  const keys = entriesOf(node);
  if (keys.some(({ key }) => key === 'factor' || key === 'blocks')) return;
  const form = forms.find(([first]) => under(node, first!) !== undefined);
  const foreign = form === undefined ? undefined : keys.find(({ key }) => !form.includes(key));
  if (form === undefined) {
    missing(node, keys[0], ['among', 'between', 'of'], reading);
    return;
  }
  if (foreign !== undefined) {
    mixed(foreign, form, reading);
    return;
  }
  if (form.some((key) => under(node, key) === undefined)) {
    missing(node, keys[0], [form[1]!], reading);
    return;
  }
  const setting = `correlation.${position + 1}`;
  if (form[0] === 'of') readMatrix(node, setting, table, reading);
  else readPairs(node, form[0]!, setting, table, reading);
}

/** `among` and `between`: one value for all pairs. */
function readPairs(node: TreeNode, form: string, setting: string, table: CorrelationTable, reading: Reading): void {
  const valueNode = under(node, 'value')!;
  const value = readCoefficient(valueNode, 'the correlation', reading);
  const namesNode = under(node, form)!;
  const names = form === 'among' ? [namesNode, namesNode] : itemsOf(namesNode);
  if (names.length !== 2) {
    twoWanted(names.length, namesNode, reading);
    return;
  }
  const first = readDriverName(names[0]!, table.offsets, reading);
  const second = form === 'among' ? first : readDriverName(names[1]!, table.offsets, reading);
  if (first === null || second === null || value === null) return;
  if (form === 'among' ? first.length < 2 : first.some((driver) => second.includes(driver))) {
    withItself(form, names.at(-1)!, reading);
    return;
  }
  const words = names.map((name) => (name.kind === 'scalar' ? name.text : ''));
  const label = form === 'among' ? `among ${words[0]}` : `between ${words.join(' and ')}`;
  reading.settings.fromText(setting, `${label}: ${value}`, valueNode);
  const at = { span: namesNode.span, form };
  for (const i of first)
    for (const j of second) if ((form === 'between' || i < j) && !statePair(table, i, j, value, at, reading)) return;
}

/** A whole matrix over the drivers that are listed, families standing for their members. */
function readMatrix(node: TreeNode, setting: string, table: CorrelationTable, reading: Reading): void {
  const drivers: number[] = [];
  for (const name of itemsOf(under(node, 'of'))) {
    const more = readDriverName(name, table.offsets, reading);
    if (more === null) return;
    if (more.some((driver) => drivers.includes(driver))) {
      withItself('of', name, reading);
      return;
    }
    drivers.push(...more);
  }
  const matrixNode = under(node, 'matrix')!;
  const rows = itemsOf(matrixNode);
  if (!isSquare(rows, drivers.length, matrixNode, reading)) return;
  const values = rows.map((row, i) =>
    itemsOf(row).map((cell, j) => (reading.findings.isFull ? null : readCell(cell, i, j, reading))),
  );
  if (values.some((row) => row.includes(null))) return;
  reading.settings.fromText(setting, `matrix over ${drivers.length} drivers`, matrixNode);
  for (let i = 0; i < drivers.length; i += 1) {
    for (let j = 0; j < i; j += 1) {
      const cell = itemsOf(rows[i])[j]!;
      if (Math.abs(values[i]![j]! - values[j]![i]!) > 1e-12) {
        asymmetric(i, j, values[i]![j]!, values[j]![i]!, cell, reading);
        return;
      }
      if (!statePair(table, drivers[i]!, drivers[j]!, values[i]![j]!, { span: cell.span, form: 'of' }, reading)) return;
    }
  }
}

function readCell(cell: TreeNode, i: number, j: number, reading: Reading): number | null {
  const value = readCoefficient(cell, `row ${i + 1}, column ${j + 1} of the matrix`, reading);
  if (i !== j || value === null || Math.abs(value - 1) <= 1e-12) return value;
  reading.findings.add({
    code: 'matrix-diagonal',
    at: cell.span,
    what: `The matrix has ${figure(value)} on its diagonal, in row ${i + 1}.`,
    why: 'Every driver moves with itself exactly; a correlation matrix has ones there.',
    mend: 'Write 1. If these are covariances, divide each by the two volatilities.',
    evidence: { row: i + 1, value },
  });
  return null;
}

function readCoefficient(node: TreeNode, name: string, reading: Reading): number | null {
  const value = readNumber(node, name, reading)?.value ?? null;
  if (value === null || (value >= -1 && value <= 1)) return value;
  reading.findings.add({
    code: 'value-out-of-range',
    at: node.span,
    what: `${capital(name)} is ${figure(value)}; it must be from -1 to 1.`,
    why: 'No two quantities can move together more than exactly.',
    mend: 'Write a number from -1 to 1; 20% is 0.2.',
    evidence: { value },
  });
  return null;
}

function isSquare(rows: readonly TreeNode[], size: number, node: TreeNode, reading: Reading): boolean {
  const uneven = rows.findIndex((row) => itemsOf(row).length !== size);
  if (rows.length === size && uneven < 0) return true;
  const at = rows.length !== size ? node.span : rows[uneven]!.span;
  reading.findings.add({
    code: 'matrix-shape',
    at,
    what:
      rows.length !== size
        ? `The matrix has ${rows.length} rows for ${size} drivers.`
        : `Row ${uneven + 1} of the matrix has ${itemsOf(rows[uneven]).length} values for ${size} drivers.`,
    why: 'Row and column i belong to driver i of the list; a family stands for all its members.',
    mend: `Write ${size} rows of ${size} values.`,
    evidence: { size, rows: rows.length },
  });
  return false;
}

function asymmetric(i: number, j: number, here: number, there: number, cell: TreeNode, reading: Reading): void {
  reading.findings.add({
    code: 'matrix-not-symmetric',
    at: cell.span,
    what: `Row ${i + 1}, column ${j + 1} says ${here}, but row ${j + 1}, column ${i + 1} says ${there}.`,
    why: 'Both are the correlation of the same two drivers.',
    mend: 'Write the same value in both places.',
    evidence: { row: i + 1, column: j + 1, here, there },
  });
}

function missing(node: TreeNode, entry: Entry | undefined, keys: readonly string[], reading: Reading): void {
  const at: TextSpan = entry?.keySpan ?? node.span;
  const choice = keys.map(quoted).join(' or ');
  reading.findings.add({
    code: 'missing-key',
    at,
    what: `This statement has no ${choice}.`,
    why: 'It must say which drivers it is about, and how they move together.',
    mend: 'Write { among: family, value: 0.2 }, { between: [a, b], value: 0.2 } or { of: [a, b], matrix: [[1, 0.2], [0.2, 1]] }.',
    evidence: { keys },
  });
}

function mixed({ key, keySpan }: Entry, form: readonly string[], reading: Reading): void {
  reading.findings.add({
    code: 'mixed-forms',
    at: keySpan,
    what: `${quoted(key)} does not go together with ${quoted(form[0]!)}.`,
    why: 'A statement has one of three forms, and only one of them can be meant.',
    mend: 'Write { among, value }, { between, value } or { of, matrix }, each in an item of its own.',
    evidence: { key },
  });
}

function twoWanted(found: number, node: TreeNode, reading: Reading): void {
  reading.findings.add({
    code: 'wrong-type',
    at: { start: node.span.start, end: node.span.start + 1 },
    what: `\`between\` has ${found} ${found === 1 ? 'name' : 'names'}; it takes two.`,
    why: 'A correlation is between two drivers.',
    mend: 'Write one item for each pair, or { of, matrix } for many at once.',
    evidence: { found },
  });
}

function withItself(form: string, node: TreeNode, reading: Reading): void {
  reading.findings.add({
    code: 'correlation-with-itself',
    at: node.span,
    what: form === 'among' ? 'There is only one driver here.' : 'A driver stands on both sides here, or twice.',
    why: 'Every driver moves with itself exactly; a correlation needs two different ones.',
    mend: 'Write { among: family, value } for the members of a family, { between: [a, b], value } for two drivers.',
  });
}
