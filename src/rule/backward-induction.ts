import { type Moments, mergeMoments, noMoments, varianceOf } from '../numeric/moments.js';
import { type CompressedColumns, compressColumns, solveResponses } from '../regression/solve.js';
import type { SweepSums } from './fit-sweeps.js';
import type { Programs } from './programs.js';
import type { Rule } from './rule.js';

/** The three kinds of sweep over the fit's paths at one date; `fit-sweeps.ts` says what each sums. */
export type SweepKind = 'values' | 'residuals' | 'direction';

/**
 * The sweeps over all paths of the fit, wherever they run and wherever the paths come from; results come in the order
 * of the blocks. Dates are swept backward.
 */
export interface FitWork {
  simulate(): Promise<Moments[][][]>;
  sweep(kind: SweepKind, date: number): Promise<SweepSums[]>;
}

/** What the regression at one date found. */
export interface StepFit {
  readonly date: number;
  readonly kept: readonly number[];
  readonly dropped: readonly number[];
  /** Share of the next value's variance that the basis explains; null when there is no variance. */
  readonly explainedShare: number | null;
  /** Standard deviation of the next value about its conditional mean, before and after the martingale's increment. */
  readonly spread: number;
  readonly controlledSpread: number;
  readonly continuationMean: number;
}

/** Steps of the conjugate gradients at each date; the accuracy gained by more is below the regression's own error. */
export const searchStepCount = 3;

/** Sweeps over the fit's paths at each date; without a martingale, the one for the continuation value. */
export const sweepsPerDate = ({ polynomialNames }: Programs) =>
  polynomialNames.length === 0 ? 1 : 2 + searchStepCount;

/**
 * Fits a rule and its martingale backward in time; fills `rule` and reports each date.
 *
 * At each date it estimates the continuation value C, the conditional mean of the value v at the next date, together
 * with the integrands g of v's martingale: v(X′) = C(X) + Σ g(X) × innovation polynomial + rest, by least squares in all
 * coefficients jointly. The polynomials are orthonormal given X, so the joint normal equations are nearly one small
 * block for each polynomial, all blocks the same. That block matrix steers conjugate gradients, which need the joint
 * problem only as sums over paths; their first step is the plain regression of the rest times each polynomial.
 *
 * Jointly and not one by one, because the noise of a regression is that of its rest: with the increment taken out, C is
 * fitted to values with a small fraction of their spread.
 *
 * The coefficients carry regression error and look-ahead bias, so values are never read off here: the bounds run the
 * finished rule on other paths, where any g makes an exact martingale.
 *
 * @source Tsitsiklis & Van Roy (2001), IEEE Trans. Neural Networks 12, 694-703 (regression on the fitted value);
 * Belomestny, Bender & Schoenmakers (2009), Mathematical Finance 19, 53-71 (regressed martingale); Hestenes & Stiefel
 * (1952), J. Research Nat. Bureau of Standards 49, 409-436 (conjugate gradients)
 */
export async function fitRule(
  programs: Programs,
  rule: Rule,
  direction: Float64Array,
  work: FitWork,
): Promise<StepFit[]> {
  setStandards(programs, rule, await work.simulate());
  const fits: StepFit[] = [];
  for (let date = programs.times.length - 2; date >= 0; date--)
    fits.push(await fitDate(programs, rule, direction, work, date));
  return fits.reverse();
}

async function fitDate(
  programs: Programs,
  rule: Rule,
  direction: Float64Array,
  work: FitWork,
  date: number,
): Promise<StepFit> {
  const columnCount = programs.columns.length;
  const { integrandColumnCount } = programs;
  const polynomialCount = programs.polynomialNames.length;
  const integrandLength = polynomialCount * integrandColumnCount;

  const values = addSums(await work.sweep('values', date));
  const all = compressColumns(values.gram, columnCount);
  if (polynomialCount === 0) return fitContinuation(programs, rule, date, all, values);
  const low = compressColumns(values.gram, integrandColumnCount);
  const precondition = (gradient: Float64Array) =>
    joined(
      solveResponses(all, gradient.subarray(0, columnCount), 1),
      solveResponses(low, gradient.subarray(columnCount), polynomialCount),
    );
  rule.continuation.set(solveResponses(all, values.products, 1), date * columnCount);
  const residuals = addSums(await work.sweep('residuals', date));
  const search = await conjugateGradients(
    joined(residuals.products, residuals.integrandProducts),
    precondition,
    async (vector) => {
      direction.set(vector);
      const image = addSums(await work.sweep('direction', date));
      return joined(image.products, image.integrandProducts);
    },
  );
  const continuation = rule.continuation.subarray(date * columnCount, (date + 1) * columnCount);
  for (let k = 0; k < columnCount; k++) continuation[k] = continuation[k]! + search.solution[k]!;
  rule.integrands.set(search.solution.subarray(columnCount), date * integrandLength);
  return describeFit(date, all, values.response, residuals.response, search.decrease);
}

/** The fit at a date where there is no martingale: continuation value alone. */
function fitContinuation(
  { columns }: Programs,
  rule: Rule,
  date: number,
  all: CompressedColumns,
  { products, response }: SweepSums,
): StepFit {
  const coefficients = solveResponses(all, products, 1);
  rule.continuation.set(coefficients, date * columns.length);
  // What least squares leaves: Σ response² less coefficients × right-hand side.
  const total = response.squares + response.count * response.mean * response.mean;
  const rest = { ...response, squares: Math.max(0, total - dot(coefficients, products)) };
  return describeFit(date, all, response, rest, 0);
}

/**
 * Solves the joint normal equations A x = b from x = 0 by preconditioned conjugate gradients, a fixed count of steps.
 *
 * Every step lowers the sum of squares that the fit leaves, so it may end after any of them.
 *
 * @returns the solution and how far the sum of squares has fallen
 */
async function conjugateGradients(
  right: Float64Array,
  precondition: (gradient: Float64Array) => Float64Array,
  multiply: (vector: Float64Array) => Promise<Float64Array>,
): Promise<{ solution: Float64Array; decrease: number }> {
  const solution = new Float64Array(right.length);
  const gradient = Float64Array.from(right);
  let direction = precondition(gradient);
  let slope = dot(gradient, direction);
  let decrease = 0;
  for (let step = 0; step < searchStepCount && slope > 0; step++) {
    const image = await multiply(direction);
    const curvature = dot(direction, image);
    if (!(curvature > 0)) break;
    const length = slope / curvature;
    for (let i = 0; i < solution.length; i++) {
      solution[i] = solution[i]! + length * direction[i]!;
      gradient[i] = gradient[i]! - length * image[i]!;
    }
    decrease += length * slope;
    const conditioned = precondition(gradient);
    const nextSlope = dot(gradient, conditioned);
    const share = nextSlope / slope;
    direction = conditioned.map((value, i) => value + share * direction[i]!);
    slope = nextSlope;
  }
  return { solution, decrease };
}

function describeFit(
  date: number,
  { kept, dropped }: CompressedColumns,
  value: Moments,
  rest: Moments,
  decrease: number,
): StepFit {
  return {
    date,
    kept,
    dropped,
    explainedShare: value.squares > 0 ? Math.max(0, 1 - rest.squares / value.squares) : null,
    spread: Math.sqrt(varianceOf(rest)),
    controlledSpread: Math.sqrt(Math.max(0, rest.squares - decrease) / Math.max(1, rest.count - 1)),
    continuationMean: value.mean,
  };
}

function joined(a: Float64Array, b: Float64Array): Float64Array {
  const both = new Float64Array(a.length + b.length);
  both.set(a);
  both.set(b, a.length);
  return both;
}

function dot(a: Float64Array, b: Float64Array): number {
  let sum = 0;
  for (let i = 0; i < a.length; i++) sum += a[i]! * b[i]!;
  return sum;
}

/** A spread below this share of the variable's size counts as none: the variable is then the constant 0. */
const smallestRelativeSpread = 1e-12;

function setStandards(programs: Programs, rule: Rule, parcels: readonly Moments[][][]): void {
  const { variableCount, times } = programs;
  for (let date = 0; date < times.length; date++) {
    for (let v = 0; v < variableCount; v++) {
      const moments = parcels.map((parcel) => parcel[date]![v]!).reduce(mergeMoments, noMoments);
      const spread = Math.sqrt(varianceOf(moments));
      const position = (date * variableCount + v) * 2;
      rule.standards[position] = moments.mean;
      rule.standards[position + 1] = spread > smallestRelativeSpread * Math.abs(moments.mean) ? 1 / spread : 0;
    }
  }
}

/** Adds the sums of all parcels in their order, so that the result does not depend on who computed which. */
function addSums(parcels: readonly SweepSums[]): SweepSums {
  return parcels.reduce((total, parcel) => ({
    gram: addArrays(total.gram, parcel.gram),
    products: addArrays(total.products, parcel.products),
    integrandProducts: addArrays(total.integrandProducts, parcel.integrandProducts),
    response: mergeMoments(total.response, parcel.response),
  }));
}

function addArrays(a: Float64Array, b: Float64Array): Float64Array {
  return a.map((value, index) => value + b[index]!);
}
