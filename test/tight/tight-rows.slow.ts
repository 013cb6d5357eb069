/**
 * Brackets for contracts with known values are as narrow as they must be, with seeds that nobody chose.
 *
 * All rows take the better part of an hour; one row: `npx vitest run --mode slow test/tight -t 'ten lots'`. Seconds are
 * printed only, and mean nothing while other tests run beside this file.
 */
import { afterAll, expect, test } from 'vitest';
import type { RunRecord } from '#built/result/record.js';
import { recordOf } from '../run-value.js';
import { tightRows } from './rows.js';
import { type RowSummary, summaryOf, tableOf } from './summary.js';

const seedCount = 10;
/** The worst run may be so many times as wide as the median may be. */
const worstShare = 1.3;
/** Share of the brackets that must lie to what is known as they should; each may miss once in twenty, as may what is known. */
const holdShare = 0.9;

const summaries: RowSummary[] = [];

afterAll(() => console.log(tableOf(summaries)));

test.each(tightRows)('$name', async (row) => {
  const records: RunRecord[] = [];
  for (let seed = 1; seed <= seedCount; seed++) {
    const width = row.width === null ? {} : { width: row.width };
    records.push(await recordOf(row.text, { seed: `seed ${seed}`, workers: 2, ...width }));
  }
  const summary = summaryOf(row, records);
  summaries.push(summary);
  console.log(tableOf([summary]));
  expect(summary.medianWidth).toBeLessThanOrEqual(summary.allowedWidth);
  expect(summary.worstWidth).toBeLessThanOrEqual(worstShare * summary.allowedWidth);
  expect(summary.holdCount).toBeGreaterThanOrEqual(holdShare * seedCount);
});
