import { readFileSync } from 'node:fs';
import { expect, test } from 'vitest';
import type { InterpreterKind } from '#built/run/options.js';
import { recordOf } from './run-value.js';

interface Known {
  readonly file: string;
  readonly low: number;
  readonly high: number;
  /** How narrow the bracket must be, as a share of the value. */
  readonly width: number;
  /** Stands in for the file's own method where the defaults would take a minute. */
  readonly method?: string;
}

/** What the shipped scenarios are known to be worth. */
const known: readonly Known[] = [
  // Independent quadrature on aligned logarithmic grids, error at most 0.0001.
  { file: '01-two-lots.yaml', low: 13.9018, high: 13.9018, width: 0.01 },
  // Becker, Cheridito & Jentzen (2019), J. Machine Learning Research 20(74), table 1, published interval; from memory.
  { file: '02-five-lots.yaml', low: 26.138, high: 26.174, width: 0.015 },
  // Independent convolution on 32,768 points, error below 0.0001; Longstaff & Schwartz (2001), table 1, prints 2.314.
  { file: '03-floor-price.yaml', low: 2.3141, high: 2.3141, width: 0.015 },
  // Becker, Cheridito & Jentzen (2019), as above.
  {
    file: '04-hundred-lots.yaml',
    low: 83.357,
    high: 83.862,
    width: 0.015,
    method: '{ bracket width: { relative: 1% } }',
  },
  // Desai, Farias & Moallemi (2012), Management Science 58(12), 2292-2308: their lower bound and the lower of their two
  // upper bounds; from memory.
  {
    file: '05-capped-lots.yaml',
    low: 50.252,
    high: 51.814,
    width: 0.015,
    method: '{ counts: { fit: 16384 }, bracket width: { relative: 1% } }',
  },
];

test.each(known)(
  '$file: the bracket meets what is known, is narrow, and raises no advice',
  async ({ file, low, high, width, method }) => {
    const shipped = readFileSync(new URL(`../scenarios/${file}`, import.meta.url), 'utf8');
    const text = method === undefined ? shipped : `${shipped.replace(/\nmethod:[\s\S]*$/, '')}\nmethod: ${method}\n`;
    const { bracket95, lower, advice } = await recordOf(text, { workers: 2 });
    expect(bracket95.low).toBeLessThan(high);
    expect(bracket95.high).toBeGreaterThan(low);
    expect(bracket95.high - bracket95.low).toBeLessThan(width * lower.value);
    expect(advice).toEqual([]);
  },
);

// The hundred lots would take the plain interpreter long and show it nothing that the others do not.
const interpreted = known.filter(({ file }) => file !== '04-hundred-lots.yaml');

test.each(interpreted)('$file: the two interpreters give the same record, digit for digit', async ({ file }) => {
  const text = readFileSync(new URL(`../scenarios/${file}`, import.meta.url), 'utf8');
  const plan = {
    basisSize: 0,
    round: 1,
    fitPathCount: 1300,
    outerPathCount: 130,
    innerPointCount: 3,
    nestedOuterPathCount: 21,
    nestedInnerPathCount: 2,
    upper: 'andersen-broadie',
  } as const;
  const essence = async (interpreter: InterpreterKind) => {
    const { timing, interpreter: used, ...figures } = await recordOf(text, { plan, interpreter });
    expect(used).toBe(interpreter);
    expect(timing.totalSeconds).toBeGreaterThan(0);
    return JSON.stringify(figures);
  };
  expect(await essence('wasm')).toBe(await essence('plain'));
});

test('the nested upper bound makes the bracket of the two lots when it is asked for', async () => {
  const text = readFileSync(new URL('../scenarios/01-two-lots.yaml', import.meta.url), 'utf8');
  const { bracket95, upper, uppers, lower } = await recordOf(text, { workers: 2, upper: 'andersen-broadie' });
  expect(upper.method).toBe('andersen-broadie');
  expect(uppers.map(({ method }) => method)).toEqual(['one-step', 'andersen-broadie', 'regressed']);
  expect(bracket95.low).toBeLessThan(13.9018);
  expect(bracket95.high).toBeGreaterThan(13.9018);
  expect(bracket95.high - bracket95.low).toBeLessThan(0.01 * lower.value);
});
