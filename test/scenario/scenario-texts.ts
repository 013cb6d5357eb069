import type { ScenarioOverrides } from '#built/scenario/overrides.js';
import { readScenario } from '#built/scenario/read-scenario.js';

/** The parts of a small scenario that is right; a test replaces the part that it is about. */
export interface ScenarioParts {
  readonly before?: string;
  readonly constants?: string;
  readonly drivers?: string;
  readonly correlation?: string;
  readonly contract?: string;
  readonly method?: string;
}

const rightParts: Required<ScenarioParts> = {
  before: '',
  constants: 'constants: { rate: 0.05 }',
  drivers: `drivers:
  lot: { count: 3, start: 100, law: lognormal, growth of mean: rate, volatility: 0.2 }
  fuel: { start: 10, law: normal, volatility: 2 }`,
  correlation: '',
  contract: `contract:
  decision dates: { count: 4, last: 2 }
  payoff: max(0, largest(lot) - fuel)
  discount: rate`,
  method: '',
};

/** The text of a small scenario, with some of its parts replaced. */
export function scenarioText(parts: ScenarioParts = {}): string {
  const { before, constants, drivers, correlation, contract, method } = { ...rightParts, ...parts };
  return `${[before, constants, drivers, correlation, contract, method].filter((part) => part !== '').join('\n')}\n`;
}

/** A mistake as far as a test looks: `code line:column+length`, or the code alone if it has no place. */
export function mistakes(text: string, overrides: ScenarioOverrides = {}): string[] {
  const { scenario, messages } = readScenario(text, overrides);
  if ((scenario === null) === (messages.length === 0)) throw new Error('either a scenario or messages, never both');
  return messages.map(({ code, place }) =>
    place === null ? code : `${code} ${place.line}:${place.column}+${place.length}`,
  );
}

/**
 * A text in which `«` and `»` mark where mistakes are expected, and the expectations: the codes in the order of the marks.
 */
export function marked(text: string, ...codes: string[]): { readonly text: string; readonly expected: string[] } {
  const expected: string[] = [];
  let bare = '';
  for (const [index, piece] of text.split(/[«»]/).entries()) {
    const isMarked = index % 2 === 1;
    if (isMarked) {
      const lines = bare.split('\n');
      expected.push(`${codes[expected.length]} ${lines.length}:${lines.at(-1)!.length + 1}+${piece.length}`);
    }
    bare += piece;
  }
  if (expected.length !== codes.length) throw new Error(`${codes.length} codes for ${expected.length} marks`);
  return { text: bare, expected };
}

/** The model of a text that must be right. */
export function modelOf(text: string, overrides: ScenarioOverrides = {}) {
  const { scenario, messages } = readScenario(text, overrides);
  if (scenario === null) throw new Error(messages.map(({ code, what }) => `${code}: ${what}`).join('\n'));
  return scenario.model;
}
