/** Brackets of whole runs to a wanted width contain the exact value as often as they say. */
import { beforeAll, describe, expect, test } from 'vitest';
import type { RunRecord } from '#built/result/record.js';
import { recordOf } from '../run-value.js';
import { type LotsChange, lots } from '../scenario-texts.js';
import { meanSquareBand } from '../statistics.js';
import { countMisses, intervalOf, medianOf, mostMisses } from './misses.js';

const runCount = 400;

async function runsOf(change: LotsChange): Promise<RunRecord[]> {
  const records: RunRecord[] = [];
  for (let run = 0; run < runCount; run++) records.push(await recordOf(lots({ ...change, seed: `coverage ${run}` })));
  return records;
}

const bracketsOf = (records: readonly RunRecord[]) => records.map(({ bracket95 }) => bracket95);
const furtherOf = (records: readonly RunRecord[]) => records.filter(({ rounds }) => rounds.length > 1);

/** Prints what became of the runs and returns how many of their brackets miss. */
function report(name: string, records: readonly RunRecord[], exact: number): number {
  const { tooLow, tooHigh, count } = countMisses(bracketsOf(records), exact);
  const further = furtherOf(records);
  const missesOfFurther = countMisses(bracketsOf(further), exact).count;
  const width = medianOf(bracketsOf(records).map(({ low, high }) => (high - low) / exact));
  console.log(
    `${name}: ${records.length - count} of ${records.length} brackets contain ${exact}; ${tooLow} too low, ${tooHigh} too high; ` +
      `median width ${(100 * width).toFixed(2)}%; ${further.length} runs had further rounds, ${missesOfFurther} of them miss`,
  );
  return count;
}

test('two lots, nine dates: at least 95% of the brackets contain the exact value, further rounds among them', async () => {
  // Independent quadrature, error at most 0.0001.
  const exact = 13.9018;
  const records = await runsOf({ method: ['counts: { fit: 8000 }', 'bracket width: { relative: 0.45% }'] });
  expect(report('nine dates', records, exact)).toBeLessThanOrEqual(runCount - 380);
  // The width is chosen so that noise often misses it; without further rounds the test would not be about them.
  expect(furtherOf(records).length).toBeGreaterThanOrEqual(10);
});

describe('two lots, one date: no gap, so no slack', () => {
  // One integral (Stulz 1982; Johnson 1987), error 1e-5.
  const exact = 11.19568;
  let records: RunRecord[];

  beforeAll(async () => {
    records = await runsOf({
      dates: '[3]',
      method: ['counts: { fit: 2000 }', 'bracket width: { relative: 0.2% }'],
    });
  }, 1_800_000);

  test('no more brackets miss than 5% explains (false alarm: once in a thousand)', () => {
    expect(report('one date', records, exact)).toBeLessThanOrEqual(mostMisses(runCount));
  });

  test.each([
    ['lower bound', ({ lower }: RunRecord) => lower],
    ['upper bound', ({ upper }: RunRecord) => upper],
    ['regressed upper bound', ({ uppers }: RunRecord) => uppers.find(({ method }) => method === 'regressed')!],
  ])('%s: it strays from the exact value as far as its standard error says (once in a thousand)', (name, boundIn) => {
    const errors = records.map((record) => (boundIn(record).value - exact) / boundIn(record).standardError!);
    const meanSquare = errors.reduce((sum, error) => sum + error * error, 0) / runCount;
    const { low, high } = meanSquareBand(runCount);
    console.log(`one date, ${name}: mean square ${meanSquare.toFixed(3)} in [${low.toFixed(3)}, ${high.toFixed(3)}]`);
    expect(meanSquare).toBeGreaterThan(low);
    expect(meanSquare).toBeLessThan(high);
  });

  test('control: intervals of one standard error are caught by the same count', () => {
    const { count } = countMisses(
      records.map(({ lower }) => intervalOf(lower, 1)),
      exact,
    );
    console.log(`one standard error: ${count} of ${runCount} intervals miss, ${mostMisses(runCount)} allowed`);
    expect(count).toBeGreaterThan(mostMisses(runCount));
  });
});
