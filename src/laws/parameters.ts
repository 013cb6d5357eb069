/** One key that a law reads from the scenario. */
export interface LawParameter {
  /** The key as the scenario writes it. */
  readonly key: string;
  /** What it is, for a message: completes "… must be". */
  readonly meaning: string;
  /** Which values the law accepts. */
  readonly range: 'finite' | 'not negative';
  /** Used when the key is absent; null makes the key necessary. */
  readonly default: number | null;
}
