import type { UpperMethod } from './model.js';

/** What changes a scenario from outside; each wins over the text. */
export interface ScenarioOverrides {
  /** Where the text came from, for messages; not opened. */
  readonly path?: string;
  readonly seed?: string;
  /** Constants by name; the value is an expression of constants. */
  readonly with?: Readonly<Record<string, string>>;
  /** `"0.1%"` of the value or an amount of money such as `"0.02"`. */
  readonly width?: string;
  readonly upper?: UpperMethod;
  /** Wall time to aim for; judged here only against counts that the text fixes. */
  readonly budgetSeconds?: number;
}
