import type { Message } from '../messages/message.js';
import { buildPrograms, type Programs } from '../rule/programs.js';
import type { CheckedScenario } from '../scenario/model.js';
import { readScenario, readScenarioObject } from '../scenario/read.js';
import type { Overrides } from './options.js';

/** A scenario that passed its check, with its programs. */
export interface Prepared {
  readonly scenario: CheckedScenario;
  readonly programs: Programs;
}

/** A prepared scenario, or its mistakes. */
export type PrepareOutcome =
  | { readonly kind: 'ready'; readonly prepared: Prepared }
  | { readonly kind: 'refused'; readonly messages: readonly Message[] };

/** Reads and checks a scenario, text or plain object, and compiles its programs. */
export function prepare(source: string | object, overrides: Overrides): PrepareOutcome {
  const { scenario, messages } =
    typeof source === 'string' ? readScenario(source, overrides) : readScenarioObject(source, overrides);
  if (scenario === null) return { kind: 'refused', messages };
  return { kind: 'ready', prepared: { scenario, programs: buildPrograms(scenario.model) } };
}
