import { stepOperations } from '../rule/operations.js';
import type { Programs } from '../rule/programs.js';

/**
 * Operations that a fit, and the outer and inner paths of a plan, may each take when nobody set a budget.
 *
 * A fixed count and not a time, so that the plan does not depend on the machine; about half a minute of two cores.
 */
export const defaultOperationLimit = 1e11;

/** How much work a plan may ask for. */
export interface Effort {
  /** Steps over all outer paths, dates and inner points. */
  readonly stepLimit: number;
  /** Spend the whole limit instead of stopping at the wanted width. */
  readonly spendAll: boolean;
}

/** Steps that were taken, and how long they took. */
export interface Pace {
  readonly steps: number;
  readonly milliseconds: number;
}

/**
 * What a plan may spend: a fixed count of operations, or what a time budget leaves at the pace of the steps just taken.
 *
 * @param secondsLeft null without a budget
 */
export function effortOf(programs: Programs, secondsLeft: number | null, { steps, milliseconds }: Pace): Effort {
  if (secondsLeft === null) return { stepLimit: defaultOperationLimit / stepOperations(programs), spendAll: false };
  return { stepLimit: (Math.max(0, secondsLeft) * steps * 1000) / Math.max(1, milliseconds), spendAll: true };
}
