import type { Message } from '../messages/message.js';
import type { BoundEstimate, DateFinding, Estimate, Plan, SizesEnded } from './record.js';

/** The measures of a finished run that may cast doubt on it. */
export interface Measures {
  readonly plan: Plan;
  readonly columnCount: number;
  readonly basisIsAutomatic: boolean;
  /** Why no larger size of the automatic basis was tried; null where nothing was left to choose. */
  readonly sizesEnded: SizesEnded | null;
  /** Whether the scenario fixes the inner points. */
  readonly innerIsFixed: boolean;
  /** False where the run was stopped. */
  readonly isComplete: boolean;
  readonly dates: readonly DateFinding[];
  readonly lower: BoundEstimate;
  readonly upper: BoundEstimate;
  readonly uppers: readonly BoundEstimate[];
  readonly gap: Estimate;
  readonly bracketWidth: number;
  /** Null when fixed counts were asked for instead of a width. */
  readonly wantedWidth: number | null;
  readonly decidedBy: 'holder' | 'issuer';
  /** Outer paths on which the rule exercises at all. */
  readonly exercisedPathCount: number;
  /** Outer paths that the ending event ends with the right unused; null without such an event. */
  readonly endedPathCount: number | null;
}

/** What one question to the measures brings: a doubt, or that there is none. */
export type Finding = { readonly doubt: Message } | { readonly passed: string };

/** A count of paths with its thousands parted. */
export const paths = (count: number): string => count.toLocaleString('en-US');
