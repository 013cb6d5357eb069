/** What a name stands for. */
export type ScopeSymbol =
  | { readonly kind: 'constant' }
  | { readonly kind: 'driver'; readonly observed: boolean }
  /** `count` is null while it is not known, because it was itself a mistake. */
  | { readonly kind: 'family'; readonly count: number | null; readonly observed: boolean }
  /** `t`, the time since today. */
  | { readonly kind: 'clock' }
  /** `number`, the position of a member in its own family. */
  | { readonly kind: 'number' };

/** The kinds of things that a name can stand for. */
export type SymbolKind = ScopeSymbol['kind'];

/**
 * The closed list of names that an expression may use, and which of them are known at its place.
 *
 * Names live in a Map and are never looked up on an object, so that `constructor` or `__proto__` are unknown like any
 * other name that nobody stated.
 */
export interface Scope {
  readonly symbols: ReadonlyMap<string, ScopeSymbol>;
  readonly allowed: ReadonlySet<SymbolKind>;
  /** What the expression is, for messages: completes "… may use". */
  readonly subject: string;
  /** What `allowed` means, for messages: completes "may use". */
  readonly allowedWords: string;
  /** A rule cannot depend on what nobody observes; payoffs and bases neither. */
  readonly observedOnly: boolean;
  /** The value of a constant; null while it is not known, because it was itself a mistake. */
  readonly valueOf: (name: string) => number | null;
  /** Names with two meanings, already told as a mistake: whatever uses them raises no second one. */
  readonly unclear?: ReadonlySet<string>;
  /** How many values `number` runs through. */
  readonly memberCount: number;
}
