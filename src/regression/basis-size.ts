/** How rich an automatic basis is, in degrees and points. */
export interface BasisSize {
  /** Total degree of the products of leading variables; 0 leaves every variable alone. */
  readonly degree: number;
  /** The same for the integrands of the martingale, whose many coefficients need columns without long tails. */
  readonly integrandDegree: number;
  /** Pairs of a point and its mirror image behind each expected payoff. */
  readonly pairCount: number;
  /** Paths of the fit for each column, when nobody says. */
  readonly pathsPerColumn: number;
}

/** Degree, degree of the integrands, pairs of points, paths for each column. */
type Row = readonly [degree: number, integrandDegree: number, pairCount: number, pathsPerColumn: number];

/**
 * Sizes by the count of leading variables, from small to large, none much beyond 250 columns: what the regression
 * package solves in a fraction of a second. Few variables want more paths for each column: their bias is small, so that
 * noise would rule. Chosen by measurement, see DEVELOPERS.md.
 */
const sizesByCount: readonly (readonly Row[])[] = [
  [[0, 0, 8, 1000]],
  [
    [12, 12, 8, 2000],
    [16, 12, 8, 3000],
    [20, 12, 16, 5000],
  ],
  [
    [4, 3, 4, 1500],
    [6, 4, 8, 2500],
    [9, 6, 16, 4500],
  ],
  [
    [4, 3, 4, 1000],
    [5, 3, 8, 1500],
    [6, 4, 8, 2500],
    [8, 4, 16, 1500],
  ],
  [
    [3, 2, 4, 1000],
    [4, 2, 4, 1000],
    [5, 3, 8, 1500],
    [6, 3, 8, 1200],
  ],
  [
    [2, 2, 4, 1400],
    [3, 2, 4, 1000],
    [4, 2, 8, 1000],
    [5, 2, 8, 1000],
  ],
  [
    [2, 2, 4, 1000],
    [3, 2, 4, 1000],
    [4, 2, 4, 1200],
  ],
  [
    [2, 1, 4, 1000],
    [3, 1, 4, 1000],
  ],
  [
    [2, 1, 4, 1000],
    [3, 1, 4, 1000],
  ],
];

/** Sizes for more leading variables than the list has: alone, then in pairs while those are few enough. */
const alone: Row = [0, 0, 4, 1000];
const inPairs: Row = [2, 1, 4, 1000];
const mostVariablesInPairs = 20;

/** The sizes there are for a count of leading variables, from small to large. */
export function basisSizes(leadingCount: number): readonly BasisSize[] {
  const rows = sizesByCount[leadingCount] ?? (leadingCount <= mostVariablesInPairs ? [alone, inPairs] : [alone]);
  return rows.map(([degree, integrandDegree, pairCount, pathsPerColumn]) => ({
    degree,
    integrandDegree,
    pairCount,
    pathsPerColumn,
  }));
}
