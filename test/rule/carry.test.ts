import { describe, expect, test } from 'vitest';
import { fitRule } from '#built/rule/backward-induction.js';
import { loadPaths, valuesAt } from '#built/rule/fit-store.js';
import { openContext } from '#built/run/fit-size.js';
import { createJobRunner, type Job } from '#built/workers/jobs.js';
import { loadKernels } from '#built/workers/machine.js';
import { type Fitted, fitted, programsOf } from '../fitted.js';
import { lots } from '../scenario-texts.js';

const pathCount = 4000;
const range = { firstBlock: 0, blockCount: Math.ceil(pathCount / 512) };
const ending = (atExpiry: string) =>
  `${atExpiry}\n  ends when: { event: largest(lot) >= 130, watched: decision dates, pays: 3 }`;

/** What stands in the first block at a date, by lane: computed here from basis and coefficients. */
function blockAt({ block, programs, context, rule }: Fitted, date: number) {
  const { store } = context;
  const { layout, columns, integrandColumnCount, polynomialNames, floor } = programs;
  block.lanes = 512;
  loadPaths(block, store, 0, date);
  block.advance();
  block.draw('fit', 0, date, 0);
  block.polynomials();
  loadPaths(block, store, 0, date);
  block.evaluate(date, rule, 0);
  const polynomialCount = polynomialNames.length;
  return Array.from({ length: block.lanes }, (_, lane) => {
    const at = (column: number) => block.column(column)[lane]!;
    const combined = (coefficients: Float64Array, first: number, count: number) => {
      let sum = 0;
      for (let k = 0; k < count; k++) sum += coefficients[first + k]! * at(layout.basis + k);
      return sum;
    };
    const continuation = combined(rule.continuation, date * columns.length, columns.length);
    let increment = 0;
    for (let p = 0; p < polynomialCount; p++) {
      const first = (date * polynomialCount + p) * integrandColumnCount;
      increment += combined(rule.integrands, first, integrandColumnCount) * at(layout.polynomials + p);
    }
    return {
      payoff: at(layout.payoff),
      ended: layout.ended !== null && at(layout.ended) !== 0,
      held: floor === null ? continuation : Math.max(floor, continuation),
      later: valuesAt(store, date + 1, 0, 512)[lane]! - increment,
      carried: valuesAt(store, date, 0, 512)[lane]!,
    };
  });
}

/** The share λ that each lane which holds on shows; lanes that cannot tell are left out. */
function sharesOf(lanes: ReturnType<typeof blockAt>): number[] {
  return lanes
    .filter(({ payoff, held, later, ended }) => !ended && held > payoff && Math.abs(later - held) > 0.05)
    .map(({ held, later, carried }) => (carried - held) / (later - held));
}

describe('what the fit carries back along a path', () => {
  test.each([
    ['without an event', lots()],
    ['with one', lots({ atExpiry: ending('lapse') })],
  ])('is C + λ (G - C) where the rule holds on, else what is received: %s', async (_, text) => {
    const lanes = blockAt(await fitted(text, pathCount), 1);
    const shares = sharesOf(lanes);
    expect(shares.length).toBeGreaterThan(100);
    expect(shares[0]!).toBeGreaterThan(0);
    expect(shares[0]!).toBeLessThan(1);
    for (const share of shares) expect(share).toBeCloseTo(shares[0]!, 8);
    const taken = lanes.filter(({ payoff, held, ended }) => ended || held < payoff);
    expect(taken.length).toBeGreaterThan(5);
    for (const { payoff, carried } of taken) expect(carried).toBe(payoff);
  });

  test('looks as far ahead, as a share of the dates, however many those are', async () => {
    const shareWith = async (count: number) => {
      const [share] = sharesOf(blockAt(await fitted(lots({ dates: `{ count: ${count}, last: 3 }` }), pathCount), 1));
      return share!;
    };
    const [nine, eighteen] = [await shareWith(9), await shareWith(18)];
    // λ = 1 - 1 / (dates looked ahead), and twice as many dates are twice as many to look ahead.
    expect((1 - nine) / (1 - eighteen)).toBeCloseTo(2, 6);
  });

  test('is the fitted value itself where there are two dates', async () => {
    const lanes = blockAt(await fitted(lots({ dates: '[1, 2]' }), pathCount), 1);
    for (const { payoff, held, carried } of lanes) expect(carried).toBeCloseTo(Math.max(payoff, held), 9);
    expect(lanes.some(({ later, held }) => Math.abs(later - held) > 0.5)).toBe(true);
  });
});

test.each([
  ['without an event', lots()],
  ['with one', lots({ atExpiry: ending('lapse') })],
])('every sweep may run twice: it reads what it does not write, %s', async (_, text) => {
  const { programs, seed } = programsOf(text);
  const once = await fitted(text, pathCount);
  const context = openContext(programs, seed, pathCount, loadKernels());
  const run = createJobRunner(context);
  const result = (job: Job): never => {
    const reply = run(job);
    if (!reply.ok) throw new Error(JSON.stringify(reply.notFinite));
    return reply.result as never;
  };
  await fitRule(programs, context.rule, context.store.direction, {
    simulate: async () => [result({ kind: 'simulate', range })],
    sweep: async (sweep, date) => {
      const first = result({ kind: 'sweep', sweep, date, range });
      const values = Float64Array.from(context.store.values);
      expect(result({ kind: 'sweep', sweep, date, range })).toEqual(first);
      expect(Float64Array.from(context.store.values)).toEqual(values);
      return [first];
    },
  });
  expect([...context.rule.continuation]).toEqual([...once.rule.continuation]);
  expect([...context.rule.integrands]).toEqual([...once.rule.integrands]);
});
