/**
 * The elementary functions on which every result rests, from + - * / and square roots only.
 *
 * Engines may choose the last digits of Math.exp and its kin; these functions give the same bits wherever doubles are
 * IEEE doubles. The order of operations is part of their meaning: another interpreter must repeat it bracket by bracket,
 * without fused multiply-add. (Which NaN comes out is not part of it.) Polynomials are split into even and odd powers:
 * two short chains of dependent operations run at the same time where one long chain would wait for itself.
 */
import * as table from './elementary-tables.js';

// Local copies: an engine reads a module's own constants faster than imported ones (measured: half the time).
const { logOfTwoHigh, logOfTwoLow, oneOverLogOfTwo } = table;
const { exponential0: x0, exponential1: x1, exponential2: x2, exponential3: x3, exponential4: x4 } = table;
const { exponential5: x5, exponential6: x6, exponential7: x7, exponential8: x8, exponential9: x9 } = table;
const { logarithm0: l0, logarithm1: l1, logarithm2: l2, logarithm3: l3 } = table;
const { logarithm4: l4, logarithm5: l5, logarithm6: l6 } = table;
const { tailNumerator0: n0, tailNumerator1: n1, tailNumerator2: n2, tailNumerator3: n3, tailNumerator4: n4 } = table;
const { tailNumerator5: n5, tailNumerator6: n6, tailNumerator7: n7, tailNumerator8: n8, tailNumerator9: n9 } = table;
const { tailDenominator1: d1, tailDenominator2: d2, tailDenominator3: d3, tailDenominator4: d4 } = table;
const { tailDenominator5: d5, tailDenominator6: d6, tailDenominator7: d7, tailDenominator8: d8 } = table;
const { tailDenominator9: d9, tailDenominator10: d10 } = table;
const { middleNumerator0: m0, middleNumerator1: m1, middleNumerator2: m2, middleNumerator3: m3 } = table;
const { middleNumerator4: m4, middleNumerator5: m5, middleNumerator6: m6, middleNumerator7: m7 } = table;
const { middleDenominator1: v1, middleDenominator2: v2, middleDenominator3: v3, middleDenominator4: v4 } = table;
const { middleDenominator5: v5, middleDenominator6: v6, middleDenominator7: v7 } = table;
const { outerNumerator0: o0, outerNumerator1: o1, outerNumerator2: o2, outerNumerator3: o3 } = table;
const { outerNumerator4: o4, outerNumerator5: o5, outerNumerator6: o6, outerNumerator7: o7 } = table;
const { outerDenominator1: u1, outerDenominator2: u2, outerDenominator3: u3, outerDenominator4: u4 } = table;
const { outerDenominator5: u5, outerDenominator6: u6, outerDenominator7: u7 } = table;
const { farNumerator0: f0, farNumerator1: f1, farNumerator2: f2, farNumerator3: f3 } = table;
const { farNumerator4: f4, farNumerator5: f5, farNumerator6: f6, farNumerator7: f7 } = table;
const { farDenominator1: g1, farDenominator2: g2, farDenominator3: g3, farDenominator4: g4 } = table;
const { farDenominator5: g5, farDenominator6: g6, farDenominator7: g7 } = table;

/** 1.5 · 2^52: added and taken off again it rounds to a whole number. */
const rounder = 6755399441055744;

/** 2^-1022, 2^54 and 2^27 + 1; the last cuts a double into two halves of 26 digits. */
const smallestNormal = 2.2250738585072014e-308;
const intoNormal = 18014398509481984;
const splitter = 134217729;

/** 2^n at index n + 1074, from the smallest double to the largest power of two: exact, hence free of rounding. */
const powersOfTwo = new Float64Array(2098);
powersOfTwo[1074] = 1;
for (let n = 1; n <= 1074; n++) powersOfTwo[1074 - n] = powersOfTwo[1075 - n]! / 2;
for (let n = 1; n <= 1023; n++) powersOfTwo[1074 + n] = powersOfTwo[1073 + n]! * 2;

const oneDouble = new Float64Array(1);
const itsWords = new Int32Array(oneDouble.buffer);
const highWord = new Uint8Array(Uint32Array.of(1).buffer)[0] === 1 ? 1 : 0;

/**
 * The exponential times a factor of ordinary size.
 *
 * With x = k log 2 + r and |r| <= log(2) / 2, exp(r) = 1 + r + r^2 q(r); what the rounding of r lost is added back. The
 * power of two enters as two halves, because 2^k alone may overflow or vanish where the product does not; so a
 * subnormal result is rounded to its few digits once, at the very end.
 */
function exponentialTimes(x: number, factor: number): number {
  if (Number.isNaN(x)) return x;
  const bounded = Math.min(Math.max(x, -746), 710);
  const k = bounded * oneOverLogOfTwo + rounder - rounder;
  const high = bounded - k * logOfTwoHigh;
  const low = k * logOfTwoLow;
  const r = high - low;
  const lost = high - r - low;
  const r2 = r * r;
  const even = x0 + r2 * (x2 + r2 * (x4 + r2 * (x6 + r2 * x8)));
  const odd = x1 + r2 * (x3 + r2 * (x5 + r2 * (x7 + r2 * x9)));
  const mantissa = (1 + (r + (r2 * (even + r * odd) + lost))) * factor;
  const half = k >> 1;
  return mantissa * powersOfTwo[half + 1074]! * powersOfTwo[k - half + 1074]!;
}

/**
 * The natural exponential.
 *
 * One reduction and one polynomial for all arguments, so that lanes side by side never part ways; results beyond the
 * range become Infinity, subnormals lose their digits gradually, NaN stays NaN.
 * @error below 1 unit in the last place (largest measured 0.91, next to an odd multiple of log(2) / 2)
 * @source Reduction in two parts: Cody & Waite (1980), Software Manual for the Elementary Functions, chapter 6.
 */
export function exp(x: number): number {
  return exponentialTimes(x, 1);
}

/**
 * The natural logarithm.
 *
 * With x = 2^k (1 + f) and 1 + f between the square roots of 1/2 and 2, s = f / (2 + f) turns the logarithm into an odd
 * series in s, and f - f^2/2 is kept apart so that arguments near 1 keep all digits. Zero gives -Infinity, negative
 * numbers and NaN give NaN.
 * @error below 1 unit in the last place (largest measured 0.80)
 * @source The arrangement is that of Sun's fdlibm (1993), e_log.c; the coefficients are ours.
 */
export function log(x: number): number {
  if (!(x > 0 && x < Infinity)) return x === 0 ? -Infinity : x > 0 ? x : NaN;
  const subnormal = x < smallestNormal;
  const scaled = subnormal ? x * intoNormal : x;
  oneDouble[0] = scaled;
  // The high word of sqrt(1/2) is taken for that of 1, so that the exponent steps there.
  const exponent = ((itsWords[highWord]! + (0x3ff00000 - 0x3fe6a09e)) >> 20) - 1023;
  const f = scaled * powersOfTwo[1074 - exponent]! - 1;
  const k = subnormal ? exponent - 54 : exponent;
  const s = f / (2 + f);
  const z = s * s;
  const z2 = z * z;
  const even = l0 + z2 * (l2 + z2 * (l4 + z2 * l6));
  const odd = l1 + z2 * (l3 + z2 * l5);
  const rest = z * (even + z * odd);
  const square = 0.5 * f * f;
  return k * logOfTwoHigh - (square - (s * (square + rest) + k * logOfTwoLow) - f);
}

/**
 * The cumulative distribution function of the standard normal law.
 *
 * Phi(-a) = exp(-a^2 / 2) N(a) / D(a) with all coefficients positive: one formula for the whole range, without
 * cancellation. The square of a is taken as a sum of two doubles, since the exponential would magnify its rounding
 * thirtyfold at a = 8. Below -38.6 the result is 0, at the infinities 0 and 1.
 * @error relative at most 1e-15, also for the small values on the left (measured: 7 units in the last place; 2 on the
 *   right); below -37.5, where results are subnormal, 1 unit in the last place
 * @source The kind of approximation (exponential times one function on the whole half line): Shepherd & Laframboise
 *   (1981), Mathematics of Computation 36, 249-253; the square in two parts: Dekker (1971), Numerische Mathematik 18, 224-242.
 */
export function normalCumulative(x: number): number {
  const a = Math.min(Math.abs(x), 39);
  const a2 = a * a;
  const spread = a * splitter;
  const head = spread - (spread - a);
  const tail = a - head;
  const lost = head * head - a2 + 2 * head * tail + tail * tail;
  const evenAbove = n0 + a2 * (n2 + a2 * (n4 + a2 * (n6 + a2 * n8)));
  const oddAbove = n1 + a2 * (n3 + a2 * (n5 + a2 * (n7 + a2 * n9)));
  const evenBelow = 1 + a2 * (d2 + a2 * (d4 + a2 * (d6 + a2 * (d8 + a2 * d10))));
  const oddBelow = d1 + a2 * (d3 + a2 * (d5 + a2 * (d7 + a2 * d9)));
  const ratio = (evenAbove + a * oddAbove) / (evenBelow + a * oddBelow);
  const smaller = exponentialTimes(-0.5 * a2, ratio - 0.5 * lost * ratio);
  return x > 0 ? 1 - smaller : smaller;
}

function middleRatio(w: number): number {
  const w2 = w * w;
  const above = m0 + w2 * (m2 + w2 * (m4 + w2 * m6)) + w * (m1 + w2 * (m3 + w2 * (m5 + w2 * m7)));
  const below = 1 + w2 * (v2 + w2 * (v4 + w2 * v6)) + w * (v1 + w2 * (v3 + w2 * (v5 + w2 * v7)));
  return above / below;
}

function outerRatio(w: number): number {
  const w2 = w * w;
  const above = o0 + w2 * (o2 + w2 * (o4 + w2 * o6)) + w * (o1 + w2 * (o3 + w2 * (o5 + w2 * o7)));
  const below = 1 + w2 * (u2 + w2 * (u4 + w2 * u6)) + w * (u1 + w2 * (u3 + w2 * (u5 + w2 * u7)));
  return above / below;
}

function farRatio(w: number): number {
  const w2 = w * w;
  const above = f0 + w2 * (f2 + w2 * (f4 + w2 * f6)) + w * (f1 + w2 * (f3 + w2 * (f5 + w2 * f7)));
  const below = 1 + w2 * (g2 + w2 * (g4 + w2 * g6)) + w * (g1 + w2 * (g3 + w2 * (g5 + w2 * g7)));
  return above / below;
}

/**
 * The quantile function of the standard normal law, the inverse of `normalCumulative`.
 *
 * Three ratios of polynomials, 85% of all arguments in the first; outside it the smaller tail decides, so that small p
 * keep all digits and p and 1 - p give opposite results. 0 and 1 give the infinities, anything outside NaN.
 * @error relative at most 8e-16 (measured: 4.6 units in the last place)
 * @source Algorithm AS 241 (PPND16): Wichura (1988), Applied Statistics 37, 477-484.
 */
export function normalQuantile(p: number): number {
  const q = p - 0.5;
  if (Math.abs(q) <= 0.425) return q * middleRatio(0.180625 - q * q);
  const smaller = q < 0 ? p : 1 - p;
  if (!(smaller > 0)) return p === 0 ? -Infinity : p === 1 ? Infinity : NaN;
  const root = Math.sqrt(-log(smaller));
  const size = root <= 5 ? outerRatio(root - 1.6) : farRatio(root - 5);
  return q < 0 ? -size : size;
}

/**
 * A power whose exponent is known only when the program runs.
 *
 * exp(exponent * log(base)) is exact enough for formulas, and cheap; zero to a positive power is 0, to a negative one
 * Infinity, and every base that is not negative has the power 0 equal to 1. A negative base gives NaN even for a whole
 * exponent: a rule that flips with the last digit of an exponent is no rule. Whole constants are compiled
 * to multiplications instead.
 * @error relative at most (1 + 1.5 |exponent * log(base)|) 2^-52
 */
export function power(base: number, exponent: number): number {
  return exponent === 0 && base >= 0 ? 1 : exponentialTimes(exponent * log(base), 1);
}
