import { expect, test } from 'vitest';
import type { ScenarioOverrides } from '#built/scenario/overrides.js';
import { readScenario } from '#built/scenario/read-scenario.js';
import { marked, mistakes, modelOf, scenarioText } from './scenario-texts.js';

const withMethod = (method: string) => scenarioText({ method: `method:\n${method}` });
const methodOf = (method: string, overrides = {}) => modelOf(withMethod(method), overrides).method;

test('widths in both units, with the default of a fifth of a percent', () => {
  expect(modelOf(scenarioText()).method.bracketWidth).toEqual({ relative: 0.002 });
  expect(methodOf('  bracket width: { relative: 0.1% }').bracketWidth).toEqual({ relative: 0.001 });
  expect(methodOf('  bracket width: { relative: 0.002 }').bracketWidth).toEqual({ relative: 0.002 });
  expect(methodOf('  bracket width: { money: 0.02 }').bracketWidth).toEqual({ money: 0.02 });
  expect(methodOf('  bracket width: { money: 0.02 }', { width: '2 %' }).bracketWidth).toEqual({ relative: 0.02 });
  expect(methodOf('  basis: auto', { width: '0.25' }).bracketWidth).toEqual({ money: 0.25 });
});

test('counts, upper bound and basis', () => {
  expect(methodOf('  counts: { fit: 1000, outer: 2e3, inner: 16 }')).toMatchObject({
    fitPathCount: 1000,
    outerPathCount: 2000,
    innerPointCount: 16,
  });
  expect(methodOf('  upper: regressed').upper).toBe('regressed');
  expect(methodOf('  upper: { method: andersen-broadie, outer: 300, inner: 400 }')).toMatchObject({
    upper: 'andersen-broadie',
    nestedOuterPathCount: 300,
    nestedInnerPathCount: 400,
  });
  expect(methodOf('  upper: regressed', { upper: 'one-step' }).upper).toBe('one-step');
  expect(methodOf('  basis: [fuel, "largest(lot, 2)", fuel * t]').basis).toMatchObject([
    { text: 'fuel' },
    { text: 'largest(lot, 2)' },
    { text: 'fuel * t' },
  ]);
});

test.each([
  ['  counts: { fit: «0» }', ['value-out-of-range']],
  ['  counts: { outer: «-5» }', ['value-out-of-range']],
  ['  counts: { fit: «2.5» }', ['value-out-of-range']],
  [
    '  counts: { fit: «100000001», outer: «1e9», inner: «65537» }',
    ['value-out-of-range', 'value-out-of-range', 'value-out-of-range'],
  ],
  ['  bracket width: { relative: 1% }\n  counts: { «outer»: 5, «inner»: 6 }', ['width-and-counts', 'width-and-counts']],
  ['  bracket width: { relative: «0%» }', ['value-out-of-range']],
  ['  bracket width: { relative: «101%» }', ['value-out-of-range']],
  ['  bracket width: { relative: «-1%» }', ['value-out-of-range']],
  ['  bracket width: { money: «1%» }', ['value-out-of-range']],
  ['  bracket width: { money: «0» }', ['value-out-of-range']],
  ['  bracket width: { money: «rate» }', ['value-out-of-range']],
  ['  bracket width: { relative: 1%, «money»: 1 }', ['mixed-forms']],
  ['  «bracket width»: {}', ['missing-key']],
  ['  upper: { method: one-step, «outer»: 3 }', ['count-without-use']],
  ['  upper: { «inner»: 3 }', ['count-without-use']],
  ['  basis: «[]»', ['value-out-of-range']],
  ['  basis: [fuel, «lot»]', ['bare-family']],
  ['  basis: [fuel > 1]'.replace('fuel > 1', '«fuel > 1»'), ['number-expected']],
  ['  basis: [largest«(»lot, 2]', ['expression-syntax']],
])('%s', (method, codes) => {
  const { text, expected } = marked(withMethod(method), ...codes);
  expect(mistakes(text)).toEqual(expected);
});

test('a comma that cuts a formula in two is recognised', () => {
  const { messages } = readScenario(withMethod('  basis: [largest(lot, 2)]'));
  expect(messages.map(({ code }) => code)).toEqual(['expression-syntax', 'expression-syntax']);
  for (const { mend } of messages) expect(mend).toContain('quotes');
});

test.each([
  [{ width: 'wide' }, 'bad-override'],
  [{ width: '0' }, 'bad-override'],
  [{ width: '200%' }, 'bad-override'],
  [{ upper: 'constructor' as never }, 'bad-override'],
  [{ seed: '' }, 'bad-override'],
  [{ seed: 7 as never }, 'bad-override'],
])('the override %j is refused without a place', (overrides, code) => {
  expect(mistakes(scenarioText(), overrides)).toEqual([code]);
});

test('a width from outside contradicts counts in the file, at their place', () => {
  const { text, expected } = marked(withMethod('  counts: { «outer»: 5 }'), 'width-and-counts');
  expect(mistakes(text, { width: '1%' })).toEqual(expected);
});

test('a mistake of an override says which option it is', () => {
  const optionsOf = (text: string, overrides: ScenarioOverrides) =>
    readScenario(text, overrides).messages.map(({ what, evidence }) => [evidence.override, what.includes('`--')]);
  const fixed = withMethod('  counts: { outer: 5, inner: 3 }');
  expect(optionsOf(fixed, { width: '1%' })).toEqual([
    ['--width', true],
    ['--width', true],
  ]);
  expect(optionsOf(fixed, { budgetSeconds: 3 })).toEqual([['--budget', true]]);
  expect(optionsOf(scenarioText(), { seed: '' })).toEqual([['--seed', false]]);
});

test('a budget needs one count that is free', () => {
  const { text, expected } = marked(withMethod('  counts: { «outer»: 5, inner: 3 }'), 'bad-override');
  expect(mistakes(text, { budgetSeconds: 3 })).toEqual(expected);
  expect(mistakes(withMethod('  counts: { outer: 5 }'), { budgetSeconds: 3 })).toEqual([]);
});
