/**
 * Sums over lanes and over columns. Every sum over lanes is kept as two, of the even and of the odd lanes, and ends as
 * the first plus the second: one vector holds both.
 */

import { columnBytes } from './workspace';

// @ts-ignore: decorator
@inline
function total(sums: v128): f64 {
  return f64x2.extract_lane(sums, 0) + f64x2.extract_lane(sums, 1);
}

/**
 * Σ over lanes of the products of four neighbouring columns with two others, written to `to`: four with the first, then
 * four with the second. Eight running vectors are as many as the registers hold beside their operands; the distance
 * between columns is a constant, so that one address serves four loads.
 */
function productTile(columns: usize, first: usize, second: usize, wholeLength: usize, isOdd: bool, to: usize): void {
  let s0 = f64x2.splat(0);
  let s1 = s0;
  let s2 = s0;
  let s3 = s0;
  let t0 = s0;
  let t1 = s0;
  let t2 = s0;
  let t3 = s0;
  const end = columns + wholeLength;
  for (; columns < end; columns += 16, first += 16, second += 16) {
    const x = v128.load(first);
    const y = v128.load(second);
    let z = v128.load(columns);
    s0 = f64x2.add(s0, f64x2.mul(x, z));
    t0 = f64x2.add(t0, f64x2.mul(y, z));
    z = v128.load(columns, columnBytes);
    s1 = f64x2.add(s1, f64x2.mul(x, z));
    t1 = f64x2.add(t1, f64x2.mul(y, z));
    z = v128.load(columns, 2 * columnBytes);
    s2 = f64x2.add(s2, f64x2.mul(x, z));
    t2 = f64x2.add(t2, f64x2.mul(y, z));
    z = v128.load(columns, 3 * columnBytes);
    s3 = f64x2.add(s3, f64x2.mul(x, z));
    t3 = f64x2.add(t3, f64x2.mul(y, z));
  }
  if (isOdd) {
    const x = v128.load64_zero(first);
    const y = v128.load64_zero(second);
    let z = v128.load64_zero(columns);
    s0 = f64x2.add(s0, f64x2.mul(x, z));
    t0 = f64x2.add(t0, f64x2.mul(y, z));
    z = v128.load64_zero(columns, columnBytes);
    s1 = f64x2.add(s1, f64x2.mul(x, z));
    t1 = f64x2.add(t1, f64x2.mul(y, z));
    z = v128.load64_zero(columns, 2 * columnBytes);
    s2 = f64x2.add(s2, f64x2.mul(x, z));
    t2 = f64x2.add(t2, f64x2.mul(y, z));
    z = v128.load64_zero(columns, 3 * columnBytes);
    s3 = f64x2.add(s3, f64x2.mul(x, z));
    t3 = f64x2.add(t3, f64x2.mul(y, z));
  }
  store<f64>(to, total(s0));
  store<f64>(to, total(s1), 8);
  store<f64>(to, total(s2), 16);
  store<f64>(to, total(s3), 24);
  store<f64>(to, total(t0), 32);
  store<f64>(to, total(t1), 40);
  store<f64>(to, total(t2), 48);
  store<f64>(to, total(t3), 56);
}

const tile = memory.data(64, 16);

/**
 * Writes Σ column × response for `count` columns and `responseCount` responses, responses by rows; of a `triangle`, whose
 * responses are the columns themselves, only the columns up to the row's own, closely packed.
 *
 * Tiles reach up to three columns and one response beyond the last; what they find there is not kept.
 */
export function sumProducts(
  columns: usize,
  count: i32,
  responses: usize,
  responseCount: i32,
  triangle: bool,
  lanes: i32,
  to: usize,
): void {
  const wholeLength = <usize>(lanes & ~1) << 3;
  const isOdd = (lanes & 1) != 0;
  for (let row = 0; row < responseCount; row += 2) {
    const first = responses + <usize>row * columnBytes;
    const firstCount = triangle ? row + 1 : count;
    const secondCount = row + 1 < responseCount ? (triangle ? row + 2 : count) : 0;
    const secondTo = to + (<usize>firstCount << 3);
    const widest = max(firstCount, secondCount);
    for (let column = 0; column < widest; column += 4) {
      productTile(columns + <usize>column * columnBytes, first, first + columnBytes, wholeLength, isOdd, tile);
      keep(tile, to, column, firstCount);
      keep(tile + 32, secondTo, column, secondCount);
    }
    to = secondTo + (<usize>secondCount << 3);
  }
}

/** Copies four sums to their places from `column` on, as far as the row goes. */
// @ts-ignore: decorator
@inline
function keep(sums: usize, row: usize, column: i32, count: i32): void {
  const kept = min(4, count - column);
  for (let i = 0; i < kept; i++) store<f64>(row + (<usize>(column + i) << 3), load<f64>(sums + (<usize>i << 3)));
}

/** Writes Σ coefficient × column to each target; coefficients by targets. Lanes go eight at a time, targets in pairs. */
export function combine(
  columns: usize,
  count: i32,
  coefficients: usize,
  targets: usize,
  targetCount: i32,
  length: usize,
): void {
  const coefficientBytes = <usize>count << 3;
  let target = 0;
  for (; target + 1 < targetCount; target += 2) {
    const to = targets + <usize>target * columnBytes;
    const first = coefficients + <usize>target * coefficientBytes;
    for (let at: usize = 0; at < length; at += 64) {
      let s0 = f64x2.splat(0);
      let s1 = s0;
      let s2 = s0;
      let s3 = s0;
      let t0 = s0;
      let t1 = s0;
      let t2 = s0;
      let t3 = s0;
      let from = columns + at;
      const end = first + coefficientBytes;
      for (let coefficient = first; coefficient < end; coefficient += 8, from += columnBytes) {
        const f = v128.load64_splat(coefficient);
        const g = v128.load64_splat(coefficient + coefficientBytes);
        let x = v128.load(from);
        s0 = f64x2.add(s0, f64x2.mul(f, x));
        t0 = f64x2.add(t0, f64x2.mul(g, x));
        x = v128.load(from, 16);
        s1 = f64x2.add(s1, f64x2.mul(f, x));
        t1 = f64x2.add(t1, f64x2.mul(g, x));
        x = v128.load(from, 32);
        s2 = f64x2.add(s2, f64x2.mul(f, x));
        t2 = f64x2.add(t2, f64x2.mul(g, x));
        x = v128.load(from, 48);
        s3 = f64x2.add(s3, f64x2.mul(f, x));
        t3 = f64x2.add(t3, f64x2.mul(g, x));
      }
      v128.store(to + at, s0);
      v128.store(to + at, s1, 16);
      v128.store(to + at, s2, 32);
      v128.store(to + at, s3, 48);
      v128.store(to + at + columnBytes, t0);
      v128.store(to + at + columnBytes, t1, 16);
      v128.store(to + at + columnBytes, t2, 32);
      v128.store(to + at + columnBytes, t3, 48);
    }
  }
  if (target < targetCount) {
    const to = targets + <usize>target * columnBytes;
    const first = coefficients + <usize>target * coefficientBytes;
    for (let at: usize = 0; at < length; at += 64) {
      let s0 = f64x2.splat(0);
      let s1 = s0;
      let s2 = s0;
      let s3 = s0;
      let from = columns + at;
      const end = first + coefficientBytes;
      for (let coefficient = first; coefficient < end; coefficient += 8, from += columnBytes) {
        const f = v128.load64_splat(coefficient);
        s0 = f64x2.add(s0, f64x2.mul(f, v128.load(from)));
        s1 = f64x2.add(s1, f64x2.mul(f, v128.load(from, 16)));
        s2 = f64x2.add(s2, f64x2.mul(f, v128.load(from, 32)));
        s3 = f64x2.add(s3, f64x2.mul(f, v128.load(from, 48)));
      }
      v128.store(to + at, s0);
      v128.store(to + at, s1, 16);
      v128.store(to + at, s2, 32);
      v128.store(to + at, s3, 48);
    }
  }
}

/** Adds to a target the products of `count` pairs of columns, one pair after the other, or takes them off. */
export function addProducts(
  left: usize,
  right: usize,
  count: i32,
  isNegative: bool,
  target: usize,
  length: usize,
): void {
  const signs = f64x2.splat(isNegative ? -0.0 : 0.0);
  const pairBytes = <usize>count * columnBytes;
  for (let at: usize = 0; at < length; at += 64) {
    let s0 = v128.load(target + at);
    let s1 = v128.load(target + at, 16);
    let s2 = v128.load(target + at, 32);
    let s3 = v128.load(target + at, 48);
    const end = left + at + pairBytes;
    for (let x = left + at, y = right + at; x < end; x += columnBytes, y += columnBytes) {
      s0 = f64x2.add(s0, v128.xor(signs, f64x2.mul(v128.load(x), v128.load(y))));
      s1 = f64x2.add(s1, v128.xor(signs, f64x2.mul(v128.load(x, 16), v128.load(y, 16))));
      s2 = f64x2.add(s2, v128.xor(signs, f64x2.mul(v128.load(x, 32), v128.load(y, 32))));
      s3 = f64x2.add(s3, v128.xor(signs, f64x2.mul(v128.load(x, 48), v128.load(y, 48))));
    }
    v128.store(target + at, s0);
    v128.store(target + at, s1, 16);
    v128.store(target + at, s2, 32);
    v128.store(target + at, s3, 48);
  }
}

/** Σ (value - center), or its squares. */
// @ts-ignore: decorator
@inline
function sumOf(column: usize, lanes: i32, center: v128, isSquared: bool): f64 {
  let sum = f64x2.splat(0);
  const end = column + (<usize>(lanes & ~1) << 3);
  let at = column;
  for (; at < end; at += 16) {
    const x = f64x2.sub(v128.load(at), center);
    sum = f64x2.add(sum, isSquared ? f64x2.mul(x, x) : x);
  }
  if (lanes & 1) {
    const x = f64x2.sub(v128.load64_zero(at), f64x2.replace_lane(center, 1, 0));
    sum = f64x2.add(sum, isSquared ? f64x2.mul(x, x) : x);
  }
  return total(sum);
}

/** Sum of a column over its lanes. */
export function sumColumn(column: usize, lanes: i32): f64 {
  return sumOf(column, lanes, f64x2.splat(0), false);
}

/** Sum of the squares of a column's distances from a center. */
export function sumSquares(column: usize, lanes: i32, center: f64): f64 {
  return sumOf(column, lanes, f64x2.splat(center), true);
}

/** Whether every value lies above `lowest` and below infinity. */
export function areBetween(columns: usize, count: i32, lowest: f64, lanes: i32): bool {
  const low = f64x2.splat(lowest);
  const high = f64x2.splat(Infinity);
  let isInside = i64x2.splat(-1);
  for (let column = 0; column < count; column++) {
    const start = columns + <usize>column * columnBytes;
    const end = start + (<usize>(lanes & ~1) << 3);
    let at = start;
    for (; at < end; at += 16) {
      const x = v128.load(at);
      isInside = v128.and(isInside, v128.and(f64x2.gt(x, low), f64x2.lt(x, high)));
    }
    if (lanes & 1) {
      const x = f64x2.splat(load<f64>(at));
      isInside = v128.and(isInside, v128.and(f64x2.gt(x, low), f64x2.lt(x, high)));
    }
  }
  return i64x2.all_true(isInside);
}
