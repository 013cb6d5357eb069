import type { PlacedExpression } from '../program/expression.js';

/** What happens to a right that was not used at the last decision date. */
export type AtExpiry =
  | { readonly kind: 'lapse' }
  | { readonly kind: 'forced' }
  | { readonly kind: 'pays'; readonly amount: PlacedExpression };

/** The contract: who decides, when, and what is paid. */
export interface Contract {
  readonly decidedBy: 'holder' | 'issuer';
  /** Strictly rising, in clock units; 0 is among them only if today is a decision date. */
  readonly decisionDates: readonly number[];
  readonly payoff: PlacedExpression;
  readonly atExpiry: AtExpiry;
  /** Continuously compounded rate per clock unit, an expression of constants. */
  readonly discount: PlacedExpression;
}
