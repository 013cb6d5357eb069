import type { Contract } from '../clauses/contract.js';
import type { PlacedExpression } from '../program/expression.js';
import type { UpperMethod } from './upper-methods.js';

export type { UpperMethod } from './upper-methods.js';

/** A named number of the scenario. */
export interface Constant {
  readonly name: string;
  readonly value: number;
  /** The size of a plausible change, in the constant's own unit. */
  readonly plausible: number | null;
  readonly measuredUnder: 'pricing' | 'history' | null;
  readonly line: number | null;
}

/** A driver or a family of drivers that share one law. */
export interface DriverFamily {
  readonly name: string;
  /** A family is used through largest(f), f[2] …; a single driver by its bare name. */
  readonly isFamily: boolean;
  readonly count: number;
  readonly law: LawName;
  /** One expression for all members, or one each; of constants and `number`. */
  readonly start: readonly PlacedExpression[];
  /** The law's own keys, in words as the scenario writes them (`growth of mean`, `volatility`, …). */
  readonly parameters: Readonly<Record<string, PlacedExpression>>;
  readonly observed: boolean;
  readonly line: number;
}

/** The laws that can be simulated. */
export type LawName = 'lognormal' | 'normal';

/** How the bracket is to be made. Counts that are null are left to the pilot. */
export interface Method {
  readonly basis: 'auto' | readonly PlacedExpression[];
  readonly bracketWidth: { readonly relative: number } | { readonly money: number };
  readonly fitPathCount: number | null;
  readonly outerPathCount: number | null;
  readonly innerPointCount: number | null;
  readonly upper: UpperMethod;
  /** Counts of the nested upper bound; used only when `upper` asks for it. */
  readonly nestedOuterPathCount: number | null;
  readonly nestedInnerPathCount: number | null;
}

/** Where a setting came from. */
export type Origin =
  | { readonly kind: 'line'; readonly line: number }
  | { readonly kind: 'command line' }
  | { readonly kind: 'default' };

/** One setting as it was used, for the echo of `check` and for the record. */
export interface Setting {
  readonly name: string;
  readonly value: string;
  readonly origin: Origin;
}

/** A scenario after every check: plain data that can be printed, frozen and sent to a worker. */
export interface CheckedModel {
  readonly title: string;
  readonly money: string;
  readonly clock: string;
  readonly asOf: string | null;
  readonly seed: string;
  readonly constants: readonly Constant[];
  readonly families: readonly DriverFamily[];
  /**
   * Correlation of the drivers' innovations; row and column i belong to driver i (members in order, families in
   * file order).
   * @shape drivers × drivers, symmetric, ones on the diagonal, positive semidefinite to 1e-10
   */
  readonly correlation: readonly (readonly number[])[];
  readonly contract: Contract;
  readonly method: Method;
}

/** A scenario that can be run, with every setting and where it came from. */
export interface CheckedScenario {
  readonly model: CheckedModel;
  readonly settings: readonly Setting[];
}
