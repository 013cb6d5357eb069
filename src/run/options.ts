import type { Message } from '../messages/message.js';
import type { Forecast, Plan, RunRecord } from '../result/record.js';
import type { CheckedScenario, UpperMethod } from '../scenario/model.js';

/** The fast interpreter, vectors in WebAssembly, and the readable one, plain loops. */
export const interpreterKinds = ['wasm', 'plain'] as const;

/** What runs the compiled programs. */
export type InterpreterKind = (typeof interpreterKinds)[number];

/** How far a run is. */
export interface Progress {
  readonly stage: 'fit' | 'select' | 'pilot' | 'bounds' | 'nested';
  /** Work done and in all, in the stage's own counts; `total` is fixed within a stage, round and size of the basis. */
  readonly done: number;
  readonly total: number;
  /** Round of the bracket's draws, from 1 on. */
  readonly round?: number;
  /** Columns of the basis that is being fitted or tried. */
  readonly columnCount?: number;
}

/** What changes a scenario from outside, as the command line does; each wins over the file. */
export interface Overrides {
  /** Where the text came from, for messages; not opened. */
  readonly path?: string;
  readonly seed?: string;
  /** Constants by name; the value is an expression of constants. */
  readonly with?: Readonly<Record<string, string>>;
  /** `"0.1%"` of the value or an amount of money such as `"0.02"`. */
  readonly width?: string;
  readonly upper?: UpperMethod;
}

/** What a check takes beside the scenario. */
export interface CheckOptions extends Overrides {
  /**
   * Memory that the fit's paths may take; what does not fit is simulated again when it is needed. The result does not
   * depend on it. Default: 512e6. @unit bytes
   */
  readonly fitMemoryBytes?: number;
}

/** Everything that a valuation takes beside the scenario. */
export interface ValueOptions extends CheckOptions {
  /** Replays the counts of an earlier run instead of making a pilot. */
  readonly plan?: Plan;
  /** Wall time to aim for; it is turned into counts once, after the pilot. */
  readonly budgetSeconds?: number;
  /** Threads; 0 runs in the calling thread. Default: one for each core, at most 8. The result does not depend on it. */
  readonly workers?: number;
  /** Which interpreter runs the programs; the result does not depend on it. Default: `wasm`, the fast one. */
  readonly interpreter?: InterpreterKind;
  /** Ends the run early; what is finished is delivered with status `stopped`. */
  readonly signal?: AbortSignal;
  readonly onProgress?: (progress: Progress) => void;
}

/** `refused`: the scenario has mistakes; `stopped`: ended before a bracket existed. */
export type ValueOutcome =
  | { readonly kind: 'delivered'; readonly record: RunRecord }
  | { readonly kind: 'refused'; readonly messages: readonly Message[] }
  | { readonly kind: 'stopped'; readonly stage: Progress['stage'] };

/** A scenario without mistakes, with its settings and forecast; or its mistakes. */
export type CheckOutcome =
  | {
      readonly kind: 'checked';
      readonly scenario: CheckedScenario;
      readonly forecast: Forecast;
      readonly advice: readonly Message[];
    }
  | { readonly kind: 'refused'; readonly messages: readonly Message[] };
