import { expect, test } from 'vitest';
import { type Purpose, streamKeys } from '#built/paths/stream-keys.js';
import { drawUniforms, philox, type StreamKey } from '#built/program/stream.js';

const hex = (words: Uint32Array) => [...words].map((word) => word.toString(16).padStart(8, '0')).join(' ');

// Known answers published with the generator (Salmon et al. 2011, the authors' test vectors); written from memory.
test.each([
  [[0, 0], [0, 0, 0, 0], '6627e8d5 e169c58d bc57ac4c 9b00dbd8'],
  [[0xffffffff, 0xffffffff], [0xffffffff, 0xffffffff, 0xffffffff, 0xffffffff], '408f276d 41c83b0e a20bc7c6 6d5451fd'],
  [[0xa4093822, 0x299f31d0], [0x243f6a88, 0x85a308d3, 0x13198a2e, 0x03707344], 'd16cfe09 94fdcceb 5001e420 24126ea1'],
])('Philox with key %j and counter %j', ([low, high], [c0, c1, c2, c3], expected) => {
  const words = new Uint32Array(4);
  philox({ low: low!, high: high! }, c0!, c1!, c2!, c3!, words);
  expect(hex(words)).toBe(expected);
});

/** xoshiro128++ written a second time, with big integers, from the authors' description. */
function* xoshiro(state: bigint[]): Generator<bigint> {
  const mask = 0xffffffffn;
  const rotate = (x: bigint, k: bigint) => ((x << k) | (x >> (32n - k))) & mask;
  for (;;) {
    yield (rotate((state[0]! + state[3]!) & mask, 7n) + state[0]!) & mask;
    const shifted = (state[1]! << 9n) & mask;
    state[2]! ^= state[0]!;
    state[3]! ^= state[1]!;
    state[1]! ^= state[2]!;
    state[0]! ^= state[3]!;
    state[2]! ^= shifted;
    state[3] = rotate(state[3]!, 11n);
  }
}

test('the second writing of xoshiro128++ gives the published first numbers', () => {
  // From state 1, 2, 3, 4; printed in the tests of a public implementation, written from memory.
  const generator = xoshiro([1n, 2n, 3n, 4n]);
  const numbers = Array.from({ length: 5 }, () => Number(generator.next().value));
  expect(numbers).toEqual([641, 1573767, 3222811527, 3517856514, 836907274]);
});

test('lane i runs on strand i mod 4, two words for each uniform', () => {
  const key: StreamKey = { low: 11, high: 22 };
  const out = new Float64Array(40);
  drawUniforms(key, 5, 6, 7, out, 1, 37);
  const words = new Uint32Array(4);
  for (let strand = 0; strand < 4; strand++) {
    philox(key, 5, 6, 7, strand, words);
    const generator = xoshiro([...words].map(BigInt));
    for (let lane = strand; lane < 37; lane += 4) {
      const upper = Number(generator.next().value as bigint) >>> 6;
      const lower = Number(generator.next().value as bigint) >>> 6;
      expect(out[1 + lane]).toBe((upper * 2 ** 26 + lower + 0.5) * 2 ** -52);
    }
  }
  expect(out[0]).toBe(0);
  expect(out[38]).toBe(0);
});

/** Draws of many neighbouring streams in one array. */
function neighbours(streamCount: number, place: (i: number) => [StreamKey, number, number, number]): Float64Array {
  const out = new Float64Array(streamCount * 512);
  for (let i = 0; i < streamCount; i++) {
    const [key, block, date, replicate] = place(i);
    drawUniforms(key, block, date, replicate, out, i * 512, 512);
  }
  return out;
}

const places: [string, (i: number) => [StreamKey, number, number, number]][] = [
  ['blocks', (i) => [{ low: 1, high: 2 }, i, 0, 0]],
  ['dates', (i) => [{ low: 1, high: 2 }, 0, i, 0]],
  ['replicates', (i) => [{ low: 1, high: 2 }, 0, 0, i]],
  ['keys', (i) => [{ low: i, high: 2 }, 0, 0, 0]],
];

/** Largest standardised error over the moments of centred uniforms to order 8, and lag products across streams. */
function worstStandardError(draws: Float64Array): number {
  const centred = draws.map((u) => u - 0.5);
  const count = centred.length;
  const errors: number[] = [];
  for (let order = 1; order <= 8; order++) {
    const moment = (n: number) => (n % 2 === 1 ? 0 : 0.5 ** n / (n + 1));
    const mean = centred.reduce((sum, x) => sum + x ** order, 0) / count;
    errors.push(Math.abs(mean - moment(order)) / Math.sqrt((moment(2 * order) - moment(order) ** 2) / count));
  }
  for (const lag of [1, 4, 512]) {
    let sum = 0;
    for (let i = 0; i + lag < count; i++) sum += centred[i]! * centred[i + lag]!;
    errors.push(Math.abs(sum) / ((1 / 12) * Math.sqrt(count - lag)));
  }
  return Math.max(...errors);
}

// Eleven standardised errors within 4.5: one false alarm in 13,000 for each row, and the seeds are fixed.
test.each(places)('streams of neighbouring %s have the moments of uniforms and no correlation', (_, place) => {
  expect(worstStandardError(neighbours(400, place))).toBeLessThan(4.5);
});

test('the same check catches a stream that is used twice and one that is off by a hair', () => {
  const draws = neighbours(400, places[0]![1]);
  const repeated = draws.slice();
  repeated.copyWithin(512, 0, 512 * 40);
  for (let i = 1; i < 400; i += 2) repeated.copyWithin(i * 512, (i - 1) * 512, i * 512);
  expect(worstStandardError(repeated)).toBeGreaterThan(10);
  expect(worstStandardError(draws.map((u) => u * 0.99))).toBeGreaterThan(4.5);
});

const purposes: Purpose[] = ['fit', 'pilot', 'pilot inner', 'outer', 'inner', 'nested outer', 'nested inner'];
const names = Array.from({ length: 20 }, (_, i) => `lot[${i + 1}]`);

/** Count of different starting states over blocks, dates, replicates and strands of some keys; by their first 64 bits. */
function differentStates(keys: Int32Array): { count: number; of: number } {
  const [blockCount, dateCount, replicateCount, strandCount] = [16, 14, 8, 4];
  const states = new BigUint64Array((keys.length / 2) * blockCount * dateCount * replicateCount * strandCount);
  const words = new Uint32Array(4);
  const firstBits = new BigUint64Array(words.buffer, 0, 1);
  let at = 0;
  for (let key = 0; key < keys.length; key += 2)
    for (let block = 0; block < blockCount; block++)
      for (let date = 0; date < dateCount; date++)
        for (let replicate = 0; replicate < replicateCount; replicate++)
          for (let strand = 0; strand < strandCount; strand++) {
            philox({ low: keys[key]!, high: keys[key + 1]! }, block, date, replicate, strand, words);
            states[at++] = firstBits[0]!;
          }
  states.sort();
  return { count: states.filter((state, i) => state !== states[i - 1]).length, of: states.length };
}

// Among a million random numbers of 64 bits two are equal once in 37 million times.
test('no starting state repeats over a million strands of all purposes and twenty names', () => {
  const keys = Int32Array.from(purposes.flatMap((purpose) => [...streamKeys('oak', purpose, names)]));
  const { count, of } = differentStates(keys);
  expect(of).toBeGreaterThan(1_000_000);
  expect(count).toBe(of);
});

test('control: a name that is used twice repeats states', () => {
  const { count, of } = differentStates(streamKeys('oak', 'fit', ['lot[1]', 'lot[2]', 'lot[1]']));
  expect(count).toBe((of * 2) / 3);
});
