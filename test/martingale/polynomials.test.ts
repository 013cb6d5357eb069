import { expect, test } from 'vitest';
import { type Moments, mergeMoments, noMoments } from '#built/numeric/moments.js';
import { wasmInterpreters } from '#built/program/wasm-interpreter.js';
import { Block } from '#built/rule/block.js';
import { loadKernels } from '#built/workers/machine.js';
import { programsOf } from '../fitted.js';
import { lots } from '../scenario-texts.js';
import { limit, momentsOf, standardisedError } from '../statistics.js';

const blockCount = 60;

/**
 * Moments of polynomial × weight over one step from a random state, the weight known before the step: 1, or whether the
 * first driver is above the second.
 */
function polynomialMoments(
  text: string,
  weighs: 'state' | 'next state',
): { first: Moments[]; weighted: Moments[]; squares: Moments[] } {
  const { programs, seed } = programsOf(text);
  const block = new Block(programs, seed, wasmInterpreters(loadKernels()));
  const { layout, polynomialNames } = programs;
  const count = polynomialNames.length;
  const empty = () => new Array<Moments>(count).fill(noMoments);
  const [first, weighted, squares] = [empty(), empty(), empty()];
  for (let index = 0; index < blockCount; index++) {
    block.restart();
    for (let date = 0; date < 2; date++) {
      block.advance();
      block.draw('pilot', index, date, 0);
      if (date === 1) block.polynomials();
      block.step(date, 0);
    }
    const from = weighs === 'state' ? layout.state : layout.next;
    const [a, b] = [block.column(from), block.column(from + 1)];
    const weight = a.map((value, lane) => (value > b[lane]! ? 1 : -1));
    for (let p = 0; p < count; p++) {
      const values = block.column(layout.polynomials + p);
      first[p] = mergeMoments(first[p]!, momentsOf(Float64Array.from(values), 0, 512));
      weighted[p] = mergeMoments(
        weighted[p]!,
        momentsOf(
          values.map((value, lane) => value * weight[lane]!),
          0,
          512,
        ),
      );
      squares[p] = mergeMoments(
        squares[p]!,
        momentsOf(
          values.map((value) => value * value),
          0,
          512,
        ),
      );
    }
  }
  return { first, weighted, squares };
}

test.each([
  ['sorted, independent', lots({ count: 3 })],
  ['sorted, correlated', lots({ count: 3, correlation: 0.6 })],
  ['not sorted', lots({ count: 2, payoff: 'max(0, lot[1] - 100)' })],
])('polynomials of innovations, %s: mean 0 whatever the state, variance 1', (_, text) => {
  const { first, weighted, squares } = polynomialMoments(text, 'state');
  for (let p = 0; p < first.length; p++) {
    expect(Math.abs(standardisedError(first[p]!, 0))).toBeLessThan(limit);
    expect(Math.abs(standardisedError(weighted[p]!, 0))).toBeLessThan(limit);
    expect(Math.abs(standardisedError(squares[p]!, 1))).toBeLessThan(limit);
  }
});

test('the same check catches a weight that looks ahead', () => {
  const { weighted } = polynomialMoments(lots({ count: 2, payoff: 'max(0, lot[1] - 100)' }), 'next state');
  expect(Math.max(...weighted.map((moments) => Math.abs(standardisedError(moments, 0))))).toBeGreaterThan(30);
});
