/**
 * The elementary functions on two doubles at a time: operation by operation those of `../elementary.ts`, which explains
 * and proves them. Where that one divides cases, these take the common case for a whole vector and leave the rest to
 * slower code with the same bits.
 *
 * Loops handle two vectors together: they share the loads of the constants, and while one waits for its operands the
 * other is computed.
 */
import { constant, exponential, logarithm, Named, number, tail } from './constants';

/** One double's worth of bits below the exponent. */
const mantissaBits = 52;
/** Bits of 1 less those of sqrt(1/2), high word only: the exponent then steps at sqrt(1/2). */
const stepAtRoot: i64 = <i64>(0x3ff00000 - 0x3fe6a09e) << 32;
/** Bits of 2^52: a small whole number among the lowest bits becomes 2^52 plus that number. */
const wholeBits: i64 = 0x4330000000000000;

/** exp(x) × factor for any x. */
export function exponentialTimes(x: v128, factor: v128): v128 {
  const bounded = f64x2.pmin(f64x2.pmax(x, number(Named.lowestExponent)), number(Named.highestExponent));
  const sum = f64x2.add(f64x2.mul(bounded, number(Named.oneOverLogOfTwo)), number(Named.rounder));
  const k = f64x2.sub(sum, number(Named.rounder));
  const high = f64x2.sub(bounded, f64x2.mul(k, number(Named.logOfTwoHigh)));
  const low = f64x2.mul(k, number(Named.logOfTwoLow));
  const r = f64x2.sub(high, low);
  const lost = f64x2.sub(f64x2.sub(high, r), low);
  const r2 = f64x2.mul(r, r);
  let even = f64x2.mul(r2, constant(exponential, 8));
  let odd = f64x2.mul(r2, constant(exponential, 9));
  even = f64x2.mul(r2, f64x2.add(constant(exponential, 6), even));
  odd = f64x2.mul(r2, f64x2.add(constant(exponential, 7), odd));
  even = f64x2.mul(r2, f64x2.add(constant(exponential, 4), even));
  odd = f64x2.mul(r2, f64x2.add(constant(exponential, 5), odd));
  even = f64x2.mul(r2, f64x2.add(constant(exponential, 2), even));
  odd = f64x2.mul(r2, f64x2.add(constant(exponential, 3), odd));
  even = f64x2.add(constant(exponential, 0), even);
  odd = f64x2.add(constant(exponential, 1), odd);
  const rest = f64x2.mul(r2, f64x2.add(even, f64x2.mul(r, odd)));
  const sumAboveOne = f64x2.add(r, f64x2.add(rest, lost));
  const mantissa = f64x2.mul(f64x2.add(number(Named.one), sumAboveOne), factor);
  const half = f64x2.floor(f64x2.mul(k, number(Named.half)));
  const placer = number(Named.exponentPlacer);
  const firstPower = i64x2.shl(f64x2.add(half, placer), mantissaBits);
  const secondPower = i64x2.shl(f64x2.add(f64x2.sub(k, half), placer), mantissaBits);
  return f64x2.mul(f64x2.mul(mantissa, firstPower), secondPower);
}

/** Writes the exponentials of a column. */
export function exponentialColumn(from: usize, to: usize, end: usize): void {
  for (; to < end; to += 32, from += 32) {
    const x = v128.load(from);
    const y = v128.load(from, 16);
    const limit = number(Named.ordinaryExponent);
    const isOrdinary = v128.and(f64x2.lt(f64x2.abs(x), limit), f64x2.lt(f64x2.abs(y), limit));
    if (!i64x2.all_true(isOrdinary)) {
      v128.store(to, exponentialTimes(x, number(Named.one)));
      v128.store(to, exponentialTimes(y, number(Named.one)), 16);
      continue;
    }
    const scale = number(Named.oneOverLogOfTwo);
    const rounder = number(Named.rounder);
    const xSum = f64x2.add(f64x2.mul(x, scale), rounder);
    const ySum = f64x2.add(f64x2.mul(y, scale), rounder);
    const xK = f64x2.sub(xSum, rounder);
    const yK = f64x2.sub(ySum, rounder);
    const logHigh = number(Named.logOfTwoHigh);
    const xHigh = f64x2.sub(x, f64x2.mul(xK, logHigh));
    const yHigh = f64x2.sub(y, f64x2.mul(yK, logHigh));
    const logLow = number(Named.logOfTwoLow);
    const xLow = f64x2.mul(xK, logLow);
    const yLow = f64x2.mul(yK, logLow);
    const xR = f64x2.sub(xHigh, xLow);
    const yR = f64x2.sub(yHigh, yLow);
    const xLost = f64x2.sub(f64x2.sub(xHigh, xR), xLow);
    const yLost = f64x2.sub(f64x2.sub(yHigh, yR), yLow);
    const xR2 = f64x2.mul(xR, xR);
    const yR2 = f64x2.mul(yR, yR);
    let c = constant(exponential, 8);
    let xEven = f64x2.mul(xR2, c);
    let yEven = f64x2.mul(yR2, c);
    c = constant(exponential, 9);
    let xOdd = f64x2.mul(xR2, c);
    let yOdd = f64x2.mul(yR2, c);
    c = constant(exponential, 6);
    xEven = f64x2.mul(xR2, f64x2.add(c, xEven));
    yEven = f64x2.mul(yR2, f64x2.add(c, yEven));
    c = constant(exponential, 7);
    xOdd = f64x2.mul(xR2, f64x2.add(c, xOdd));
    yOdd = f64x2.mul(yR2, f64x2.add(c, yOdd));
    c = constant(exponential, 4);
    xEven = f64x2.mul(xR2, f64x2.add(c, xEven));
    yEven = f64x2.mul(yR2, f64x2.add(c, yEven));
    c = constant(exponential, 5);
    xOdd = f64x2.mul(xR2, f64x2.add(c, xOdd));
    yOdd = f64x2.mul(yR2, f64x2.add(c, yOdd));
    c = constant(exponential, 2);
    xEven = f64x2.mul(xR2, f64x2.add(c, xEven));
    yEven = f64x2.mul(yR2, f64x2.add(c, yEven));
    c = constant(exponential, 3);
    xOdd = f64x2.mul(xR2, f64x2.add(c, xOdd));
    yOdd = f64x2.mul(yR2, f64x2.add(c, yOdd));
    c = constant(exponential, 0);
    xEven = f64x2.add(c, xEven);
    yEven = f64x2.add(c, yEven);
    c = constant(exponential, 1);
    xOdd = f64x2.add(c, xOdd);
    yOdd = f64x2.add(c, yOdd);
    const xRest = f64x2.mul(xR2, f64x2.add(xEven, f64x2.mul(xR, xOdd)));
    const yRest = f64x2.mul(yR2, f64x2.add(yEven, f64x2.mul(yR, yOdd)));
    const one = number(Named.one);
    const xMantissa = f64x2.add(one, f64x2.add(xR, f64x2.add(xRest, xLost)));
    const yMantissa = f64x2.add(one, f64x2.add(yR, f64x2.add(yRest, yLost)));
    v128.store(to, i64x2.add(xMantissa, i64x2.shl(xSum, mantissaBits)));
    v128.store(to, i64x2.add(yMantissa, i64x2.shl(ySum, mantissaBits)), 16);
  }
}

/** The logarithm of one number, special values included. */
export function logarithmOf(x: f64): f64 {
  if (!(x > 0 && x < Infinity)) return x == 0 ? -Infinity : x > 0 ? x : NaN;
  const isSubnormal = x < 2.2250738585072014e-308;
  const scaled = isSubnormal ? x * 18014398509481984.0 : x;
  const result = ordinaryLogarithm(f64x2.splat(scaled), isSubnormal ? f64x2.splat(54) : f64x2.splat(0));
  return f64x2.extract_lane(result, 0);
}

/** The logarithm of positive normal numbers, less `binades` × log 2. */
// @ts-ignore: decorator
@inline
export function ordinaryLogarithm(x: v128, binades: v128): v128 {
  const exponent = i64x2.shr_u(i64x2.add(x, i64x2.splat(stepAtRoot)), mantissaBits);
  const f = f64x2.sub(scaledDown(x, exponent), number(Named.one));
  const whole = f64x2.sub(v128.or(exponent, i64x2.splat(wholeBits)), number(Named.exponentPlacer));
  return logarithmFrom(f64x2.sub(whole, binades), f);
}

// @ts-ignore: decorator
@inline
function scaledDown(x: v128, exponent: v128): v128 {
  return i64x2.sub(x, i64x2.shl(i64x2.sub(exponent, i64x2.splat(1023)), mantissaBits));
}

/** k log 2 + log(1 + f). */
// @ts-ignore: decorator
@inline
function logarithmFrom(k: v128, f: v128): v128 {
  const s = f64x2.div(f, f64x2.add(number(Named.two), f));
  const z = f64x2.mul(s, s);
  const z2 = f64x2.mul(z, z);
  let even = f64x2.mul(z2, constant(logarithm, 6));
  let odd = f64x2.mul(z2, constant(logarithm, 5));
  even = f64x2.mul(z2, f64x2.add(constant(logarithm, 4), even));
  odd = f64x2.mul(z2, f64x2.add(constant(logarithm, 3), odd));
  even = f64x2.mul(z2, f64x2.add(constant(logarithm, 2), even));
  odd = f64x2.add(constant(logarithm, 1), odd);
  even = f64x2.add(constant(logarithm, 0), even);
  const rest = f64x2.mul(z, f64x2.add(even, f64x2.mul(z, odd)));
  const square = f64x2.mul(f64x2.mul(number(Named.half), f), f);
  const low = f64x2.add(f64x2.mul(s, f64x2.add(square, rest)), f64x2.mul(k, number(Named.logOfTwoLow)));
  return f64x2.sub(f64x2.mul(k, number(Named.logOfTwoHigh)), f64x2.sub(f64x2.sub(square, low), f));
}

/** Whether both numbers are positive and normal. */
// @ts-ignore: decorator
@inline
function arePositiveNormal(x: v128): bool {
  return i64x2.all_true(v128.and(f64x2.ge(x, number(Named.smallestNormal)), f64x2.lt(x, number(Named.infinity))));
}

/** The logarithms of two numbers. */
export function logarithmOfBoth(x: v128): v128 {
  if (arePositiveNormal(x)) return ordinaryLogarithm(x, f64x2.splat(0));
  const first = f64x2.splat(logarithmOf(f64x2.extract_lane(x, 0)));
  return f64x2.replace_lane(first, 1, logarithmOf(f64x2.extract_lane(x, 1)));
}

/** Writes the logarithms of a column. */
export function logarithmColumn(from: usize, to: usize, end: usize): void {
  for (; to < end; to += 32, from += 32) {
    const x = v128.load(from);
    const y = v128.load(from, 16);
    if (arePositiveNormal(x) && arePositiveNormal(y)) {
      v128.store(to, ordinaryLogarithm(x, f64x2.splat(0)));
      v128.store(to, ordinaryLogarithm(y, f64x2.splat(0)), 16);
    } else {
      v128.store(to, logarithmOfBoth(x));
      v128.store(to, logarithmOfBoth(y), 16);
    }
  }
}

/** The power of base to exponent. */
export function powerOf(base: v128, exponent: v128): v128 {
  const zero = f64x2.splat(0);
  const isOne = v128.and(f64x2.eq(exponent, zero), f64x2.ge(base, zero));
  const product = f64x2.mul(exponent, logarithmOfBoth(base));
  return v128.bitselect(number(Named.one), exponentialTimes(product, number(Named.one)), isOne);
}

/** The cumulative distribution function of the standard normal law. */
export function normalCumulativeOf(x: v128): v128 {
  const a = f64x2.pmin(f64x2.abs(x), number(Named.farthest));
  const a2 = f64x2.mul(a, a);
  const spread = f64x2.mul(a, number(Named.splitter));
  const head = f64x2.sub(spread, f64x2.sub(spread, a));
  const rest = f64x2.sub(a, head);
  const headSquare = f64x2.sub(f64x2.mul(head, head), a2);
  const cross = f64x2.mul(f64x2.mul(number(Named.two), head), rest);
  const lost = f64x2.add(f64x2.add(headSquare, cross), f64x2.mul(rest, rest));
  const above = f64x2.add(polynomial(a2, 8, 6, 4, 2, 0), f64x2.mul(a, polynomial(a2, 9, 7, 5, 3, 1)));
  const evenBelow = f64x2.add(constant(tail, 10), f64x2.mul(a2, polynomial(a2, 20, 18, 16, 14, 12)));
  const below = f64x2.add(evenBelow, f64x2.mul(a, polynomial(a2, 19, 17, 15, 13, 11)));
  const ratio = f64x2.div(above, below);
  const half = number(Named.half);
  const factor = f64x2.sub(ratio, f64x2.mul(f64x2.mul(half, lost), ratio));
  const smaller = exponentialTimes(f64x2.mul(f64x2.neg(half), a2), factor);
  const larger = f64x2.sub(number(Named.one), smaller);
  return v128.bitselect(larger, smaller, f64x2.gt(x, f64x2.splat(0)));
}

/** Five coefficients of the tail's table, the highest power first. */
// @ts-ignore: decorator
@inline
function polynomial(x: v128, c4: i32, c3: i32, c2: i32, c1: i32, c0: i32): v128 {
  const third = f64x2.add(constant(tail, c3), f64x2.mul(x, constant(tail, c4)));
  const second = f64x2.add(constant(tail, c2), f64x2.mul(x, third));
  const first = f64x2.add(constant(tail, c1), f64x2.mul(x, second));
  return f64x2.add(constant(tail, c0), f64x2.mul(x, first));
}
