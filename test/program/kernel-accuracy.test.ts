/**
 * The elementary functions as the fast interpreter computes them, on all reference arguments: the same bits as those of
 * `elementary.ts`, hence its errors; and the errors once more, measured directly.
 *
 * The quantile is inside the draws and takes no argument from outside. That the fast draws are the plain quantiles of the
 * plain uniforms, bit for bit, in all three parts of the quantile, is shown in same-draws.test.ts; so its errors are those
 * measured in elementary.test.ts.
 */
import { expect, test } from 'vitest';
import { exp, log, normalCumulative, power } from '#built/program/elementary.js';
import { type Operation, operations } from '#built/program/operations.js';
import { blockLanes, columnStride } from '#built/program/program.js';
import { errorOf, lastPlace, oracle } from './elementary-oracle.js';
import { createWasmInterpreter } from './interpreters.js';
import { firstDifference, specialValues } from './special-numbers.js';

/** Results of one operation on lists of arguments, a block at a time. */
function throughKernels(operation: Operation, argumentLists: readonly (readonly number[])[]): number[] {
  const interpreter = createWasmInterpreter({
    columnCount: 3,
    programs: [
      {
        name: operation,
        scalars: new Float64Array(0),
        uniformInputCount: 0,
        uniformCode: new Int32Array(0),
        laneCode: Int32Array.of(operations[operation].code, 2, 0, 1, -1),
        columnCount: 3,
      },
    ],
    numberCount: 0,
  });
  const results: number[] = [];
  for (let first = 0; first < argumentLists.length; first += blockLanes) {
    const chunk = argumentLists.slice(first, first + blockLanes);
    chunk.forEach(([a, b = 0], lane) => {
      interpreter.columns[lane] = a!;
      interpreter.columns[columnStride + lane] = b;
    });
    interpreter.run(interpreter.programs[0]!, chunk.length);
    results.push(...interpreter.columns.subarray(2 * columnStride, 2 * columnStride + chunk.length));
  }
  return results;
}

const cases: [string, Operation, (a: number, b: number) => number][] = [
  ['exp', 'exponential', exp],
  ['log', 'logarithm', log],
  ['normalCumulative', 'normalCumulative', normalCumulative],
  ['power', 'power', power],
];

test.each(cases)('%s: the same bits on all reference arguments and on special ones', (name, operation, compute) => {
  const ofOracle = oracle.get(name)!.map((reference) => reference.arguments);
  const special = name === 'power' ? [] : specialValues.map((value) => [value]);
  const lists = [...ofOracle, ...special];
  expect(lists.length).toBeGreaterThan(350);
  const plain = lists.map(([a, b = 0]) => compute(a!, b));
  expect(firstDifference(throughKernels(operation, lists), plain)).toBeNull();
});

test.each([
  ['exp', 'exponential'],
  ['log', 'logarithm'],
] as const)('%s: within 1 unit in the last place; infinities, zeros and NaN met exactly', (name, operation) => {
  const references = oracle.get(name)!;
  const got = throughKernels(
    operation,
    references.map((reference) => reference.arguments),
  );
  expect(Math.max(...references.map((reference, i) => errorOf(got[i]!, reference)))).toBeLessThan(1);
});

test('normalCumulative: relative error at most 1e-14 from -8 to 8', () => {
  const references = oracle.get('normalCumulative')!.filter(({ arguments: [x] }) => Math.abs(x!) <= 8);
  expect(references.length).toBeGreaterThan(300);
  const got = throughKernels(
    'normalCumulative',
    references.map((reference) => reference.arguments),
  );
  const errors = references.map(
    (reference, i) => (errorOf(got[i]!, reference) * lastPlace(reference.result)) / reference.result,
  );
  expect(Math.max(...errors)).toBeLessThan(1e-14);
});

test('exp where its multiple of log 2 is a tie, or next to one: the same bits', () => {
  const lists = Array.from({ length: 2100 }, (_, i) => (i - 1075 + 0.5) * Math.LN2).flatMap((tie) =>
    [-2, -1, 0, 1, 2].map((step) => [tie + step * lastPlace(tie)]),
  );
  const plain = lists.map(([x]) => exp(x!));
  expect(firstDifference(throughKernels('exponential', lists), plain)).toBeNull();
});

test('log at every step of its exponent and next to it: the same bits', () => {
  const roots = Array.from({ length: 2097 }, (_, i) => i - 1074).map((n) =>
    n < -1000 ? Math.SQRT1_2 * 2 ** 100 * 2 ** (n - 100) : Math.SQRT1_2 * 2 ** n,
  );
  const lists = roots.flatMap((root) => [-2, -1, 0, 1, 2].map((step) => [root * (1 + step * 2 ** -20)]));
  lists.push(...roots.flatMap((root) => [-2, -1, 0, 1, 2].map((step) => [root + step * lastPlace(root)])));
  const plain = lists.map(([x]) => log(x!));
  expect(firstDifference(throughKernels('logarithm', lists), plain)).toBeNull();
});
