import { expect, test } from 'vitest';
import { z } from 'zod';
import { scenarioGrammar } from '#built/scenario/grammar.js';
import { readScenario } from '#built/scenario/read-scenario.js';
import { marked, mistakes, scenarioText } from './scenario-texts.js';

const drivers = 'drivers: { fuel: { start: 10, law: normal, volatility: 2 } }';
const contract = 'contract: { decision dates: { count: 4, last: 2 }, payoff: fuel, discount: 0 }';

test.each([
  ['a misspelt key at the top', `${drivers}\n${contract}\n«corelation»: []`, ['unknown-key'], 'correlation'],
  [
    'a misspelt key of a driver',
    `drivers: { fuel: { start: 1, law: normal, «volatilty»: 2 } }\n${contract}`,
    ['unknown-key'],
    'volatility',
  ],
  ['a key with other capitals', `${drivers}\n«Contract»: 1\n${contract}`, ['unknown-key'], ''],
  [
    'a hyphen for a space',
    `${drivers}\ncontract: { «decision-dates»: [1], decision dates: [1], payoff: 1, discount: 0 }`,
    ['unknown-key'],
    '',
  ],
  ['a key that belongs elsewhere', `${drivers}\n${contract}\n«payoff»: 3`, ['unknown-key'], 'contract'],
  [
    'a misspelt key of a clause that is not built',
    `${drivers}\ncontract: { decision dates: [1], payoff: 1, discount: 0, «rights»: { count: 2, «weight»: 1 } }`,
    ['not-built-yet', 'unknown-key'],
    '',
  ],
  [
    'a misspelt key within a choice of forms',
    `${drivers}\ncontract: { decision dates: { «cont»: 3, last: 2 }, payoff: 1, discount: 0 }`,
    ['unknown-key'],
    'count',
  ],
  [
    'a missing key at the top',
    `«drivers»: { fuel: { start: 10, law: normal, volatility: 2 } }`,
    ['missing-key'],
    'contract',
  ],
  [
    'a missing key of the contract',
    `${drivers}\n«contract»: { decision dates: [1], discount: 0 }`,
    ['missing-key'],
    'payoff',
  ],
  ['a driver without a law', `drivers: { «fuel»: { start: 10 } }\n${contract}`, ['missing-key'], 'law'],
  ['a list where a group is meant', `«drivers»: [1]\n${contract}`, ['wrong-type'], 'group of drivers'],
  [
    'a group where a formula is meant',
    `${drivers}\ncontract: { decision dates: [1], payoff: 1, «notice»: {}, discount: 0 }`,
    ['wrong-type'],
    'formula',
  ],
  ['true where a formula is meant', `constants: { a: «true» }\n${drivers}\n${contract}`, ['wrong-type'], 'formula'],
  [
    'nothing where a formula is meant',
    `${drivers}\ncontract:\n  decision dates: [1]\n  «payoff»:\n  discount: 0`,
    ['wrong-type'],
    'formula',
  ],
  [
    'a wrong item of a list',
    `${drivers}\ncontract: { decision dates: [1, «[»2]], payoff: 1, discount: 0 }`,
    ['wrong-type'],
    'formula',
  ],
  [
    'a word that is no choice',
    `${drivers}\ncontract: { decided by: «hoder», decision dates: [1], payoff: 1, discount: 0 }`,
    ['wrong-choice'],
    'holder',
  ],
  [
    'a word that is no choice among several forms',
    `${drivers}\n${contract}\nmethod: { upper: «onestep» }`,
    ['wrong-choice'],
    'one-step',
  ],
  ['infinity', `constants: { a: «.inf» }\n${drivers}\n${contract}`, ['not-finite-value'], 'finite'],
  ['not a number', `constants: { a: «.nan» }\n${drivers}\n${contract}`, ['not-finite-value'], 'finite'],
  ['a number beyond all numbers', `constants: { a: «1e999» }\n${drivers}\n${contract}`, ['not-finite-value'], 'finite'],
])('%s', (_name, text, codes, mend) => {
  const { text: bare, expected } = marked(text, ...codes);
  expect(mistakes(bare)).toEqual(expected);
  expect(readScenario(bare).messages[0]!.mend).toContain(mend);
});

test('all mistakes of structure come at once', () => {
  const text = marked(
    `«titel»: a\n${drivers}\ncontract: { «decided bye»: holder, decision dates: «soon», payoff: 1, discount: 0, ends when: { watched: «always» } }`,
    'unknown-key',
    'unknown-key',
    'wrong-type',
    'wrong-choice',
  );
  expect(mistakes(text.text)).toEqual(text.expected);
});

test.each([
  ['a key of the contract', `${drivers}\n${contract.replace('payoff', '«pay off»')}`],
  ['a group at the top', `${drivers.replace('drivers', '«driver»')}\n${contract}`],
  ['the law', `${drivers.replace('law', '«lw»')}\n${contract.replace('payoff', 'payoff')}`],
  ['a no-break space in a key', `${drivers}\n${contract.replace('decision dates', '«decision\u00A0dates»')}`],
])('a required key that is misspelt is told once: %s', (_name, text) => {
  const { text: bare, expected } = marked(text, 'unknown-key');
  expect(mistakes(bare)).toEqual(expected);
});

test('a required key that nothing stands for is missing beside an unknown one', () => {
  const { text, expected } = marked(
    `${drivers}\n«contract»: { decision dates: [1], «weather»: 1, discount: 0 }`,
    'missing-key',
    'unknown-key',
  );
  expect(mistakes(text)).toEqual(expected);
});

test('host-language names as keys are unknown keys and nothing else', () => {
  for (const key of ['constructor', 'toString', 'hasOwnProperty', 'valueOf', '__defineGetter__']) {
    expect(mistakes(`${scenarioText()}${key}: 1\n`)).toEqual([`unknown-key 9:1+${key.length}`]);
  }
});

test('the grammar can be written as a JSON Schema that forbids unknown keys', () => {
  const schema = z.toJSONSchema(scenarioGrammar);
  expect(schema).toMatchObject({ type: 'object', additionalProperties: false, required: ['drivers', 'contract'] });
  expect(Object.keys(schema.properties!)).toContain('what if');
});
