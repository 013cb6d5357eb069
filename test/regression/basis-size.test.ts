import { describe, expect, test } from 'vitest';
import { Graph } from '#built/program/graph.js';
import { automaticBasis } from '#built/regression/automatic-basis.js';
import { type BasisSize, basisSizes } from '#built/regression/basis-size.js';
import { buildPrograms } from '#built/rule/programs.js';
import { readScenario } from '#built/scenario/read.js';
import { lots } from '../scenario-texts.js';

const payoffNames = ['payoff', 'payoff expected at the next date', 'payoff expected at the last date'];
/** Columns that the regression package solves in a fraction of a second. */
const mostColumns = 260;

/** The automatic basis of so many leading variables and of others that stand alone. */
function basisOf(leadingCount: number, aloneCount: number, size: BasisSize) {
  const graph = new Graph();
  const variables = Array.from({ length: leadingCount + aloneCount }, (_, index) => ({
    name: `x${index}`,
    node: graph.column(index),
    leading: index < leadingCount,
  }));
  const payoffs = payoffNames.map((name, index) => ({ name, node: graph.column(variables.length + index) }));
  return automaticBasis(graph, variables, payoffs, size);
}

/** Total degree of a product of Hermite polynomials, from its name. */
const degreeOf = (name: string) => [...name.matchAll(/H(\d+)\(/g)].reduce((sum, [, degree]) => sum + Number(degree), 0);

/** Products of that many variables up to a total degree, the constant among them. */
function productCount(variableCount: number, degree: number): number {
  let count = 1;
  for (let i = 1; i <= variableCount; i++) count = (count * (degree + i)) / i;
  return count;
}

describe.each([1, 2, 3, 4, 5, 6, 7, 8])('with %d leading variables', (count) => {
  const sizes = basisSizes(count);
  const bases = sizes.map((size) => basisOf(count, 0, size));

  test('columns rise from size to size, and none has too many', () => {
    expect(sizes.length).toBeGreaterThan(1);
    bases.forEach(({ columns }, index) => {
      expect(columns.length).toBe(productCount(count, sizes[index]!.degree) + payoffNames.length);
      expect(columns.length).toBeGreaterThan(bases[index - 1]?.columns.length ?? 0);
      expect(columns.length).toBeLessThanOrEqual(mostColumns);
      expect(new Set(columns.map(({ name }) => name)).size).toBe(columns.length);
    });
  });

  test('the integrands have the first columns: low degrees and the payoffs', () => {
    bases.forEach(({ columns, integrandColumnCount }, index) => {
      const { degree, integrandDegree } = sizes[index]!;
      expect(integrandDegree).toBeLessThanOrEqual(degree);
      const names = columns.map(({ name }) => name);
      const first = names.slice(0, integrandColumnCount);
      expect(first).toEqual(expect.arrayContaining(['1', ...payoffNames]));
      for (const name of first) expect(degreeOf(name)).toBeLessThanOrEqual(integrandDegree);
      for (const name of names.slice(integrandColumnCount)) expect(degreeOf(name)).toBeGreaterThan(integrandDegree);
    });
  });
});

test('variables that do not lead stand alone, whatever the size', () => {
  for (const size of basisSizes(2)) {
    const [without, beside] = [basisOf(2, 0, size), basisOf(2, 5, size)];
    expect(beside.columns.length).toBe(without.columns.length + 2 * 5);
    expect(beside.integrandColumnCount).toBe(without.integrandColumnCount + 5);
  }
});

test('any count of leading variables has sizes, in pairs only while those are few', () => {
  for (let count = 0; count <= 60; count++) {
    const sizes = basisSizes(count);
    expect(sizes.length).toBeGreaterThan(0);
    expect(Math.max(...sizes.map((size) => basisOf(count, 0, size).columns.length))).toBeLessThanOrEqual(mostColumns);
  }
});

test.each([1, 2, 3, 5, 8, 12, 100])('a right on %d lots has as many sizes as it says, with rising columns', (count) => {
  const { model } = readScenario(lots({ count }), {}).scenario!;
  const { basisSizeCount } = buildPrograms(model);
  const columns = Array.from({ length: basisSizeCount }, (_, size) => buildPrograms(model, size).columns.length);
  expect([...columns].sort((a, b) => a - b)).toEqual(columns);
  expect(new Set(columns).size).toBe(columns.length);
  expect(() => buildPrograms(model, basisSizeCount)).toThrow('no size');
});
