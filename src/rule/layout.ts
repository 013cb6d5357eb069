/** Where everything of a block stands in the workspace: the first column of each part. */
export interface Layout {
  /** Drivers at the date before the step. */
  readonly state: number;
  /** Independent innovations of the step. */
  readonly innovations: number;
  /** Drivers at the date after the step; amounts and basis are evaluated here. */
  readonly next: number;
  /** Discounted payoff, then the terminal amount. */
  readonly payoff: number;
  readonly terminal: number;
  readonly basis: number;
  readonly variables: number;
  readonly polynomials: number;
  /** Coefficients of the polynomials at `state`. */
  readonly integrands: number;
  /** Continuation value at `next`, and the larger of it and the payoff. */
  readonly hold: number;
  readonly value: number;
  /** Free columns for the stages: responses, saved drivers, what they follow along the paths. */
  readonly stage: number;
  /** Columns that programs use for themselves, to the end. */
  readonly scratch: number;
}

/** The part of the layout that comes before the basis, whose size is not known yet. */
export type DriverLayout = Pick<Layout, 'state' | 'innovations' | 'next' | 'payoff' | 'terminal' | 'basis'>;

/** Lays out the columns that depend on the count of drivers alone. */
export function layOutDrivers(driverCount: number): DriverLayout {
  const payoff = 3 * driverCount;
  return { state: 0, innovations: driverCount, next: 2 * driverCount, payoff, terminal: payoff + 1, basis: payoff + 2 };
}

/** Lays out the whole workspace. */
export function layOut(
  driverCount: number,
  columnCount: number,
  variableCount: number,
  polynomialCount: number,
): Layout {
  const first = layOutDrivers(driverCount);
  const variables = first.basis + columnCount;
  const polynomials = variables + variableCount;
  const integrands = polynomials + polynomialCount;
  const hold = integrands + polynomialCount;
  const stage = hold + 2;
  return {
    ...first,
    variables,
    polynomials,
    integrands,
    hold,
    value: hold + 1,
    stage,
    scratch: stage + stageColumnCount(driverCount, polynomialCount),
  };
}

/** Columns that a stage has for itself beside saved drivers and one column for each polynomial. */
export const singleStageColumnCount = 16;

function stageColumnCount(driverCount: number, polynomialCount: number): number {
  return driverCount + polynomialCount + singleStageColumnCount;
}
