/** Points of shifted lattices: the same bits in both interpreters, exact arithmetic, and the law of every single point. */
import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { normalQuantile } from '#built/program/elementary.js';
import type { InterpreterMaker } from '#built/program/interpreter.js';
import { latticeUniform } from '#built/program/lattice-uniform.js';
import { createPlainInterpreter } from '#built/program/plain-interpreter.js';
import { blockLanes, columnStride } from '#built/program/program.js';
import { drawUniforms } from '#built/program/stream.js';
import { limit } from '../statistics.js';
import { createWasmInterpreter, interpreterKinds, plainKeys } from './interpreters.js';
import { firstDifference, TestNumbers } from './special-numbers.js';

const step = 2 ** -53;

/** Shifts at the edges: beside 0, 1/2 and 1, and where a tent's tip or foot meets an offset of a quarter. */
const edgeShifts = [0, 0.25, 0.5, 0.75, 1].flatMap((x) => [-3, -1, 1, 3].map((k) => x + k * step)).filter(isShift);

const edgeOffsets = [0, 2 ** -52, 2 ** -11, 0.25, 0.5, 0.5 + 2 ** -52, 0.75, 1 - 2 ** -11, 1 - 2 ** -52];

function isShift(x: number): boolean {
  return x > 0 && x < 1;
}

/** A point from given shifts, one column for each offset, in a room with one column more on either side. */
function latticePoint(makeInterpreter: InterpreterMaker, shifts: Float64Array, offsets: Float64Array, lanes: number) {
  const count = offsets.length;
  const interpreter = makeInterpreter({ columnCount: 2 * count + 2, programs: [], numberCount: count });
  interpreter.columns.fill(-77);
  for (let i = 0; i < count; i++)
    interpreter.columns.set(shifts.subarray(i * lanes, (i + 1) * lanes), i * columnStride);
  interpreter.latticeNormals(0, offsets, count + 1, lanes);
  const column = (index: number) => interpreter.columns.subarray(index * columnStride, (index + 1) * columnStride);
  return {
    drawn: Array.from({ length: count }, (_, i) => column(count + 1 + i).slice(0, lanes)),
    beside: [...column(count), ...column(2 * count + 1)],
  };
}

/** (2 k + 1) 2^-53 for any k. */
const anyShift = fc
  .tuple(fc.nat(2 ** 26 - 1), fc.nat(2 ** 26 - 1))
  .map(([high, low]) => (high * 2 ** 26 + low + 0.5) * 2 ** -52);
const shift = fc.oneof(anyShift, fc.constantFrom(...edgeShifts));
const offset = fc.oneof(
  fc.nat(2047).map((k) => k / 2048),
  fc.nat(2 ** 31 - 1).map((k) => k * 2 ** -31),
  fc.constantFrom(...edgeOffsets),
);

describe('both interpreters', () => {
  test('any shifts and offsets, any lane count: the same bits, and the columns beside stay', () => {
    fc.assert(
      fc.property(
        fc.array(offset, { minLength: 1, maxLength: 5 }),
        fc.array(shift, { minLength: 40, maxLength: 40 }),
        fc.integer({ min: 1, max: blockLanes }),
        (offsets, someShifts, lanes) => {
          const shifts = Float64Array.from({ length: offsets.length * lanes }, (_, i) => someShifts[i % 40]!);
          const plain = latticePoint(createPlainInterpreter, shifts, Float64Array.from(offsets), lanes);
          const fast = latticePoint(createWasmInterpreter, shifts, Float64Array.from(offsets), lanes);
          plain.drawn.forEach((values, i) => {
            expect(firstDifference(values, fast.drawn[i]!)).toBeNull();
          });
          expect(fast.beside.every((value) => value === -77)).toBe(true);
        },
      ),
      { numRuns: 300, seed: 20261206 },
    );
  });

  test('every edge of a shift with every edge of an offset: finite, and what the formula says', () => {
    const shifts = Float64Array.from(edgeOffsets.flatMap(() => edgeShifts));
    for (const [, makeInterpreter] of interpreterKinds) {
      const { drawn } = latticePoint(makeInterpreter, shifts, Float64Array.from(edgeOffsets), edgeShifts.length);
      drawn.forEach((values, i) => {
        values.forEach((value, lane) => {
          expect(Number.isFinite(value)).toBe(true);
          expect(value).toBe(normalQuantile(latticeUniform(edgeShifts[lane]!, edgeOffsets[i]!)));
        });
      });
    }
  });

  test('uniforms are those of the stream, in both', () => {
    const keys = plainKeys(3, 5);
    for (const [, makeInterpreter] of interpreterKinds) {
      for (const lanes of [1, 5, 511, blockLanes]) {
        const interpreter = makeInterpreter({ columnCount: 5, programs: [], numberCount: 6 });
        interpreter.columns.fill(-77);
        interpreter.drawUniforms(keys, 9, 8, 7, 1, lanes);
        const expected = new Float64Array(lanes);
        for (let i = 0; i < 3; i++) {
          drawUniforms({ low: keys[2 * i]!, high: keys[2 * i + 1]! }, 9, 8, 7, expected, 0, lanes);
          const start = (1 + i) * columnStride;
          expect(firstDifference(interpreter.columns.subarray(start, start + lanes), expected)).toBeNull();
        }
        expect(interpreter.columns.subarray(0, columnStride).every((value) => value === -77)).toBe(true);
        expect(interpreter.columns.subarray(4 * columnStride).every((value) => value === -77)).toBe(true);
      }
    }
  });
});

/** The same coordinate in whole numbers, units of 2^-53. */
function exactly(shiftUnits: bigint, offsetUnits: bigint): bigint {
  const one = 1n << 53n;
  const place = (shiftUnits + offsetUnits) % one;
  const fold = 2n * place - one;
  return one - (fold < 0n ? -fold : fold);
}

test('the arithmetic is exact: whole numbers of any length give the same', () => {
  const numbers = new TestNumbers(5);
  const check = (s: number, o: number) => {
    const units = latticeUniform(s, o) / step;
    expect(BigInt(units)).toBe(exactly(BigInt(s / step), BigInt(o / step)));
    expect(units).toBeGreaterThan(0);
    expect(units).toBeLessThan(2 ** 53);
  };
  for (const s of edgeShifts) for (const o of edgeOffsets) check(s, o);
  for (let i = 0; i < 5000; i++) {
    const s = ((numbers.word() >>> 6) * 2 ** 26 + (numbers.word() >>> 6) + 0.5) * 2 ** -52;
    check(s, ((numbers.word() >>> 6) * 2 ** 26 + (numbers.word() >>> 6)) * 2 ** -52);
  }
});

const order = 6;

/** Standardised errors of the Hermite moments to order 6 of one point of the lattice, over 160,000 lanes. */
function momentErrors(offset: number, change = (x: number) => x): number[] {
  const interpreter = createWasmInterpreter({ columnCount: 2, programs: [], numberCount: 2 });
  const sums = new Array<number>(order).fill(0);
  const blockCount = 320;
  for (let block = 0; block < blockCount; block++) {
    interpreter.drawUniforms(Int32Array.of(3, 4), block, 1, 0, 0, blockLanes);
    interpreter.latticeNormals(0, Float64Array.of(offset), 1, blockLanes);
    for (const draw of interpreter.columns.subarray(columnStride, columnStride + blockLanes)) {
      const x = change(draw);
      let [before, now] = [0, 1];
      for (let n = 1; n <= order; n++) {
        [before, now] = [now, (x * now - Math.sqrt(n - 1) * before) / Math.sqrt(n)];
        sums[n - 1]! += now;
      }
    }
  }
  return sums.map((sum) => sum / Math.sqrt(blockCount * blockLanes));
}

// 30 errors within 3.6: one false alarm in 3,000 each, one in 100 in all; the seeds are fixed.
test.each([0, 0.5, 0.25, 0.8125, 1 / 2048])('the point at %d is standard normal over its shifts', (offset) => {
  for (const error of momentErrors(offset)) expect(Math.abs(error)).toBeLessThan(limit);
});

test('control: a scale wrong by 1%, a place wrong by 0.01 and cut tails are seen', () => {
  const worst = (change: (x: number) => number) => Math.max(...momentErrors(0.25, change).map(Math.abs));
  expect(worst((x) => 1.01 * x)).toBeGreaterThan(limit);
  expect(worst((x) => x + 0.01)).toBeGreaterThan(limit);
  expect(worst((x) => Math.max(-3.2, Math.min(3.2, x)))).toBeGreaterThan(limit);
});
