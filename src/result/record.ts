import type { Message } from '../messages/message.js';
import type { CheckedModel, Setting, UpperMethod } from '../scenario/model.js';

/** How a bound was made; `two-level` is reserved for a combination that is not built yet. */
export type BoundMethod = 'rule' | UpperMethod | 'two-level';

/** A mean over independent paths, in money of today. */
export interface Estimate {
  readonly value: number;
  readonly standardError: number | null;
  /** Half-width of the 95% interval of the estimate: 1.96 standard errors. */
  readonly halfWidth95: number | null;
}

/** A bound with the paths behind it and how it was made. */
export interface BoundEstimate extends Estimate {
  readonly pathCount: number;
  readonly method: BoundMethod;
}

/**
 * The integer counts of a run, fixed before its final draws; replaying a plan with the same seed gives the same bits.
 */
export interface Plan {
  /** Which of the automatic basis' sizes the rule is fitted with, from 0 on; 0 for a stated basis. */
  readonly basisSize: number;
  /** Which round of final draws, from 1 on: each draws afresh. */
  readonly round: number;
  readonly fitPathCount: number;
  /** Paths that carry both bounds; any count from 2 up, the last block may be short. */
  readonly outerPathCount: number;
  /** Points of one step drawn for every outer path and date; 0 leaves both bounds to the regressed martingale. */
  readonly innerPointCount: number;
  /** Counts of the Andersen-Broadie upper bound; 0 when it is not computed. */
  readonly nestedOuterPathCount: number;
  readonly nestedInnerPathCount: number;
  /** Which upper bound enters the bracket. */
  readonly upper: UpperMethod;
}

/** Which of the fit's paths were in memory at once, and what it cost; it changes no result. */
export interface PathsFinding {
  /** All of them, or one segment of dates at a time, simulated again from checkpoints. */
  readonly kept: 'all' | 'segments';
  /** Dates of one segment; all dates after today where all paths are kept. */
  readonly segmentDates: number;
  /** Dates at which the drivers are kept for good, to simulate on from. */
  readonly checkpointCount: number;
  /** Steps by which the fit's paths are simulated, over those that keeping all of them would need. */
  readonly workFactor: number;
  /** Memory that the paths take. @unit bytes */
  readonly bytes: number;
}

/** What the pilot saw, and from which the plan was made; null when every count was given. */
export interface PilotFinding {
  readonly outerPathCount: number;
  readonly innerPointCount: number;
  readonly lowerStandardDeviation: number;
  readonly upperStandardDeviation: number;
  readonly gap: number;
  /** Width of the bracket that the plan is expected to reach, in money. */
  readonly expectedWidth: number;
  /** Null when a budget or fixed outer paths were asked for instead of a width. */
  readonly wantedWidth: number | null;
}

/** One size of the automatic basis that was fitted and tried. */
export interface SizeTried {
  readonly basisSize: number;
  readonly columnCount: number;
  readonly fitPathCount: number;
  readonly lowerStandardDeviation: number;
  readonly upperStandardDeviation: number;
  /** Gap with the points of the trial, in money. */
  readonly gap: number;
  /** Width that the cheapest plan with it is expected to reach, in money. */
  readonly expectedWidth: number;
  /** Counted operations of the fit, and of the bounds in that plan. */
  readonly fitOperations: number;
  readonly boundsOperations: number;
}

/** Why no larger size of the automatic basis was tried. */
export type SizesEnded =
  | 'width in reach'
  | 'no gain'
  | 'no larger size'
  | 'larger size too costly'
  /** The scenario fixes the paths of the fit, and they are too few for more columns. */
  | 'too few paths'
  | 'too little memory';

/** How the size of the automatic basis was chosen, on paths of their own; null where there was no choice. */
export interface SelectionFinding {
  readonly outerPathCount: number;
  readonly innerPointCount: number;
  readonly tried: readonly SizeTried[];
  readonly chosenSize: number;
  readonly ended: SizesEnded;
}

/** One round of final draws; each after the first is made because the one before missed the wanted width. */
export interface RoundFinding {
  readonly round: number;
  readonly outerPathCount: number;
  readonly innerPointCount: number;
  /** Probability that its bracket misses, at most. */
  readonly errorProbability: number;
  /** Standard errors from each bound to its end of the bracket. */
  readonly standardErrors: number;
  readonly low: number;
  readonly high: number;
}

/** The fitted rule at one date, as far as a reader needs it. */
export interface DateFinding {
  readonly time: number;
  readonly exerciseShare: number;
  /** Share of paths that the ending event ends here while the right is unused; null without such an event. */
  readonly endedShare: number | null;
  /** Columns kept in the regression. */
  readonly keptColumnCount: number;
  readonly droppedColumns: readonly string[];
  /** Share of the response's variance that the basis explains. */
  readonly explainedShare: number | null;
  /** Mean worth of holding past this date, in money of today, over the fit's paths that may; null at the last date. */
  readonly continuationMean: number | null;
}

/** The record of a run: what `--json` prints and what a report reads. Fields are added, never renamed. */
export interface RunRecord {
  readonly schemaVersion: 1;
  readonly status: 'complete' | 'stopped';
  readonly scenario: {
    readonly path: string | null;
    readonly sha256: string;
    readonly title: string;
    readonly money: string;
  };
  readonly seed: string;
  readonly decidedBy: CheckedModel['contract']['decidedBy'];
  readonly plan: Plan;
  readonly selection: SelectionFinding | null;
  readonly pilot: PilotFinding | null;
  /** The rounds of final draws; the bracket is that of the last. */
  readonly rounds: readonly RoundFinding[];
  readonly paths: PathsFinding;
  readonly lower: BoundEstimate;
  readonly upper: BoundEstimate;
  /** Every upper bound (for an issuer: every martingale bound) that was computed, the bracket's own among them. */
  readonly uppers: readonly BoundEstimate[];
  readonly gap: Estimate;
  readonly bracket95: { readonly low: number; readonly high: number };
  /** Other estimates of what the rule is worth, for comparison; none enters the bracket. */
  readonly crossChecks: {
    /** The rule's mean on the outer paths without any martingale: the plain estimate, with its far larger error. */
    readonly plainLower: Estimate;
    /** Worth of continuing today with the rule, by the nested bound's inner paths; null without that bound. */
    readonly nestedContinuationToday: Estimate | null;
  };
  readonly stepBias: null;
  readonly exact: null;
  readonly basis: { readonly columns: readonly string[]; readonly martingalePolynomials: readonly string[] };
  readonly dates: readonly DateFinding[];
  /** Share of paths that reach the last date with the right unused. */
  readonly neverExercisedShare: number;
  /** Share of paths that the ending event ends before the right is used; null without such an event. */
  readonly endedByEventShare: number | null;
  readonly exerciseTimeQuantiles: { readonly p05: number; readonly p50: number; readonly p95: number } | null;
  /** Findings that doubt the result, each with its number. */
  readonly advice: readonly Message[];
  /** Checks that ran and found nothing, in words. */
  readonly passedChecks: readonly string[];
  readonly settings: readonly Setting[];
  /** What ran the programs; no figure of the record depends on it. */
  readonly interpreter: 'wasm' | 'plain';
  readonly timing: {
    readonly totalSeconds: number;
    /** All fits, and the trials that chose among them. */
    readonly fitSeconds: number;
    readonly pilotSeconds: number;
    readonly boundsSeconds: number;
  };
  readonly versions: { readonly tarry: string; readonly node: string };
}

/** What a run will need, said before it starts; where it may try several sizes of the basis, what it needs at most. */
export interface Forecast {
  /** Sizes that may be tried, one after another; columns and paths are those of the largest. */
  readonly sizeCount: number;
  /** Bytes resident at the peak, all threads together. */
  readonly peakMemoryBytes: number;
  readonly machineMemoryBytes: number | null;
  readonly paths: PathsFinding;
  /** Counted in path-dates: one path moved by one date and its basis evaluated. */
  readonly work: { readonly fit: number; readonly bounds: number | null; readonly nested: number | null };
  /** Columns of the regression and polynomials of the martingale. */
  readonly columnCount: number;
  readonly polynomialCount: number;
}
