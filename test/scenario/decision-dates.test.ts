import { expect, test } from 'vitest';
import { readScenario } from '#built/scenario/read-scenario.js';
import { marked, mistakes, modelOf, scenarioText } from './scenario-texts.js';

const withDates = (dates: string) =>
  scenarioText({ contract: `contract:\n  «decision dates»: ${dates}\n  payoff: fuel\n  discount: rate` });
const plain = (dates: string) => withDates(dates).replace(/[«»]/g, '');
const datesOf = (dates: string) => modelOf(plain(dates)).contract.decisionDates;

test.each([
  ['{ count: 4, last: 2 }', [0.5, 1, 1.5, 2]],
  ['{ count: 4, last: 2, today: yes }', [0, 0.5, 1, 1.5, 2]],
  ['{ count: 1, last: 1, today: true }', [0, 1]],
  ['{ first: 0.5, last: 1.5, every: 0.5 }', [0.5, 1, 1.5]],
  ['{ first: 0.5, last: 1.5, every: 0.5, today: yes }', [0, 0.5, 1, 1.5]],
  ['{ first: 0, last: 1, every: 0.5 }', [0, 0.5, 1]],
  ['{ first: 0, last: 1, every: 0.5, today: yes }', [0, 0.5, 1]],
  ['{ first: 1, last: 1, every: 7 }', [1]],
  ['[0.25, 1/2, 20 * rate]', [0.25, 0.5, 1]],
  ['[0, 1]', [0, 1]],
])('%s', (dates, expected) => {
  expect(datesOf(dates)).toEqual(expected);
});

test('steps that are no binary fractions end on the last date exactly', () => {
  const dates = datesOf('{ first: 0.1, last: 3, every: 0.1 }');
  expect(dates).toHaveLength(30);
  expect(dates.at(-1)).toBe(3);
  expect(datesOf('{ count: 365, last: 1 }').at(-1)).toBe(1);
});

test.each([
  ['{ count: «0», last: 1 }', 'value-out-of-range'],
  ['{ count: «2.5», last: 1 }', 'value-out-of-range'],
  ['{ count: «100001», last: 1 }', 'too-many-dates'],
  ['{ count: 2, last: «0» }', 'value-out-of-range'],
  ['{ count: 2, last: «-1» }', 'date-before-today'],
  ['{ count: 2, last: 1, «every»: 1 }', 'mixed-forms'],
  ['{ first: 0.5, last: 3, every: «0» }', 'value-out-of-range'],
  ['{ first: 0.5, last: 3, every: «-1» }', 'value-out-of-range'],
  ['{ first: «-0.5», last: 3, every: 1 }', 'date-before-today'],
  ['{ first: 3, last: «0.5», every: 1 }', 'dates-not-rising'],
  ['{ first: 0.5, last: 3, every: «0.7» }', 'dates-do-not-divide'],
  ['{ first: 0.5, last: 3, every: «1e-6» }', 'too-many-dates'],
  ['{ first: 0, last: 3, every: 1, today: «no» }', 'today-contradicted'],
  ['[1, «1»]', 'dates-not-rising'],
  ['[1, 3, «2»]', 'dates-not-rising'],
  ['[«-1», 1]', 'date-before-today'],
  ['[1, «fuel»]', 'name-not-usable-here'],
  ['[1, «t»]', 'name-not-usable-here'],
  ['[1, «1/0»]', 'not-finite-value'],
])('%s', (dates, code) => {
  const { text, expected } = marked(
    scenarioText({ contract: `contract:\n  decision dates: ${dates}\n  payoff: fuel\n  discount: rate` }),
    code,
  );
  expect(mistakes(text)).toEqual(expected);
});

test.each([
  ['{ count: 2 }', 'missing-key'],
  ['{ first: 1, last: 2 }', 'missing-key'],
  ['{}', 'missing-key'],
  ['[]', 'no-date-after-today'],
  ['[0]', 'no-date-after-today'],
  ['{ first: 0, last: 0, every: 1 }', 'no-date-after-today'],
  ['{ count: 100000, last: 5e-324 }', 'date'],
])('%s is a mistake of the whole key', (dates, code) => {
  if (code === 'date') expect(mistakes(plain(dates))).toEqual([expect.stringContaining('dates-not-rising')]);
  else {
    const { text, expected } = marked(withDates(dates), code);
    expect(mistakes(text)).toEqual(expected);
  }
});

test('no rounding of the last bits shows in a message', () => {
  const { messages } = readScenario(plain('{ first: 0.1, last: 3, every: 0.4 }'));
  expect(messages[0]!.what).toBe('From 0.1 in steps of 0.4 the dates reach 2.9 and then pass 3.');
});
