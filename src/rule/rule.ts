import type { Programs } from './programs.js';

/**
 * A fitted rule with its martingale: the coefficients of the continuation value and of the integrands at every date of
 * the grid. Plain arrays on shared memory, so that threads read one copy.
 */
export interface Rule {
  /** Continuation value by date. @shape dates (0 … last; the last is unused) × columns */
  readonly continuation: Float64Array;
  /** Integrands of the polynomials by date before the step. @shape dates (0 … last - 1) × polynomials × integrand columns */
  readonly integrands: Float64Array;
  /** Mean and inverse spread of each variable. @shape dates × variables × 2 */
  readonly standards: Float64Array;
}

/** A rule with every coefficient 0, to be filled by the fit. */
export function emptyRule(programs: Programs): Rule {
  const dateCount = programs.times.length;
  const columnCount = programs.columns.length;
  return {
    continuation: sharedNumbers(dateCount * columnCount),
    integrands: sharedNumbers((dateCount - 1) * programs.polynomialNames.length * programs.integrandColumnCount),
    standards: sharedNumbers(dateCount * programs.variableCount * 2),
  };
}

/** Numbers on memory that all threads of a run share, zeros at first. */
export function sharedNumbers(length: number): Float64Array<SharedArrayBuffer> {
  return new Float64Array(new SharedArrayBuffer(length * Float64Array.BYTES_PER_ELEMENT));
}
