import { expect, test } from 'vitest';
import { readScenarioObject, scenarioText as textOfObject } from '#built/scenario/read-object.js';
import { readScenario } from '#built/scenario/read-scenario.js';

const object = {
  seed: 'a: b # c',
  constants: { rate: 0.05, spread: { value: 0.2, plausible: 0.01 } },
  drivers: {
    lot: {
      count: 2,
      start: [100, 90],
      law: 'lognormal',
      'growth of mean': 'rate',
      volatility: 'spread',
      observed: true,
    },
  },
  correlation: [{ between: ['lot[1]', 'lot[2]'], value: -0.25 }],
  contract: {
    'decision dates': [0.5, 1],
    payoff: 'max(0, largest(lot, 2) - 100)',
    discount: 'rate',
    notice: undefined,
  },
  method: { 'bracket width': { relative: '0.2%' } },
};

test('an object gives the same model as its text', () => {
  const { scenario, messages } = readScenarioObject(object);
  expect(messages).toEqual([]);
  expect(scenario!.model).toMatchObject({
    seed: 'a: b # c',
    correlation: [
      [1, -0.25],
      [-0.25, 1],
    ],
    method: { bracketWidth: { relative: 0.002 } },
  });
  expect(readScenario(textOfObject(object) as string).scenario).toEqual(scenario);
});

test('mistakes are placed in the text that is written from the object', () => {
  const { messages } = readScenarioObject({
    ...object,
    contract: { ...object.contract, payoff: 'max(0, strik - lot[1])' },
  });
  expect(messages).toMatchObject([{ code: 'unknown-name', place: { file: 'scenario', length: 5 } }]);
  const { place, sourceLine } = messages[0]!;
  expect(sourceLine!.slice(place!.column - 1, place!.column - 1 + place!.length)).toBe('strik');
});

test('long formulas stay on one line', () => {
  const payoff = `max(0, ${'largest(lot) + '.repeat(40)}0 - «strik»)`;
  const { messages } = readScenarioObject({
    ...object,
    contract: { ...object.contract, payoff: payoff.replace(/[«»]/g, '') },
  });
  expect(messages[0]!.place).toMatchObject({ length: 5 });
});

const circular: Record<string, unknown> = { ...object };
circular.constants = circular;
const deep = Array.from({ length: 50 }).reduce<unknown>((inner) => [inner], 1);

test.each([
  ['a circle', circular],
  ['a function', { ...object, title: () => 'a' }],
  ['a symbol', { ...object, title: Symbol('a') }],
  ['a big integer', { ...object, seed: 10n }],
  ['a date', { ...object, 'as of': new Date(0) }],
  ['a map', new Map()],
  ['too deep', { ...object, title: deep }],
  ['too long', { ...object, title: new Array(1e9) }],
  [
    'a throwing getter',
    {
      ...object,
      get title() {
        throw new Error('no');
      },
    },
  ],
  [
    'a throwing proxy',
    new Proxy(
      {},
      {
        ownKeys: () => {
          throw new Error('no');
        },
      },
    ),
  ],
  ['undefined', undefined],
])('%s is no plain data', (_name, value) => {
  const { scenario, messages } = readScenarioObject(value);
  expect(scenario).toBeNull();
  expect(messages).toMatchObject([{ code: 'object-not-plain', place: null }]);
});

test.each([
  ['null', null, 'scenario-empty'],
  ['a list', [], 'wrong-type'],
  ['a text', 'drivers: {}', 'wrong-type'],
  ['infinity', { ...object, constants: { rate: Number.POSITIVE_INFINITY } }, 'not-finite-value'],
  ['an own __proto__', JSON.parse('{"__proto__": 1}'), 'reserved-name'],
])('%s is answered like its text', (_name, value, code) => {
  expect(readScenarioObject(value).messages[0]).toMatchObject({ code });
});
