/**
 * The random streams of `../stream.ts`, four lanes at a time: word for word the same generator, the four strands side by
 * side in one vector; and their map to standard normals, the quantile of `../elementary.ts`.
 */
import { constant, far, middle, Named, number, outer } from './constants';
import { ordinaryLogarithm } from './elementary';
import { columnBytes } from './workspace';

const strandCount = 4;

/** Starting states, word after word, each of the four strands. */
const states = memory.data(64, 16);

/** Philox 4×32 with ten rounds; word w of the result goes to `to` + 16 w. */
function philox(keyLow: u32, keyHigh: u32, c0: u32, c1: u32, c2: u32, c3: u32, to: usize): void {
  for (let round = 0; round < 10; round++) {
    const product0 = <u64>0xd2511f53 * <u64>c0;
    const product1 = <u64>0xcd9e8d57 * <u64>c2;
    c0 = <u32>(product1 >> 32) ^ c1 ^ keyLow;
    c2 = <u32>(product0 >> 32) ^ c3 ^ keyHigh;
    c1 = <u32>product1;
    c3 = <u32>product0;
    keyLow += 0x9e3779b9;
    keyHigh += 0xbb67ae85;
  }
  store<u32>(to, c0);
  store<u32>(to, c1, 16);
  store<u32>(to, c2, 32);
  store<u32>(to, c3, 48);
}

// @ts-ignore: decorator
@inline
function rotated(x: v128, by: i32): v128 {
  return v128.or(i32x4.shl(x, by), i32x4.shr_u(x, 32 - by));
}

/** Writes the uniforms of one stream to a column. */
function drawUniforms(keyLow: u32, keyHigh: u32, block: u32, date: u32, replicate: u32, to: usize, end: usize): void {
  for (let strand = 0; strand < strandCount; strand++) {
    const place = states + (<usize>strand << 2);
    philox(keyLow, keyHigh, block, date, replicate, strand, place);
    if ((load<u32>(place) | load<u32>(place, 16) | load<u32>(place, 32) | load<u32>(place, 48)) == 0)
      store<u32>(place, 1);
  }
  let s0 = v128.load(states);
  let s1 = v128.load(states, 16);
  let s2 = v128.load(states, 32);
  let s3 = v128.load(states, 48);
  // The doubles from 1 to 2 take k 2^-52 as their bits; 1 less half a step is then taken off, without rounding.
  const oneBits = i32x4.splat(0x3ff00000);
  const offset = f64x2.splat(0.9999999999999998889776975);
  for (; to < end; to += 32) {
    const upper = i32x4.add(rotated(i32x4.add(s0, s3), 7), s0);
    let shifted = i32x4.shl(s1, 9);
    s2 = v128.xor(s2, s0);
    s3 = v128.xor(s3, s1);
    s1 = v128.xor(s1, s2);
    s0 = v128.xor(s0, s3);
    s2 = v128.xor(s2, shifted);
    s3 = rotated(s3, 11);
    const lower = i32x4.add(rotated(i32x4.add(s0, s3), 7), s0);
    shifted = i32x4.shl(s1, 9);
    s2 = v128.xor(s2, s0);
    s3 = v128.xor(s3, s1);
    s1 = v128.xor(s1, s2);
    s0 = v128.xor(s0, s3);
    s2 = v128.xor(s2, shifted);
    s3 = rotated(s3, 11);
    const highWords = v128.or(i32x4.shr_u(upper, 12), oneBits);
    const lowWords = v128.or(i32x4.shl(i32x4.shr_u(upper, 6), 26), i32x4.shr_u(lower, 6));
    v128.store(to, f64x2.sub(v128.shuffle<i32>(lowWords, highWords, 0, 4, 1, 5), offset));
    v128.store(to, f64x2.sub(v128.shuffle<i32>(lowWords, highWords, 2, 6, 3, 7), offset), 16);
  }
}

/** Where in the column the lanes of the tails stand, as distances in bytes. */
const tailList = memory.data(528 * 4, 16);

/** Writes standard normals to columns, each from the stream of its own key; `uniforms` is a column to work in. */
export function drawNormals(
  keys: usize,
  count: i32,
  block: u32,
  date: u32,
  replicate: u32,
  uniforms: usize,
  to: usize,
  length: usize,
): void {
  for (let column = 0; column < count; column++, keys += 8, to += columnBytes) {
    drawUniforms(load<u32>(keys), load<u32>(keys, 4), block, date, replicate, uniforms, uniforms + length);
    const tailEnd = writeMiddle(uniforms, to, length);
    writeTails(uniforms, to, tailEnd);
  }
}

/** Writes uniforms to columns, each from the stream of its own key. */
export function drawUniformColumns(
  keys: usize,
  count: i32,
  block: u32,
  date: u32,
  replicate: u32,
  to: usize,
  length: usize,
): void {
  for (let column = 0; column < count; column++, keys += 8, to += columnBytes)
    drawUniforms(load<u32>(keys), load<u32>(keys, 4), block, date, replicate, to, to + length);
}

/** Writes one point of a lattice as standard normals, shifted by columns of uniforms; `uniforms` is a column to work in. */
export function latticeNormals(
  shifts: usize,
  offsets: usize,
  count: i32,
  uniforms: usize,
  to: usize,
  length: usize,
): void {
  for (let column = 0; column < count; column++, offsets += 8, shifts += columnBytes, to += columnBytes) {
    writeFolded(shifts, f64x2.splat(load<f64>(offsets) - 1), uniforms, length);
    const tailEnd = writeMiddle(uniforms, to, length);
    writeTails(uniforms, to, tailEnd);
  }
}

/** Shifts and folds a coordinate, as `../lattice-uniform.ts` says. */
function writeFolded(shifts: usize, offset: v128, to: usize, length: usize): void {
  const one = number(Named.one);
  for (let at: usize = 0; at < length; at += 32) {
    const x = f64x2.add(v128.load(shifts + at), offset);
    const y = f64x2.add(v128.load(shifts + at, 16), offset);
    const xFold = f64x2.abs(f64x2.sub(f64x2.abs(f64x2.add(x, x)), one));
    const yFold = f64x2.abs(f64x2.sub(f64x2.abs(f64x2.add(y, y)), one));
    v128.store(to + at, f64x2.sub(one, xFold));
    v128.store(to + at, f64x2.sub(one, yFold), 16);
  }
}

/** Writes the quantiles as if all lay in the middle, and lists those that do not; returns the end of the list. */
function writeMiddle(uniforms: usize, to: usize, length: usize): usize {
  let listed = tailList;
  for (let at: usize = 0; at < length; at += 32) {
    const half = number(Named.half);
    const x = f64x2.sub(v128.load(uniforms + at), half);
    const y = f64x2.sub(v128.load(uniforms + at, 16), half);
    const limit = number(Named.middleLimit);
    const beyond =
      i64x2.bitmask(f64x2.gt(f64x2.abs(x), limit)) | (i64x2.bitmask(f64x2.gt(f64x2.abs(y), limit)) << 2);
    store<u32>(listed, <u32>at);
    listed += (beyond & 1) << 2;
    store<u32>(listed, <u32>at + 8);
    listed += (beyond & 2) << 1;
    store<u32>(listed, <u32>at + 16);
    listed += beyond & 4;
    store<u32>(listed, <u32>at + 24);
    listed += (beyond & 8) >> 1;
    const square = number(Named.middleSquare);
    const xW = f64x2.sub(square, f64x2.mul(x, x));
    const yW = f64x2.sub(square, f64x2.mul(y, y));
    const xW2 = f64x2.mul(xW, xW);
    const yW2 = f64x2.mul(yW, yW);
    let c = constant(middle, 6);
    let xEven = f64x2.mul(xW2, c);
    let yEven = f64x2.mul(yW2, c);
    c = constant(middle, 7);
    let xOdd = f64x2.mul(xW2, c);
    let yOdd = f64x2.mul(yW2, c);
    c = constant(middle, 4);
    xEven = f64x2.mul(xW2, f64x2.add(c, xEven));
    yEven = f64x2.mul(yW2, f64x2.add(c, yEven));
    c = constant(middle, 5);
    xOdd = f64x2.mul(xW2, f64x2.add(c, xOdd));
    yOdd = f64x2.mul(yW2, f64x2.add(c, yOdd));
    c = constant(middle, 2);
    xEven = f64x2.mul(xW2, f64x2.add(c, xEven));
    yEven = f64x2.mul(yW2, f64x2.add(c, yEven));
    c = constant(middle, 3);
    xOdd = f64x2.mul(xW2, f64x2.add(c, xOdd));
    yOdd = f64x2.mul(yW2, f64x2.add(c, yOdd));
    c = constant(middle, 0);
    xEven = f64x2.add(c, xEven);
    yEven = f64x2.add(c, yEven);
    c = constant(middle, 1);
    const xAbove = f64x2.add(xEven, f64x2.mul(xW, f64x2.add(c, xOdd)));
    const yAbove = f64x2.add(yEven, f64x2.mul(yW, f64x2.add(c, yOdd)));
    c = constant(middle, 14);
    xEven = f64x2.mul(xW2, c);
    yEven = f64x2.mul(yW2, c);
    c = constant(middle, 15);
    xOdd = f64x2.mul(xW2, c);
    yOdd = f64x2.mul(yW2, c);
    c = constant(middle, 12);
    xEven = f64x2.mul(xW2, f64x2.add(c, xEven));
    yEven = f64x2.mul(yW2, f64x2.add(c, yEven));
    c = constant(middle, 13);
    xOdd = f64x2.mul(xW2, f64x2.add(c, xOdd));
    yOdd = f64x2.mul(yW2, f64x2.add(c, yOdd));
    c = constant(middle, 10);
    xEven = f64x2.mul(xW2, f64x2.add(c, xEven));
    yEven = f64x2.mul(yW2, f64x2.add(c, yEven));
    c = constant(middle, 11);
    xOdd = f64x2.mul(xW2, f64x2.add(c, xOdd));
    yOdd = f64x2.mul(yW2, f64x2.add(c, yOdd));
    c = constant(middle, 8);
    xEven = f64x2.add(c, xEven);
    yEven = f64x2.add(c, yEven);
    c = constant(middle, 9);
    const xBelow = f64x2.add(xEven, f64x2.mul(xW, f64x2.add(c, xOdd)));
    const yBelow = f64x2.add(yEven, f64x2.mul(yW, f64x2.add(c, yOdd)));
    v128.store(to + at, f64x2.mul(x, f64x2.div(xAbove, xBelow)));
    v128.store(to + at, f64x2.mul(y, f64x2.div(yAbove, yBelow)), 16);
  }
  return listed;
}

/** Writes the quantiles of the listed lanes, two at a time; a last single one is taken twice. */
function writeTails(uniforms: usize, to: usize, tailEnd: usize): void {
  store<u32>(tailEnd, load<u32>(tailEnd - 4));
  for (let listed = tailList; listed < tailEnd; listed += 8) {
    const first = <usize>load<u32>(listed);
    const second = <usize>load<u32>(listed, 4);
    const p = v128.load64_lane(uniforms + second, f64x2.splat(load<f64>(uniforms + first)), 1);
    const mirrored = f64x2.sub(number(Named.one), p);
    const smaller = f64x2.pmin(p, mirrored);
    const root = f64x2.sqrt(f64x2.neg(ordinaryLogarithm(smaller, f64x2.splat(0))));
    let size: v128;
    if (v128.any_true(f64x2.gt(root, f64x2.splat(5)))) {
      const isFar = f64x2.gt(root, f64x2.splat(5));
      const farSize = ratioOf(far, f64x2.sub(root, f64x2.splat(5)));
      size = v128.bitselect(farSize, ratioOf(outer, f64x2.sub(root, number(Named.outerShift))), isFar);
    } else size = ratioOf(outer, f64x2.sub(root, number(Named.outerShift)));
    // The sign bit of p - 1/2.
    const sign = v128.and(f64x2.sub(p, number(Named.half)), f64x2.splat(-0.0));
    const result = v128.xor(size, sign);
    v128.store64_lane(to + first, result, 0);
    v128.store64_lane(to + second, result, 1);
  }
}

/** Numerator / denominator of the quantile's outer parts. */
// @ts-ignore: decorator
@inline
function ratioOf(table: usize, w: v128): v128 {
  const w2 = f64x2.mul(w, w);
  return f64x2.div(sevenPowers(table, 0, w, w2), sevenPowers(table, 8, w, w2));
}

// @ts-ignore: decorator
@inline
function sevenPowers(table: usize, first: i32, w: v128, w2: v128): v128 {
  let even = f64x2.mul(w2, constant(table, first + 6));
  let odd = f64x2.mul(w2, constant(table, first + 7));
  even = f64x2.mul(w2, f64x2.add(constant(table, first + 4), even));
  odd = f64x2.mul(w2, f64x2.add(constant(table, first + 5), odd));
  even = f64x2.mul(w2, f64x2.add(constant(table, first + 2), even));
  odd = f64x2.mul(w2, f64x2.add(constant(table, first + 3), odd));
  even = f64x2.add(constant(table, first), even);
  odd = f64x2.add(constant(table, first + 1), odd);
  return f64x2.add(even, f64x2.mul(w, odd));
}
