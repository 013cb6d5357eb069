import type { Message } from '#built/messages/message.js';
import { readScenarioObject } from '#built/scenario/read-object.js';
import { readScenario } from '#built/scenario/read-scenario.js';
import { scenarioText } from '../scenario/scenario-texts.js';

/** A code, and a small scenario or call that provokes it. */
export type CodeRow = readonly [code: string, provoke: () => readonly Message[] | Promise<readonly Message[]>];

const from = (text: string) => () => readScenario(text).messages;
const constant = (formula: string) => from(scenarioText({ constants: `constants:\n  rate: 0.05\n  a: ${formula}` }));
const contract = (keys: string) =>
  from(scenarioText({ contract: `contract:\n  decision dates: [1]\n  discount: 0\n  ${keys}` }));
const dates = (keys: string) =>
  from(scenarioText({ contract: `contract: { decision dates: ${keys}, payoff: fuel, discount: 0 }` }));
const driver = (keys: string) =>
  from(
    scenarioText({
      drivers: `drivers:\n  fuel: { ${keys} }`,
      contract: 'contract: { decision dates: [1], payoff: fuel, discount: 0 }',
    }),
  );
const correlation = (keys: string) => from(scenarioText({ correlation: `correlation:\n  - ${keys}` }));
const method = (keys: string) => from(scenarioText({ method: `method: { ${keys} }` }));

/** The codes of the rooms that read scenarios. */
export const scenarioCodeRows: readonly CodeRow[] = [
  ['scenario-too-large', from('x'.repeat(1_000_001))],
  ['scenario-too-deep', from('['.repeat(100_000))],
  ['scenario-empty', from('')],
  ['not-yaml', from('title: "open')],
  ['several-documents', from('a: 1\n---\nb: 2\n')],
  ['yaml-alias', from('title: &a b')],
  ['yaml-tag', from('title: !!str b')],
  ['yaml-directive', from('%YAML 1.1\n---\ntitle: a')],
  ['duplicate-key', from('title: a\ntitle: b')],
  ['key-not-text', from('1: a')],
  ['object-not-plain', () => readScenarioObject(() => 1).messages],
  ['too-many-mistakes', from(`[${','.repeat(300)}`)],
  ['unknown-key', from(scenarioText({ before: 'titel: a' }))],
  ['missing-key', from('title: a')],
  ['wrong-type', from(scenarioText({ before: 'title: []' }))],
  ['wrong-choice', contract('payoff: fuel\n  decided by: nobody')],
  ['not-built-yet', contract('payoff: fuel\n  notice: 0.1')],
  ['bad-name', from(scenarioText({ constants: 'constants: { rate: 0, my rate: 1 }' }))],
  ['reserved-name', from(scenarioText({ constants: 'constants: { rate: 0, max: 1 }' }))],
  ['name-used-twice', from(scenarioText({ constants: 'constants: { rate: 0, fuel: 1 }' }))],
  ['unknown-name', constant('process')],
  ['unknown-function', constant('eval(1)')],
  ['name-not-usable-here', constant('fuel')],
  ['unobserved-driver', driver('start: 1, law: normal, volatility: 1, observed: no')],
  ['expression-syntax', constant('1 +')],
  ['expression-too-long', constant(`${'1+'.repeat(5001)}1`)],
  ['expression-too-deep', constant(`${'('.repeat(101)}1${')'.repeat(101)}`)],
  ['wrong-argument-count', constant('max(1)')],
  ['bare-family', contract('payoff: lot')],
  ['not-a-family', contract('payoff: sum(fuel)')],
  ['index-not-constant', contract('payoff: lot[t]')],
  ['index-out-of-range', contract('payoff: lot[4]')],
  ['condition-expected', contract('payoff: if(fuel, 1, 2)')],
  ['number-expected', contract('payoff: 1 + (fuel > 1)')],
  ['chained-comparison', contract('payoff: if(0 < fuel < 1, 1, 2)')],
  ['not-finite-value', constant('1 / 0')],
  ['value-out-of-range', driver('start: 1, law: normal, volatility: -1')],
  ['constant-cycle', constant('a')],
  [
    'too-many-constants',
    from(
      scenarioText({ constants: `constants: { ${Array.from({ length: 2001 }, (_, k) => `c${k}: 1`).join(', ')} }` }),
    ),
  ],
  ['bad-date', from(scenarioText({ before: 'as of: 2027-02-30' }))],
  ['unknown-law', driver('start: 1, law: gravity')],
  ['key-of-another-law', driver('start: 1, law: normal, volatility: 1, speed: 2')],
  ['start-count', driver('start: [1, 2], law: normal, volatility: 1')],
  ['too-many-drivers', driver('count: 1001, start: 1, law: normal, volatility: 1')],
  ['correlation-stated-twice', correlation('{ among: lot, value: 0 }\n  - { among: lot, value: 0 }')],
  ['correlation-with-itself', correlation('{ between: [fuel, fuel], value: 0 }')],
  ['matrix-shape', correlation('{ of: [fuel, lot], matrix: [[1]] }')],
  ['matrix-not-symmetric', correlation('{ of: [fuel, "lot[1]"], matrix: [[1, 0], [0.1, 1]] }')],
  ['matrix-diagonal', correlation('{ of: [fuel, "lot[1]"], matrix: [[1, 0], [0, 0.5]] }')],
  ['correlation-impossible', correlation('{ among: lot, value: -0.9 }')],
  ['mixed-forms', dates('{ count: 1, last: 1, every: 1 }')],
  ['dates-not-rising', dates('[2, 1]')],
  ['date-before-today', dates('[-1, 1]')],
  ['no-date-after-today', dates('[0]')],
  ['too-many-dates', dates('{ count: 100001, last: 1 }')],
  ['dates-do-not-divide', dates('{ first: 1, last: 2, every: 0.3 }')],
  ['today-contradicted', dates('{ first: 0, last: 2, every: 1, today: no }')],
  ['width-and-counts', method('bracket width: { money: 1 }, counts: { outer: 5 }')],
  ['count-without-use', method('upper: { method: one-step, outer: 5 }')],
  ['bad-override', () => readScenario(scenarioText(), { width: 'wide' }).messages],
];
