import { expect, test } from 'vitest';
import { readScenario } from '#built/scenario/read-scenario.js';
import { marked, mistakes, modelOf, scenarioText } from './scenario-texts.js';

const withClause = (clause: string) =>
  scenarioText({ contract: `contract:\n  decision dates: [1]\n  payoff: fuel\n  discount: 0\n  ${clause}` });

test('the clause is read, with nothing paid by default, and echoed', () => {
  const text = withClause('ends when: { event: largest(lot) >= 170 or fuel < t, watched: decision dates }');
  expect(modelOf(text).contract.endingEvent).toMatchObject({
    event: { text: 'largest(lot) >= 170 or fuel < t' },
    pays: { text: '0', line: null },
  });
  const { scenario } = readScenario(text);
  const settings = scenario!.settings.filter(({ name }) => name.startsWith('contract.ends when'));
  expect(settings.map(({ name, value, origin }) => [name, value, origin.kind])).toEqual([
    ['contract.ends when.event', 'largest(lot) >= 170 or fuel < t', 'line'],
    ['contract.ends when.watched', 'decision dates', 'line'],
    ['contract.ends when.pays', '0', 'default'],
  ]);
  expect(modelOf(withClause('at expiry: lapse')).contract.endingEvent).toBeNull();
});

test.each([
  ['«ends when»: { event: fuel > 3 }', ['missing-key']],
  ['«ends when»: { watched: decision dates, pays: 2 }', ['missing-key']],
  ['ends when: { event: «1», watched: decision dates }', ['condition-expected']],
  ['ends when: { event: «fuel - 3», watched: decision dates }', ['condition-expected']],
  ['ends when: { event: fuel > 3, watched: decision dates, pays: «fuel > 3» }', ['number-expected']],
  ['ends when: { event: «lot» > 3, watched: decision dates }', ['bare-family']],
  ['ends when: { event: fuel > 3, watched: decision dates, pays: «lot» }', ['bare-family']],
  ['ends when: { event: fuel > «barier», watched: decision dates }', ['unknown-name']],
  ['ends when: { event: fuel > 3, watched: decision dates, pays: «fee» }', ['unknown-name']],
  ['ends when: { event: «number» > 3, watched: decision dates }', ['name-not-usable-here']],
  ['ends when: { event: fuel > 3, watched: «decision day» }', ['wrong-choice']],
  ['ends when: { event: fuel > 3, watched: «dates» }', ['wrong-choice']],
  ['ends when: { event: fuel > 3, «watchd»: decision dates }', ['unknown-key']],
  ['ends when: { «evnt»: «feul» > 3, watched: decision dates }', ['unknown-key', 'unknown-name']],
  ['ends when: { event: fuel > 3, watched: decision dates, «pay»: 2 }', ['unknown-key']],
  ['«end when»: { event: «feul» > 3, watched: decision dates }', ['unknown-key', 'unknown-name']],
  ['ends when: «fuel > 3»', ['wrong-type']],
  ['ends when: { event: fuel > 3, «watched»: steps }', ['not-built-yet']],
  ['«ends when»: [{ event: fuel > 3, watched: decision dates }]', ['not-built-yet']],
])('%s', (clause, codes) => {
  const { text, expected } = marked(withClause(clause), ...codes);
  expect(mistakes(text)).toEqual(expected);
});

test('a clause without event and without watching misses both, each with its remedy', () => {
  const { messages } = readScenario(withClause('ends when: { pays: 1 }'));
  expect(messages.map(({ code, mend }) => `${code}: ${mend}`)).toEqual([
    expect.stringMatching(/^missing-key: Add `event:`/),
    expect.stringMatching(/^missing-key: Add `watched: decision dates`/),
  ]);
});

test('what is not built says what to write instead', () => {
  const mendOf = (clause: string) => readScenario(withClause(clause)).messages[0]!.mend;
  expect(mendOf('ends when: { event: fuel > 3, watched: steps }')).toMatch(
    /`watched: decision dates`.*another contract/,
  );
  expect(mendOf('ends when: [{ event: fuel > 3, watched: decision dates }]')).toMatch(/`or`.*if\(/);
});

test('a driver that nobody observes cannot end the contract', () => {
  const text = scenarioText({
    drivers:
      'drivers:\n  fuel: { start: 1, law: normal, volatility: 1 }\n  dark: { start: 1, law: normal, volatility: 1, «observed»: no }',
    contract:
      'contract: { decision dates: [1], payoff: fuel, discount: 0, ends when: { event: «dark» > 1, watched: decision dates } }',
  });
  const { text: bare, expected } = marked(text, 'not-built-yet', 'unobserved-driver');
  expect(mistakes(bare)).toEqual(expected);
});
