import { expect, test } from 'vitest';
import { checkExpression, usedSymbols } from '#built/program/check-expression.js';
import { parseExpression } from '#built/program/parse.js';
import type { Scope, ScopeSymbol } from '#built/program/scope.js';

const symbols = new Map<string, ScopeSymbol>([
  ['rate', { kind: 'constant' }],
  ['two', { kind: 'constant' }],
  ['unknown', { kind: 'constant' }],
  ['fuel', { kind: 'driver', observed: true }],
  ['hidden', { kind: 'driver', observed: false }],
  ['lot', { kind: 'family', count: 3, observed: true }],
  ['herd', { kind: 'family', count: null, observed: true }],
  ['t', { kind: 'clock' }],
  ['number', { kind: 'number' }],
]);
const values = new Map([
  ['rate', 0.05],
  ['two', 2],
]);
const scope: Scope = {
  symbols,
  allowed: new Set(['constant', 'driver', 'family', 'clock']),
  subject: 'the payoff',
  allowedWords: 'constants, observed drivers and the clock',
  observedOnly: true,
  valueOf: (name) => values.get(name) ?? null,
  memberCount: 2,
};

function treeOf(text: string) {
  const parsed = parseExpression(text);
  if ('problem' in parsed) throw new Error(parsed.problem.what);
  return parsed.tree;
}

/** Problems as `code:text that is underlined`. */
function problems(text: string, wanted: 'number' | 'condition' = 'number', inScope = scope): string[] {
  return checkExpression(treeOf(text), inScope, wanted).map(
    ({ code, span }) => `${code}:${text.slice(span.start, span.end)}`,
  );
}

test.each([
  'max(0, largest(lot) - fuel * exp(-rate * t))',
  'if(fuel > 3 and not (t == 0) or rate != two, 1, -1)',
  'lot[1] + lot[two] + lot[two + 1] + largest(lot, 3) + smallest(lot, two)',
  'sum(lot) + mean(lot) + product(lot) + smallest(lot)',
  'min(1, 2, 3, fuel) + abs(fuel) + log(1) + sqrt(2) + floor(t) + normalcdf(0)',
  'lot[unknown] + herd[7] + largest(herd, 9)',
])('%s has no problem', (text) => {
  expect(problems(text)).toEqual([]);
});

test.each([
  ['fuel + strik', ['unknown-name:strik']],
  [
    'constructor + __proto__ + toString + process',
    ['unknown-name:constructor', 'unknown-name:__proto__', 'unknown-name:toString', 'unknown-name:process'],
  ],
  ['hasOwnProperty(1)', ['unknown-function:hasOwnProperty']],
  ['constructor[1]', ['unknown-name:constructor']],
  ['largest(constructor)', ['unknown-name:constructor']],
  ['max + 1', ['unknown-name:max']],
  ['fuel(2)', ['unknown-function:fuel']],
  ['lot(2)', ['unknown-function:lot']],
  ['maximum(fuel, strik)', ['unknown-function:maximum', 'unknown-name:strik']],
  ['hidden + 1', ['unobserved-driver:hidden']],
  ['number + 1', ['name-not-usable-here:number']],
  ['max(0, lot - 1)', ['bare-family:lot']],
  ['max(lot, 1)', ['bare-family:lot']],
  ['exp(lot)', ['bare-family:lot']],
  ['fuel[1]', ['not-a-family:fuel[1]']],
  ['rate[1] + t[1]', ['not-a-family:rate[1]', 'not-a-family:t[1]']],
  ['largest(fuel)', ['not-a-family:fuel']],
  ['sum(lot[1])', ['not-a-family:lot[1]']],
  ['largest(1 + 2)', ['not-a-family:1 + 2']],
  ['max(1)', ['wrong-argument-count:max(1)']],
  ['exp()', ['wrong-argument-count:exp()']],
  ['exp(1, 2)', ['wrong-argument-count:exp(1, 2)']],
  ['if(1 < 2, 3)', ['wrong-argument-count:if(1 < 2, 3)']],
  ['sum(lot, 2)', ['wrong-argument-count:sum(lot, 2)']],
  ['largest(lot, 1, 2)', ['wrong-argument-count:largest(lot, 1, 2)']],
  ['lot[0]', ['index-out-of-range:0']],
  ['lot[4]', ['index-out-of-range:4']],
  ['lot[two / 4]', ['index-out-of-range:two / 4']],
  ['lot[-1]', ['index-out-of-range:-1']],
  ['lot[0/0]', ['index-out-of-range:0/0']],
  ['largest(lot, 0)', ['index-out-of-range:0']],
  ['smallest(lot, 2.5)', ['index-out-of-range:2.5']],
  ['lot[fuel]', ['index-not-constant:fuel']],
  ['lot[floor(t)]', ['index-not-constant:floor(t)']],
  ['largest(lot, lot[1])', ['index-not-constant:lot[1]']],
  ['lot[1 < 2]', ['number-expected:1 < 2']],
  ['1 + (fuel > 2)', ['number-expected:(fuel > 2)']],
  ['-(fuel > 2)', ['number-expected:(fuel > 2)']],
  ['max(0, fuel > 2)', ['number-expected:fuel > 2']],
  ['fuel > 2', ['number-expected:fuel > 2']],
  ['if(fuel, 1, 2)', ['condition-expected:fuel']],
  ['if(fuel > 1, 1 < 2, 2)', ['number-expected:1 < 2']],
  ['if(not fuel, 1, 2)', ['condition-expected:fuel']],
  ['if(fuel and t, 1, 2)', ['condition-expected:fuel', 'condition-expected:t']],
  ['if((1 < 2) == (2 < 3), 1, 2)', ['number-expected:(1 < 2)', 'number-expected:(2 < 3)']],
  ['if(1 < 2 == (2 < 3), 1, 2)', ['chained-comparison:1 < 2 == (2 < 3)', 'number-expected:(2 < 3)']],
  ['if(1 < (2 < 3), 1, 2)', ['number-expected:(2 < 3)']],
  ['if(0 < fuel < strik, 1, 2)', ['unknown-name:strik', 'chained-comparison:0 < fuel < strik'].reverse()],
  ['1e999', ['not-finite-value:1e999']],
])('%s', (text, expected) => {
  expect(problems(text)).toEqual(expected);
});

test('a condition may be wanted', () => {
  expect(problems('fuel > 2', 'condition')).toEqual([]);
  expect(problems('fuel', 'condition')).toEqual(['condition-expected:fuel']);
});

test('near names come from what may be used, functions and laws of the host never', () => {
  const near = (text: string) => checkExpression(treeOf(text), scope, 'number').map(({ evidence }) => evidence.near);
  expect(near('fule + numbr + rat')).toEqual([['fuel'], [], ['rate']]);
  expect(near('maxx(1, 2)')).toEqual([['max']]);
});

test.each([
  ['ln(fuel)', 'The natural logarithm is log(x).'],
  ['log10(fuel)', 'log(x) / log(10)'],
  ['pow(fuel, 2)', 'a ^ b'],
  ['avg(lot)', 'mean(family)'],
  ['Average(lot)', 'mean(family)'],
  ['exp1(fuel)', '`exp`'],
  ['yes', 'a comparison, as x > 0'],
  ['if(true, 1, 2)', 'a comparison, as x > 0'],
])('%s says what is meant', (text, mend) => {
  expect(checkExpression(treeOf(text), scope, 'number').map((problem) => problem.mend)).toEqual([
    expect.stringContaining(mend),
  ]);
});

test('a name with two meanings raises nothing more', () => {
  const unclear: Scope = { ...scope, unclear: new Set(['lot']) };
  expect(problems('largest(lot) + lot[7] + lot + max(lot, 1) + nowhere', 'number', unclear)).toEqual([
    'unknown-name:nowhere',
  ]);
});

test('where `number` is known, an index is checked for every member', () => {
  const members: Scope = { ...scope, allowed: new Set(['constant', 'number', 'family']) };
  expect(problems('lot[number]', 'number', members)).toEqual([]);
  expect(problems('lot[number + 1]', 'number', members)).toEqual([]);
  expect(problems('lot[number + 2]', 'number', members)).toEqual(['index-out-of-range:number + 2']);
  expect(problems('lot[number - 1]', 'number', members)).toEqual(['index-out-of-range:number - 1']);
});

test('at most twenty problems of one expression are kept', () => {
  expect(problems(`max(${'x,'.repeat(100)}1)`)).toHaveLength(20);
});

test('the symbols that an expression uses', () => {
  const used = usedSymbols(treeOf('max(rate, lot[two] + fuel) + if(t > 1, largest(herd), nowhere)'), scope);
  expect([...used.constants].sort()).toEqual(['rate', 'two']);
  expect([...used.drivers].sort()).toEqual(['fuel', 'herd', 'lot']);
  expect(used).toMatchObject({ usesClock: true, usesNumber: false });
});
