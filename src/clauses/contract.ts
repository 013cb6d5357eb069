import type { PlacedExpression } from '../program/expression.js';

/** What happens to a right that was not used at the last decision date. */
export type AtExpiry =
  | { readonly kind: 'lapse' }
  | { readonly kind: 'forced' }
  | { readonly kind: 'pays'; readonly amount: PlacedExpression };

/**
 * An event that ends the contract without anybody's decision.
 *
 * On each decision date, the last one included, it is looked at before anybody decides. Where it holds, the contract ends
 * at once: the holder receives `pays`, discounted from that date, and no right can be exercised then or later. Between
 * the dates, and today unless today is a decision date, nobody looks.
 */
export interface EndingEvent {
  /** A condition on drivers, constants and the clock. */
  readonly event: PlacedExpression;
  /** As the holder receives it; 0 where the scenario says nothing. */
  readonly pays: PlacedExpression;
}

/** The contract: who decides, when, and what is paid. */
export interface Contract {
  readonly decidedBy: 'holder' | 'issuer';
  /** Strictly rising, in clock units; 0 is among them only if today is a decision date. */
  readonly decisionDates: readonly number[];
  readonly payoff: PlacedExpression;
  readonly atExpiry: AtExpiry;
  readonly endingEvent: EndingEvent | null;
  /** Continuously compounded rate per clock unit, an expression of constants. */
  readonly discount: PlacedExpression;
}
