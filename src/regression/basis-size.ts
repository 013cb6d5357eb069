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

interface SizesForCount {
  readonly degrees: readonly number[];
  readonly integrandDegrees: readonly number[];
  readonly pairCounts: readonly number[];
}

/**
 * Sizes by the count of leading variables, from small to large, none much beyond 250 columns: what the regression
 * package solves in a fraction of a second. Chosen by measurement, see DEVELOPERS.md.
 */
const sizes: readonly SizesForCount[] = [
  { degrees: [0], integrandDegrees: [0], pairCounts: [8] },
  { degrees: [12, 16, 20], integrandDegrees: [12, 12, 12], pairCounts: [8, 8, 16] },
  { degrees: [5, 6, 9], integrandDegrees: [4, 6, 6], pairCounts: [4, 8, 16] },
  { degrees: [4, 5, 6, 8], integrandDegrees: [3, 3, 4, 4], pairCounts: [4, 4, 8, 8] },
  { degrees: [3, 4, 5, 6], integrandDegrees: [2, 2, 3, 3], pairCounts: [4, 4, 4, 4] },
  { degrees: [2, 3, 4, 5], integrandDegrees: [2, 2, 2, 2], pairCounts: [4, 4, 4, 4] },
  { degrees: [2, 3, 4], integrandDegrees: [2, 2, 2], pairCounts: [4, 4, 4] },
  { degrees: [2, 3], integrandDegrees: [1, 1], pairCounts: [4, 4] },
  { degrees: [2, 3], integrandDegrees: [1, 1], pairCounts: [4, 4] },
];

/** Sizes for more leading variables than the list has: alone, then in pairs while those are few enough. */
const aloneThenPairs: SizesForCount = { degrees: [0, 2], integrandDegrees: [0, 1], pairCounts: [4, 4] };
const alone: SizesForCount = { degrees: [0], integrandDegrees: [0], pairCounts: [4] };
const mostVariablesInPairs = 20;

/** More paths for each column of the larger sizes: their bias is smaller, so that noise would rule. */
const pathsPerColumn = [800, 1000, 1500, 2000];

/** The sizes there are for a count of leading variables, from small to large. */
export function basisSizes(leadingCount: number): readonly BasisSize[] {
  const found = sizes[leadingCount] ?? (leadingCount <= mostVariablesInPairs ? aloneThenPairs : alone);
  return found.degrees.map((degree, size) => ({
    degree,
    integrandDegree: found.integrandDegrees[size]!,
    pairCount: found.pairCounts[size]!,
    pathsPerColumn: pathsPerColumn[size]!,
  }));
}
