import { figure } from '../messages/figures.js';
import { quoted } from '../messages/printable.js';
import { readCorrelationStatement } from './correlation-statements.js';
import { type CorrelationTable, memberCountOf, type PairStatement } from './correlation-table.js';
import { type Indefinite, indefiniteness } from './definite.js';
import { mostDrivers } from './driver-counts.js';
import { driverLabels, driverOffsets } from './driver-names.js';
import type { Reading } from './reading.js';
import { itemsOf, under } from './tree.js';

/**
 * Assembles the correlation matrix of all drivers and makes sure that it is one; it is never repaired.
 *
 * @fails adds the mistakes of the statements and `correlation-impossible`
 */
export function readCorrelation(reading: Reading): number[][] | null {
  const known = driverOffsets(reading);
  if (known === null || known.size > mostDrivers) return null;
  const { size } = known;
  const table: CorrelationTable = {
    values: Array.from({ length: size }, (_, i) => Float64Array.from({ length: size }, (_, j) => (i === j ? 1 : 0))),
    statedBy: Array.from({ length: size }, () => new Int32Array(size)),
    statements: [],
    labels: driverLabels(reading),
    offsets: known.offsets,
  };
  const before = reading.findings.count;
  itemsOf(under(reading.root, 'correlation')).forEach((node, position) => {
    if (!reading.findings.isFull) readCorrelationStatement(node, position, table, reading);
  });
  if (reading.findings.count > before) return null;
  if (table.statedBy.some((row, i) => row.some((statement, j) => j > i && statement === 0))) {
    reading.settings.byDefault('correlation.pairs not stated', '0');
  }
  const failure = indefiniteness(table.values);
  if (failure === null) return table.values.map((row) => [...row]);
  impossible(failure, table, reading);
  return null;
}

function impossible({ form, pairs }: Indefinite, table: CorrelationTable, reading: Reading): void {
  const named = pairs.map(({ first, second, contribution }) => ({
    drivers: [table.labels[first]!, table.labels[second]!],
    value: table.values[first]![second]!,
    contribution,
  }));
  const worst = pairs[0]!;
  const statement = table.statements[table.statedBy[worst.first]![worst.second]! - 1]!;
  const words = named.map(
    ({ drivers, value }) => `${quoted(drivers[0]!)} and ${quoted(drivers[1]!)} at ${figure(value)}`,
  );
  reading.findings.add({
    code: 'correlation-impossible',
    at: statement.span,
    what: `These correlations contradict one another: some mix of the drivers would have the negative variance ${form.toPrecision(3)}.`,
    why: 'Quantities that move like this do not exist, so no path can be drawn. The matrix is never repaired, because a repair changes what was stated.',
    mend: `Look first at ${words.join('; ')}: move them towards what the others allow.${leastWords(statement, table)}`,
    evidence: { form, pairs: named },
  });
}

function leastWords(statement: PairStatement, table: CorrelationTable): string {
  if (statement.form !== 'among') return '';
  const count = memberCountOf(statement, table);
  return ` Alone, a family of ${count} can have a common correlation down to ${(-1 / (count - 1)).toPrecision(4)}.`;
}
