import { execFileSync } from 'node:child_process';
import { readFileSync } from 'node:fs';
import { fileURLToPath } from 'node:url';
import { expect, test } from 'vitest';
import { countsBeforePilot } from '#built/run/counts.js';
import { decideKeeping } from '#built/run/fit-memory.js';
import { forecastOf } from '#built/run/forecast.js';
import { prepare } from '#built/run/prepare.js';
import { lots } from '../scenario-texts.js';

const root = new URL('../../', import.meta.url);

/** Runs in a process of its own and prints the most memory that it held, in bytes. */
const program = `
  import { value } from '${new URL('dist/index.js', root).href}';
  const { text, options } = JSON.parse(process.argv[1]);
  const { kind } = await value(text, options);
  if (kind !== 'delivered') process.exit(1);
  console.log(process.resourceUsage().maxRSS * 1024);
`;

function measured(text: string, options: object): number {
  const words = ['--input-type=module', '-e', program, JSON.stringify({ text, options })];
  return Number(execFileSync(process.execPath, words, { encoding: 'utf8' }));
}

function forecast(text: string, workers: number, fitMemoryBytes: number | undefined): number {
  const outcome = prepare(text, {});
  if (outcome.kind === 'refused') throw new Error(JSON.stringify(outcome.messages));
  const { programs, scenario } = outcome.prepared;
  const counts = countsBeforePilot(programs, scenario.model.method);
  const kept = decideKeeping(programs, counts.fitPathCount, fitMemoryBytes);
  if (kept.kind === 'refused') throw new Error(JSON.stringify(kept.messages));
  return forecastOf(programs, counts, kept.keeping, workers, null).peakMemoryBytes;
}

const shipped = (name: string) => readFileSync(fileURLToPath(new URL(`scenarios/${name}.yaml`, root)), 'utf8');
const manyDates = lots({ dates: '{ count: 365, last: 3 }', method: ['counts: { fit: 32768, outer: 512, inner: 4 }'] });
const cases: [string, string, number | undefined][] = [
  ['two lots', shipped('01-two-lots'), undefined],
  ['five lots', shipped('02-five-lots'), undefined],
  ['floor price', shipped('03-floor-price'), undefined],
  ['two lots, 365 dates', manyDates, undefined],
  ['two lots, 365 dates, 30 MB', manyDates, 30e6],
  ['a hundred lots', lots({ count: 100 }), undefined],
  ['five hundred lots', lots({ count: 500, method: ['counts: { fit: 8192, outer: 1024, inner: 16 }'] }), undefined],
];

test.each(cases)('%s: the forecast of memory is within a quarter of what is measured', (name, text, fitMemoryBytes) => {
  for (const workers of [0, 2, 4]) {
    const found = measured(text, { workers, fitMemoryBytes });
    const said = forecast(text, workers, fitMemoryBytes);
    console.log(`${name}, ${workers} workers: ${Math.round(found / 1e6)} MB, forecast ${Math.round(said / 1e6)} MB`);
    expect(said / found).toBeGreaterThan(0.75);
    expect(said / found).toBeLessThan(1.25);
  }
});
