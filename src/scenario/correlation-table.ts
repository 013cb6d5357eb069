import { quoted } from '../messages/printable.js';
import type { Reading } from './reading.js';
import type { TextSpan } from './source-text.js';

/** Where and how a pair was stated. */
export interface PairStatement {
  readonly span: TextSpan;
  readonly form: string;
}

/** The correlations stated so far. */
export interface CorrelationTable {
  /** Zeros where nothing is stated. @shape drivers × drivers, symmetric, ones on the diagonal */
  readonly values: readonly Float64Array[];
  /** For each pair i < j the position of its statement, plus one; 0 where nothing is stated. */
  readonly statedBy: readonly Int32Array[];
  readonly statements: PairStatement[];
  readonly labels: readonly string[];
  /** Where each driver and family begins in the order of the matrix. */
  readonly offsets: ReadonlyMap<string, number>;
}

/** Enters one pair; false after a mistake, which ends its statement. */
export function statePair(
  table: CorrelationTable,
  i: number,
  j: number,
  value: number,
  statement: PairStatement,
  reading: Reading,
): boolean {
  const [low, high] = i < j ? [i, j] : [j, i];
  const earlier = table.statedBy[low]![high]!;
  if (earlier > 0) {
    const line = reading.source.lineOf(table.statements[earlier - 1]!.span.start);
    const [first, second] = [quoted(table.labels[low]!), quoted(table.labels[high]!)];
    reading.findings.add({
      code: 'correlation-stated-twice',
      at: statement.span,
      what: `The correlation of ${first} and ${second} is stated already, on line ${line}.`,
      why: 'Only one of the two values could hold.',
      mend: 'Take one of the two statements away, or make them about different pairs.',
      evidence: { pair: [table.labels[low], table.labels[high]], line },
    });
    return false;
  }
  if (table.statements.at(-1) !== statement) table.statements.push(statement);
  table.statedBy[low]![high] = table.statements.length;
  table.values[low]![high] = value;
  table.values[high]![low] = value;
  return true;
}

/** How many members the family of an `among` statement has. */
export function memberCountOf(statement: PairStatement, table: CorrelationTable): number {
  const position = table.statements.indexOf(statement) + 1;
  const pairCount = table.statedBy.reduce(
    (sum, row) => sum + row.reduce((more, entry) => more + (entry === position ? 1 : 0), 0),
    0,
  );
  return Math.round((1 + Math.sqrt(1 + 8 * pairCount)) / 2);
}
