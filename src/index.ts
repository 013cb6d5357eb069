import { checkScenario } from './run/check.js';
import type { CheckOptions, CheckOutcome, ValueOptions, ValueOutcome } from './run/options.js';
import { valueScenario } from './run/value.js';
import { thisMachine } from './workers/machine.js';

export type { Message, Place, Severity } from './messages/message.js';
export { renderMessages } from './messages/render.js';
export type {
  BoundEstimate,
  Estimate,
  Forecast,
  PathsFinding,
  Plan,
  RoundFinding,
  RunRecord,
  SelectionFinding,
  SizesEnded,
  SizeTried,
} from './result/record.js';
export type {
  CheckOptions,
  CheckOutcome,
  InterpreterKind,
  Overrides,
  Progress,
  ValueOptions,
  ValueOutcome,
} from './run/options.js';
export { interpreterKinds } from './run/options.js';
export type { CheckedScenario, Setting } from './scenario/model.js';
export { upperMethods } from './scenario/upper-methods.js';
export { programVersion as version } from './workers/machine.js';

/**
 * Values a scenario and gives the record that `tarry value --json` prints.
 *
 * A scenario with mistakes is not an exception: the outcome then carries the messages.
 *
 * @param scenario the text of a scenario file, or the same as a plain object
 * @fails throws only for a defect of this package
 * @example
 * const outcome = await value({ drivers: { … }, contract: { … } }, { seed: 'oak', workers: 2 });
 * if (outcome.kind === 'delivered') console.log(outcome.record.bracket95);
 */
export function value(scenario: string | object, options: ValueOptions = {}): Promise<ValueOutcome> {
  return valueScenario(scenario, options, thisMachine());
}

/** Checks a scenario, echoes its settings and forecasts memory and work, without drawing a path. */
export async function check(scenario: string | object, options: CheckOptions = {}): Promise<CheckOutcome> {
  return checkScenario(scenario, options, thisMachine());
}
