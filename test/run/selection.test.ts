import { expect, test } from 'vitest';
import { value } from '#built/index.js';
import type { RunRecord } from '#built/result/record.js';
import { buildPrograms } from '#built/rule/programs.js';
import { valueScenario } from '#built/run/value.js';
import { readScenario } from '#built/scenario/read.js';
import { thisMachine } from '#built/workers/machine.js';
import { recordOf } from '../run-value.js';
import { lots } from '../scenario-texts.js';
import { smallPlan } from '../small-plan.js';

const dates = '[1, 2, 3]';
const nineDates = lots({ count: 1, method: ['bracket width: { relative: 0.05% }'] });
const twoLots = lots({ dates, method: ['bracket width: { relative: 0.05% }'] });
const figures = ['lower', 'upper', 'uppers', 'gap', 'bracket95', 'plan', 'dates'] as const;

/** Runs that choose, in the calling thread, made once. */
const runs = new Map<string, Promise<RunRecord>>();
function chosen(text: string): Promise<RunRecord> {
  const run = runs.get(text) ?? recordOf(text);
  runs.set(text, run);
  return run;
}

function programsOfSize(text: string, size: number) {
  return buildPrograms(readScenario(text, {}).scenario!.model, size);
}

function expectSame(a: RunRecord, b: RunRecord) {
  for (const figure of figures) expect(a[figure], figure).toEqual(b[figure]);
}

test('sizes are tried from small to large, one of them is kept, and the record holds all that was seen', async () => {
  const { selection, plan, basis, pilot } = await chosen(twoLots);
  const { tried, chosenSize } = selection!;
  const kept = tried[chosenSize]!;
  expect(tried.length).toBeGreaterThan(1);
  expect(tried.map(({ basisSize }) => basisSize)).toEqual(tried.map((_, index) => index));
  tried.forEach(({ columnCount, fitOperations, ...others }, index) => {
    expect(columnCount).toBe(programsOfSize(twoLots, index).columns.length);
    expect(columnCount).toBeGreaterThan(tried[index - 1]?.columnCount ?? 0);
    expect(fitOperations).toBeGreaterThan(tried[index - 1]?.fitOperations ?? 0);
    for (const [name, figure] of Object.entries(others)) {
      if (name !== 'basisSize') expect(figure, name).toBeGreaterThan(0);
    }
  });
  expect(plan).toMatchObject({ basisSize: chosenSize, fitPathCount: kept.fitPathCount });
  expect(basis.columns).toHaveLength(kept.columnCount);
  // The pilot sees the same rule on other paths.
  expect(kept.lowerStandardDeviation / pilot!.lowerStandardDeviation).toBeCloseTo(1, 0);
  expect(kept.lowerStandardDeviation).not.toBe(pilot!.lowerStandardDeviation);
});

test('the plan of a run replays it to the last bit, whichever size was kept', async () => {
  const kept: number[] = [];
  for (const text of [nineDates, twoLots]) {
    const record = await chosen(text);
    const again = await recordOf(text, { plan: record.plan });
    expect(again.selection).toBeNull();
    expectSame(again, record);
    kept.push(record.plan.basisSize);
  }
  expect(Math.max(...kept)).toBeGreaterThan(0);
});

test('the calling thread, one worker and two choose alike and give the same bits', async () => {
  const alone = await chosen(nineDates);
  for (const workers of [1, 2]) {
    const record = await recordOf(nineDates, { workers });
    expect(record.selection).toEqual(alone.selection);
    expect(record.rounds).toEqual(alone.rounds);
    expectSame(record, alone);
  }
});

test.each([
  ['a stated basis', lots({ dates, method: ['counts: { fit: 3000 }', 'basis: [largest(lot)]'] }), {}],
  ['a plan', lots({ dates }), { plan: smallPlan }],
  ['fixed counts of outer paths and inner points', lots({ dates, method: ['counts: { outer: 512, inner: 8 }'] }), {}],
  ['all counts fixed', lots({ dates, method: ['counts: { fit: 3000, outer: 512, inner: 8 }'] }), {}],
])('with %s nothing is left to choose', async (_, text, options) => {
  const { selection, rounds } = await recordOf(text, options);
  expect(selection).toBeNull();
  expect(rounds).toHaveLength(1);
});

test('a size beyond those of the scenario is refused with its name', async () => {
  const sizes = programsOfSize(twoLots, 0).basisSizeCount;
  const refusal = async (text: string, basisSize: number) => {
    const outcome = await value(text, { workers: 0, plan: { ...smallPlan, basisSize } });
    return outcome.kind === 'refused' ? outcome.messages.map(({ code, what }) => `${code}: ${what}`) : [];
  };
  expect(await refusal(twoLots, sizes)).toEqual([
    `plan-does-not-fit: The plan's basisSize is ${sizes}; the basis of this scenario has ${sizes} sizes, counted from 0.`,
  ]);
  expect(await refusal(lots({ dates, method: ['basis: [largest(lot)]'] }), 1)).toEqual([
    "plan-does-not-fit: The plan's basisSize is 1; the basis of this scenario has one size, counted from 0.",
  ]);
});

/** A run on a clock that goes on by a second whenever somebody looks at it. */
async function underBudget(budgetSeconds: number) {
  let seconds = 0;
  const environment = { ...thisMachine(), now: () => 1000 * seconds++ };
  const text = lots({ count: 1, dates });
  const outcome = await valueScenario(text, { workers: 0, budgetSeconds }, environment);
  if (outcome.kind !== 'delivered') throw new Error(JSON.stringify(outcome));
  const frozen = { ...environment, now: () => 0 };
  const again = await valueScenario(text, { workers: 0, plan: outcome.record.plan }, frozen);
  if (again.kind !== 'delivered') throw new Error(JSON.stringify(again));
  return { record: outcome.record, again: again.record };
}

test('a budget chooses sizes by the clock, once; its plan replays without one', async () => {
  const short = await underBudget(8);
  expect(short.record.selection!.tried).toHaveLength(1);
  expect(short.record.selection!.ended).toBe('larger size too costly');
  const long = await underBudget(60);
  expect(long.record.selection!.tried.length).toBeGreaterThan(1);
  for (const { record, again } of [short, long]) {
    expect(record.rounds).toHaveLength(1);
    expectSame(again, record);
  }
  expect(long.record.plan.outerPathCount).toBeGreaterThan(short.record.plan.outerPathCount);
});
