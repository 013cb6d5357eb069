/** The fast interpreter against the plain one, bit for bit: everything that is not a program and not a draw. */
import fc from 'fast-check';
import { expect, test } from 'vitest';
import type { Interpreter } from '#built/program/interpreter.js';
import { blockLanes, columnStride } from '#built/program/program.js';
import { interpreterKinds } from './interpreters.js';
import { firstDifference, TestNumbers } from './special-numbers.js';

/** Lane counts of every remainder, the smallest and the largest more often. */
const lanesArbitrary = fc.oneof(
  fc.integer({ min: 1, max: blockLanes }),
  fc.constantFrom(1, 2, 3, 7, 8, 9, 63, 64, 65, 511, 512),
);
const runs = { numRuns: 250, seed: 20261204 };

/** Values over many orders of magnitude, so that any other order of a sum shows; now and then one that is not finite. */
function columnsOf(columnCount: number, numbers: TestNumbers): Float64Array {
  const isWild = numbers.below(4) === 0;
  return numbers.fill(new Float64Array(columnCount * columnStride), () =>
    isWild && numbers.below(900) === 0 ? numbers.mixed() : numbers.ordinary(),
  );
}

/** Does the same with both interpreters on the same columns; what each returned, and its columns afterwards. */
function both<T>(
  room: { readonly columnCount: number; readonly numberCount: number },
  numbers: TestNumbers,
  work: (interpreter: Interpreter) => T,
) {
  const start = columnsOf(room.columnCount, numbers);
  const [plain, fast] = interpreterKinds.map(([, makeInterpreter]) => {
    const interpreter = makeInterpreter({ ...room, programs: [] });
    interpreter.columns.set(start);
    return { result: work(interpreter), columns: interpreter.columns };
  });
  return { start, plain: plain!, fast: fast! };
}

/** Lanes in use of some columns, and all numbers of the columns before and after them. */
function expectSameColumns(
  plain: Float64Array,
  fast: Float64Array,
  firstTarget: number,
  targetCount: number,
  lanes: number,
) {
  const [start, end] = [firstTarget * columnStride, (firstTarget + targetCount) * columnStride];
  expect(firstDifference(plain.subarray(0, start), fast.subarray(0, start))).toBeNull();
  expect(firstDifference(plain.subarray(end), fast.subarray(end))).toBeNull();
  for (let at = start; at < end; at += columnStride)
    expect(firstDifference(plain.subarray(at, at + lanes), fast.subarray(at, at + lanes))).toBeNull();
}

test('combine, one to seven targets, any count of columns, coefficients of 0 and -0 among them', () => {
  fc.assert(
    fc.property(
      lanesArbitrary,
      fc.integer({ min: 1, max: 23 }),
      fc.integer({ min: 1, max: 7 }),
      fc.nat(3),
      fc.integer(),
      (lanes, count, targetCount, offset, seed) => {
        const numbers = new TestNumbers(seed);
        const coefficients = numbers.fill(new Float64Array(offset + count * targetCount + 2), () =>
          numbers.below(5) === 0 ? numbers.fraction() * 0 : numbers.ordinary(),
        );
        const room = { columnCount: 1 + count + targetCount + 1, numberCount: count * targetCount };
        const { plain, fast } = both(room, numbers, (interpreter) =>
          interpreter.combine(1, count, coefficients, offset, 1 + count, targetCount, lanes),
        );
        expectSameColumns(plain.columns, fast.columns, 1 + count, targetCount, lanes);
      },
    ),
    runs,
  );
});

test('addProducts with both signs', () => {
  fc.assert(
    fc.property(lanesArbitrary, fc.nat(9), fc.constantFrom<1 | -1>(1, -1), fc.integer(), (lanes, count, sign, seed) => {
      const target = 1 + 2 * count;
      const room = { columnCount: target + 2, numberCount: 0 };
      const { plain, fast } = both(room, new TestNumbers(seed), (interpreter) =>
        interpreter.addProducts(1, 1 + count, count, sign, target, lanes),
      );
      expectSameColumns(plain.columns, fast.columns, target, 1, lanes);
    }),
    runs,
  );
});

test('Gram matrices of 1 to 23 columns, in a room with no number to spare', () => {
  fc.assert(
    fc.property(lanesArbitrary, fc.integer({ min: 1, max: 23 }), fc.integer(), (lanes, count, seed) => {
      const numbers = new TestNumbers(seed);
      const length = (count * (count + 1)) / 2;
      const sums = numbers.fill(new Float64Array(length), () => numbers.ordinary());
      const room = { columnCount: count + 2, numberCount: length };
      const { start, plain, fast } = both(room, numbers, (interpreter) => {
        const own = sums.slice();
        interpreter.accumulateGram(1, count, lanes, own);
        return own;
      });
      expect(firstDifference(plain.result, fast.result)).toBeNull();
      expect(firstDifference(start, fast.columns)).toBeNull();
    }),
    runs,
  );
});

test('products with one to nine responses, in a room with no number to spare', () => {
  fc.assert(
    fc.property(
      lanesArbitrary,
      fc.integer({ min: 1, max: 23 }),
      fc.integer({ min: 1, max: 9 }),
      fc.integer(),
      (lanes, count, responseCount, seed) => {
        const numbers = new TestNumbers(seed);
        const sums = numbers.fill(new Float64Array(count * responseCount), () => numbers.ordinary());
        const room = { columnCount: count + responseCount + 2, numberCount: sums.length };
        const { start, plain, fast } = both(room, numbers, (interpreter) => {
          const own = sums.slice();
          interpreter.accumulateProducts(1, count, 1 + count, responseCount, lanes, own);
          return own;
        });
        expect(firstDifference(plain.result, fast.result)).toBeNull();
        expect(firstDifference(start, fast.columns)).toBeNull();
      },
    ),
    runs,
  );
});

test('sums and moments of a column, for every lane count', () => {
  const numbers = new TestNumbers(5);
  const room = { columnCount: 3, numberCount: 0 };
  for (let lanes = 1; lanes <= blockLanes; lanes++) {
    const { plain, fast } = both(room, numbers, (interpreter) => {
      const { count, mean, squares } = interpreter.moments(1, lanes);
      return [interpreter.sum(1, lanes), count, mean, squares];
    });
    expect(firstDifference(plain.result, fast.result)).toBeNull();
  }
});

test('areBetween, wherever the one value that is not stands', () => {
  const limits = [Number.NEGATIVE_INFINITY, -1, 0];
  fc.assert(
    fc.property(
      lanesArbitrary,
      fc.integer({ min: 1, max: 5 }),
      fc.constantFrom(...limits),
      fc.nat(),
      fc.integer(),
      (lanes, count, lowest, place, seed) => {
        const numbers = new TestNumbers(seed);
        const room = { columnCount: count + 2, numberCount: 0 };
        const bad = numbers.mixed();
        const at = (1 + (place % count)) * columnStride + (numbers.below(3) === 0 ? lanes : numbers.below(lanes));
        const { plain, fast } = both(room, numbers, ({ columns, areBetween }) => {
          for (let i = 0; i < columns.length; i++) columns[i] = 1 + Math.abs(columns[i]!);
          columns[at] = bad;
          return areBetween(1, count, lowest, lanes);
        });
        const isInUse = at % columnStride < lanes;
        const isBetween = bad > lowest && bad < Number.POSITIVE_INFINITY;
        expect(fast.result).toBe(plain.result);
        if (isInUse && !isBetween) expect(fast.result).toBe(false);
      },
    ),
    { ...runs, numRuns: 1000 },
  );
});

test('copy', () => {
  const { plain, fast } = both({ columnCount: 9, numberCount: 0 }, new TestNumbers(6), (interpreter) =>
    interpreter.copy(1, 4, 3),
  );
  expect(firstDifference(plain.columns, fast.columns)).toBeNull();
});

test('control: one running sum in place of two, or one last bit, is seen', () => {
  const numbers = new TestNumbers(7);
  const values = numbers.fill(new Float64Array(100 * columnStride), () => numbers.ordinary());
  const [plain, fast] = interpreterKinds.map(([, makeInterpreter]) => {
    const { columns, sum } = makeInterpreter({ columnCount: 100, programs: [], numberCount: 0 });
    columns.set(values);
    return Float64Array.from({ length: 100 }, (_, column) => sum(column, blockLanes));
  });
  expect(firstDifference(plain!, fast!)).toBeNull();
  const inOne = plain!.map((_, column) =>
    values.subarray(column * columnStride, column * columnStride + blockLanes).reduce((sum, x) => sum + x),
  );
  expect(inOne.filter((sum, column) => sum !== fast![column]).length).toBeGreaterThan(50);
  new BigUint64Array(fast!.buffer)[99]! ^= 1n;
  expect(firstDifference(plain!, fast!)).toMatch('at 99');
});
