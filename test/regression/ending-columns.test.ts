import { expect, test } from 'vitest';
import { createPlainInterpreter } from '#built/program/plain-interpreter.js';
import { Block } from '#built/rule/block.js';
import type { Programs } from '#built/rule/programs.js';
import { emptyRule } from '#built/rule/rule.js';
import { programsOf } from '../fitted.js';

const programsWith = (event: string, method = 'auto'): Programs =>
  programsOf(
    [
      'drivers:',
      '  lot: { count: 2, start: 100, law: lognormal, growth of mean: 0, volatility: 0.2 }',
      '  fuel: { start: 10, law: normal, volatility: 2 }',
      'contract:',
      '  decision dates: { count: 10, last: 1 }',
      '  payoff: max(0, largest(lot) - 100)',
      `  ends when: { event: "${event}", watched: decision dates }`,
      '  discount: 0',
      `method: { basis: ${method} }`,
      '',
    ].join('\n'),
  ).programs;

const endingNames = (programs: Programs) =>
  programs.columns.map(({ name }) => name).filter((name) => name.includes('goes on'));

const names = ['at the next date', 'after two steps', 'a third of the way'].flatMap((when) => [
  `contract goes on ${when}`,
  `payoff × contract goes on ${when}`,
]);

test.each([
  ['largest(lot) >= 130', names],
  ['130 < largest(lot)', names],
  ['smallest(lot) <= 80 or fuel > 14 or mean(lot) < 70', names],
  ['t >= 0.5', names],
  ['largest(lot) >= 130 and fuel > 14', []],
  ['not (largest(lot) < 130)', []],
  ['largest(lot) >= 130 or not (fuel < 14)', []],
  ['fuel == 14', []],
])('%s', (event, expected) => {
  expect(endingNames(programsWith(event))).toEqual(expected);
});

test('a basis that is stated gets no columns of its own accord', () => {
  expect(endingNames(programsWith('fuel > 14', '[fuel]'))).toEqual([]);
});

/** The chance that the contract goes on at the next date, as the column has it, for two prices and the fuel. */
function goesOn(programs: Programs, lots: readonly [number, number], fuel = 10): number {
  const block = new Block(programs, 'oak', createPlainInterpreter);
  block.lanes = 1;
  const { next, basis } = programs.layout;
  [...lots, fuel].forEach((value, index) => {
    block.column(next + index)[0] = value;
  });
  block.evaluate(1, emptyRule(programs), 0);
  return block.column(basis + programs.columns.findIndex(({ name }) => name === names[0]))[0]!;
}

test('the column falls from 1 far from the event to 0 where it holds, and each member counts', () => {
  const programs = programsWith('largest(lot) >= 130');
  expect(goesOn(programs, [90, 80])).toBeGreaterThan(0.999);
  const near = goesOn(programs, [125, 80]);
  expect(near).toBeGreaterThan(0.5);
  expect(near).toBeLessThan(0.95);
  expect(goesOn(programs, [125, 125])).toBeCloseTo(near * near, 1);
  expect(goesOn(programs, [129.9, 80])).toBeCloseTo(0.5, 1);
  expect(goesOn(programs, [130, 80])).toBe(0);
});

test('events joined by `or` each take their share', () => {
  const programs = programsWith('largest(lot) >= 130 or fuel > 11');
  const single = goesOn(programsWith('fuel > 11'), [90, 80], 10.5);
  expect(single).toBeLessThan(0.95);
  expect(goesOn(programs, [90, 80], 10.5)).toBeCloseTo(single, 3);
  expect(goesOn(programs, [125, 80], 10.5)).toBeCloseTo(goesOn(programs, [125, 80], 0) * single, 3);
});

test('a margin of the clock alone has no spread, and its column is 1 or 0', () => {
  expect(goesOn(programsWith('t >= 0.3'), [90, 80])).toBe(1);
  expect(goesOn(programsWith('t >= 0.15'), [90, 80])).toBe(0);
});
