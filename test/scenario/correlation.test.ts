import { expect, test } from 'vitest';
import { indefiniteness } from '#built/scenario/definite.js';
import { readScenario } from '#built/scenario/read-scenario.js';
import { marked, mistakes, modelOf, scenarioText } from './scenario-texts.js';

const withCorrelation = (correlation: string) => scenarioText({ correlation: `correlation:\n${correlation}` });
const matrixOf = (correlation: string) => modelOf(withCorrelation(correlation)).correlation;

test('without statements all drivers are uncorrelated', () => {
  expect(modelOf(scenarioText()).correlation).toEqual([
    [1, 0, 0, 0],
    [0, 1, 0, 0],
    [0, 0, 1, 0],
    [0, 0, 0, 1],
  ]);
});

test('among and between fill the matrix', () => {
  expect(matrixOf('  - { among: lot, value: 0.5 }\n  - { between: [fuel, lot], value: rate }')).toEqual([
    [1, 0.5, 0.5, 0.05],
    [0.5, 1, 0.5, 0.05],
    [0.5, 0.5, 1, 0.05],
    [0.05, 0.05, 0.05, 1],
  ]);
});

test('members are named in quotes', () => {
  expect(matrixOf('  - { between: ["lot[2]", fuel], value: 0.5 }')[1]).toEqual([0, 1, 0, 0.5]);
  expect(matrixOf('  - between:\n    - lot[1]\n    - lot[3]\n    value: 0.5')[0]).toEqual([1, 0, 0.5, 0]);
});

test('a matrix is about the listed drivers in their order', () => {
  expect(matrixOf('  - { of: [fuel, "lot[1]"], matrix: [[1, 0.25], [0.25, 1]] }')).toEqual([
    [1, 0, 0, 0.25],
    [0, 1, 0, 0],
    [0, 0, 1, 0],
    [0.25, 0, 0, 1],
  ]);
  const whole = '  - { of: [lot, fuel], matrix: [[1, .1, .2, .3], [.1, 1, .4, .5], [.2, .4, 1, .6], [.3, .5, .6, 1]] }';
  expect(matrixOf(whole)).toEqual([
    [1, 0.1, 0.2, 0.3],
    [0.1, 1, 0.4, 0.5],
    [0.2, 0.4, 1, 0.6],
    [0.3, 0.5, 0.6, 1],
  ]);
});

test.each([
  ['  - { among: lot, value: «1.1» }', 'value-out-of-range'],
  ['  - { among: lot, value: «20» }', 'value-out-of-range'],
  ['  - { among: «fuel», value: 0 }', 'correlation-with-itself'],
  ['  - { between: [lot, «lot»], value: 0 }', 'correlation-with-itself'],
  ['  - { between: [lot, «"lot[2]"»], value: 0 }', 'correlation-with-itself'],
  ['  - { of: [fuel, «fuel»], matrix: [[1, 0], [0, 1]] }', 'correlation-with-itself'],
  ['  - { between: «[»lot, fuel, lot], value: 0 }', 'wrong-type'],
  ['  - { between: [lot, «feul»], value: 0 }', 'unknown-name'],
  ['  - { between: [lot, «rate»], value: 0 }', 'unknown-name'],
  ['  - { between: [fuel, "lot[«4»]"], value: 0 }', 'index-out-of-range'],
  ['  - { between: [lot, "«fuel[1]»"], value: 0 }', 'not-a-family'],
  ['  - { among: lot, value: 0 }\n  - { between: «["lot[1]", "lot[2]"]», value: 0 }', 'correlation-stated-twice'],
  [
    '  - { between: [lot, fuel], value: 0 }\n  - { of: ["lot[1]", fuel], matrix: [[1, 0], [«0», 1]] }',
    'correlation-stated-twice',
  ],
  ['  - { of: [lot, fuel], matrix: «[[1]]» }', 'matrix-shape'],
  ['  - { of: [fuel, "lot[1]"], matrix: [[1, 0], «[0]»] }', 'matrix-shape'],
  ['  - { of: [fuel, "lot[1]"], matrix: [[1, 0.1], [«0.2», 1]] }', 'matrix-not-symmetric'],
  ['  - { of: [fuel, "lot[1]"], matrix: [[1, 0], [0, «4»]] }', 'value-out-of-range'],
  ['  - { of: [fuel, "lot[1]"], matrix: [[1, 0], [0, «0.9»]] }', 'matrix-diagonal'],
  ['  - { among: lot, value: 0, «matrix»: [[1]] }', 'mixed-forms'],
  ['  - { «among»: lot }', 'missing-key'],
  ['  - { «value»: 0.1 }', 'missing-key'],
  ['  - {«} »', 'missing-key'],
])('%s', (correlation, code) => {
  const { text, expected } = marked(withCorrelation(correlation).replace('{«} »', '«{}»'), code);
  expect(mistakes(text)).toEqual(expected);
});

test('a matrix that is not positive semidefinite is refused with the offending pairs named', () => {
  const correlation =
    '  - { between: ["lot[1]", "lot[2]"], value: 0.9 }\n  - { between: ["lot[2]", "lot[3]"], value: 0.9 }\n  - { between: ["lot[1]", "lot[3]"], value: -0.9 }';
  const { messages } = readScenario(withCorrelation(correlation));
  expect(messages).toHaveLength(1);
  // Eigenvalues of this matrix: 1 + 0.9 twice, and 1 - 2 * 0.9.
  expect(messages[0]).toMatchObject({ code: 'correlation-impossible', place: { line: expect.any(Number) } });
  expect(messages[0]!.evidence.form).toBeCloseTo(-0.8, 12);
  const pairs = messages[0]!.evidence.pairs as { drivers: string[]; value: number }[];
  expect(new Set(pairs.map(({ drivers }) => drivers.join(' ')))).toEqual(
    new Set(['lot[1] lot[2]', 'lot[2] lot[3]', 'lot[1] lot[3]']),
  );
});

test('a common correlation below what a family can have says how low it may be', () => {
  const { text, expected } = marked(withCorrelation('  - { among: «lot», value: -0.51 }'), 'correlation-impossible');
  expect(mistakes(text)).toEqual(expected);
  expect(readScenario(text).messages[0]!.mend).toContain('-0.5000');
  expect(mistakes(withCorrelation('  - { among: lot, value: -0.5 }'))).toEqual([]);
});

test('a singular matrix is right, and a rounding error below zero is', () => {
  expect(mistakes(withCorrelation('  - { among: lot, value: 1 }\n  - { between: [lot, fuel], value: -1 }'))).toEqual(
    [],
  );
  const matrix = (value: number) => [Float64Array.of(1, value), Float64Array.of(value, 1)];
  expect(indefiniteness(matrix(1 + 5e-11))).toBeNull();
  expect(indefiniteness(matrix(1 + 2e-10))?.form).toBeCloseTo(-2e-10, 15);
});

test('large matrices are judged by the factorisation alone and agree with the eigenvalues', () => {
  const common = (size: number, value: number) =>
    Array.from({ length: size }, (_, i) => Float64Array.from({ length: size }, (_, j) => (i === j ? 1 : value)));
  for (const size of [150, 300]) {
    const least = -1 / (size - 1);
    expect(indefiniteness(common(size, least * 0.999))).toBeNull();
    const failure = indefiniteness(common(size, least * 1.01));
    expect(failure!.form).toBeLessThan(-1e-6);
    expect(failure!.form).toBeGreaterThan(-0.0101);
    expect(failure!.pairs).toHaveLength(3);
  }
});
