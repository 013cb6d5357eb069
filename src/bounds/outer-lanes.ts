import { momentsOf } from '../numeric/moments.js';
import type { Programs } from '../rule/programs.js';
import type { OuterSums } from './outer-sums.js';

/** What the party who decides faces at one date: copies, since the inner points overwrite the columns. */
export interface Choice {
  readonly date: number;
  /** What exercising brings; on the last date, what the better of exercising and not brings. */
  readonly brings: Float64Array;
  readonly payoff: Float64Array;
  readonly continuation: Float64Array;
}

/** Estimated conditional means of the next value: from all inner points, and from the first half of them. */
export interface InnerMeans {
  readonly mean: Float64Array;
  readonly halfMean: Float64Array;
}

/** Martingales and results of the lanes of one block, from today on. */
export class OuterLanes {
  readonly #martingale: Float64Array;
  readonly #halfMartingale: Float64Array;
  readonly #regressed: Float64Array;
  readonly #lower: Float64Array;
  readonly #plain: Float64Array;
  readonly #upper: Float64Array;
  readonly #halfUpper: Float64Array;
  readonly #regressedUpper: Float64Array;
  /** Date of exercise; `running` before it, `never` on a path that ends without. */
  readonly #exercisedAt: Int32Array;
  readonly #running = -1;
  readonly #never = -2;

  constructor(
    readonly programs: Programs,
    readonly lanes: number,
  ) {
    const zeros = () => new Float64Array(lanes);
    const lowest = () => zeros().fill(Number.NEGATIVE_INFINITY);
    this.#martingale = zeros();
    this.#halfMartingale = zeros();
    this.#regressed = zeros();
    this.#lower = zeros();
    this.#plain = zeros();
    this.#upper = lowest();
    this.#halfUpper = lowest();
    this.#regressedUpper = lowest();
    this.#exercisedAt = new Int32Array(lanes).fill(this.#running);
  }

  /** Adds one step's increments to the martingales. */
  move(value: Float64Array, { mean, halfMean }: InnerMeans, regressedStep: Float64Array): void {
    for (let lane = 0; lane < this.lanes; lane++) {
      this.#martingale[lane] = this.#martingale[lane]! + value[lane]! - mean[lane]!;
      this.#halfMartingale[lane] = this.#halfMartingale[lane]! + value[lane]! - halfMean[lane]!;
      this.#regressed[lane] = this.#regressed[lane]! + regressedStep[lane]!;
    }
  }

  /** Lets the rule choose on every running path, and hindsight note what the date would have brought. */
  choose({ date, brings, payoff, continuation }: Choice): void {
    const isLast = date === this.programs.times.length - 1;
    const { floor } = this.programs;
    for (let lane = 0; lane < this.lanes; lane++) {
      const amount = brings[lane]!;
      const net = amount - this.#martingale[lane]!;
      this.#upper[lane] = Math.max(this.#upper[lane]!, net);
      this.#halfUpper[lane] = Math.max(this.#halfUpper[lane]!, amount - this.#halfMartingale[lane]!);
      this.#regressedUpper[lane] = Math.max(this.#regressedUpper[lane]!, amount - this.#regressed[lane]!);
      if (this.#exercisedAt[lane] === this.#running && (isLast || amount > continuation[lane]!)) {
        this.#lower[lane] = net;
        this.#plain[lane] = amount;
        const isUnused = isLast && (amount > payoff[lane]! || (floor !== null && amount <= floor));
        this.#exercisedAt[lane] = isUnused ? this.#never : date;
      }
    }
  }

  sums(): OuterSums {
    const moments = (values: Float64Array) => momentsOf(values, 0, this.lanes);
    const above = (values: Float64Array) => moments(values.map((value, lane) => value - this.#lower[lane]!));
    const exerciseCounts = this.programs.times.map(() => 0);
    let neverCount = 0;
    for (const date of this.#exercisedAt) {
      if (date === this.#never) neverCount++;
      else exerciseCounts[date] = exerciseCounts[date]! + 1;
    }
    return {
      lower: moments(this.#lower),
      upper: moments(this.#upper),
      gap: above(this.#upper),
      regressed: moments(this.#regressedUpper),
      regressedGap: above(this.#regressedUpper),
      halfInner: moments(this.#halfUpper),
      plain: moments(this.#plain),
      exerciseCounts,
      neverCount,
    };
  }
}
