import { expect, test } from 'vitest';
import { buildPrograms } from '#built/rule/programs.js';
import { openCandidates } from '#built/run/candidates.js';
import { checkScenario } from '#built/run/check.js';
import { readScenario } from '#built/scenario/read.js';
import { thisMachine } from '#built/workers/machine.js';
import { recordOf } from '../run-value.js';
import { lots } from '../scenario-texts.js';
import { smallPlan } from '../small-plan.js';

const dates = '[1, 2, 3]';

function opened(text: string, options = {}, machine = thisMachine()) {
  const model = readScenario(text, {}).scenario!.model;
  const outcome = openCandidates(model, buildPrograms(model), options, machine, 0);
  if (outcome.kind === 'refused') throw new Error(JSON.stringify(outcome.messages));
  const { candidates, ended } = outcome;
  return { sizes: candidates.map(({ programs }) => programs.basisSize), candidates, ended };
}

const all = opened(lots({ dates }));
const columns = all.candidates.map(({ programs }) => programs.columns.length);

test('all sizes may be tried where nothing is fixed', () => {
  const { basisSizeCount } = all.candidates[0]!.programs;
  expect(basisSizeCount).toBeGreaterThan(2);
  expect(all.sizes).toEqual(Array.from({ length: basisSizeCount }, (_, size) => size));
  expect(all.ended).toBe('no larger size');
});

test('where the scenario fixes the paths of the fit, only sizes with enough of them may be tried', async () => {
  const ofFit = (fit: number) => opened(lots({ dates, method: [`counts: { fit: ${fit} }`] }));
  expect(ofFit(250 * columns[1]!)).toMatchObject({ sizes: [0, 1], ended: 'too few paths' });
  expect(ofFit(250 * columns[1]! - 1)).toMatchObject({ sizes: [0], ended: 'too few paths' });
  expect(ofFit(250 * columns.at(-1)!)).toMatchObject({ sizes: all.sizes, ended: 'no larger size' });
  const few = lots({ dates, method: [`counts: { fit: ${250 * columns[1]! - 1} }`, 'bracket width: { relative: 3% }'] });
  const { selection, plan } = await recordOf(few);
  expect(selection).toBeNull();
  expect(plan.basisSize).toBe(0);
});

test('a size whose fit takes too much work is tried under a budget only', () => {
  const long = lots({ count: 5, dates: '{ count: 1000, last: 3 }' });
  const without = opened(long);
  const withBudget = opened(long, { budgetSeconds: 3600 });
  expect(without.ended).toBe('larger size too costly');
  expect(withBudget.sizes.length).toBeGreaterThan(without.sizes.length);
  expect(withBudget.ended).toBe('no larger size');
});

test('a size that does not fit into the memory is not tried', () => {
  const machine = { ...thisMachine(), memoryBytes: all.candidates[0]!.forecast.peakMemoryBytes };
  expect(opened(lots({ dates }), {}, machine)).toMatchObject({ sizes: [0], ended: 'too little memory' });
});

test('one size alone is open where there is nothing to choose', () => {
  const fixed = (counts: string) => opened(lots({ dates, method: [`counts: { ${counts} }`] }));
  const stated = opened(lots({ dates, method: ['basis: [largest(lot)]'] }));
  expect(stated).toMatchObject({ sizes: [0], ended: null });
  expect(opened(lots({ dates }), { plan: { ...smallPlan, basisSize: 2 } })).toMatchObject({ sizes: [2], ended: null });
  expect(fixed('outer: 512, inner: 8').sizes).toHaveLength(1);
  expect(fixed('fit: 1000, outer: 512, inner: 8')).toMatchObject({ sizes: [0], ended: null });
  expect(fixed(`fit: ${250 * columns.at(-1)!}, outer: 512, inner: 8`).sizes).toEqual(all.sizes.slice(-1));
});

test('the forecast of a check holds all fits, and two rules in memory', () => {
  const outcome = checkScenario(lots({ dates }), {}, { ...thisMachine(), coreCount: 2 });
  if (outcome.kind !== 'checked') throw new Error(JSON.stringify(outcome));
  const { forecast } = outcome;
  const largest = all.candidates.at(-1)!.forecast;
  expect(forecast).toMatchObject({ sizeCount: all.sizes.length, columnCount: columns.at(-1) });
  expect(forecast.peakMemoryBytes).toBeGreaterThan(largest.peakMemoryBytes);
  expect(forecast.work.fit).toBe(all.candidates.reduce((total, { forecast: { work } }) => total + work.fit, 0));
  const fixed = checkScenario(lots({ dates, method: ['counts: { outer: 512, inner: 8 }'] }), {}, thisMachine());
  expect(fixed.kind === 'checked' && fixed.forecast.sizeCount).toBe(1);
});
