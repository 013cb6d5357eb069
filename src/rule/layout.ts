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
  /** 1 where the contract ends by its event at this date; null where it has none. */
  readonly ended: number | null;
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
export type DriverLayout = Pick<Layout, 'state' | 'innovations' | 'next' | 'payoff' | 'terminal' | 'ended' | 'basis'>;

/** Lays out the columns that depend on the count of drivers and the clauses of the contract alone. */
export function layOutDrivers(driverCount: number, hasEndingEvent: boolean): DriverLayout {
  const payoff = 3 * driverCount;
  const terminal = payoff + 1;
  const ended = hasEndingEvent ? terminal + 1 : null;
  const basis = (ended ?? terminal) + 1;
  return { state: 0, innovations: driverCount, next: 2 * driverCount, payoff, terminal, ended, basis };
}

/** Lays out the whole workspace. */
export function layOut(
  first: DriverLayout,
  driverCount: number,
  columnCount: number,
  variableCount: number,
  polynomialCount: number,
): Layout {
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
