import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { expect, test } from 'vitest';
import { value } from '#built/index.js';
import type { RunRecord } from '#built/result/record.js';
import type { InterpreterKind } from '#built/run/options.js';
import { readScenario } from '#built/scenario/read.js';
import { readPlan } from '#built/store/read-record.js';
import { recordOf } from '../run-value.js';
import { lots } from '../scenario-texts.js';

const counts = (inner: number, upper: string) =>
  lots({ method: [`counts: { fit: 4096, outer: 1025, inner: ${inner} }`, `upper: ${upper}`] });

const nested = '{ method: andersen-broadie, outer: 513, inner: 4 }';

test.each([
  [0, 'regressed'],
  [0, nested],
  [8, 'regressed'],
  [8, 'one-step'],
  [8, nested],
] as const)('%i inner points, upper %s: the gap is the upper bound less the lower one', async (inner, upper) => {
  const { lower, upper: bound, gap, uppers, bracket95 } = await recordOf(counts(inner, upper));
  expect(gap.value).toBeCloseTo(bound.value - lower.value, 9);
  expect(uppers.some(({ method }) => method === 'one-step')).toBe(inner > 0);
  expect(bracket95.low).toBeLessThan(13.9018);
  expect(bracket95.high).toBeGreaterThan(13.9018);
});

test('a record without inner points replays to the last digit, from its file too', async () => {
  const text = counts(0, 'regressed');
  const record = await recordOf(text);
  const essence = ({ lower, upper, gap, bracket95 }: RunRecord) => JSON.stringify({ lower, upper, gap, bracket95 });
  expect(essence(await recordOf(text, { plan: record.plan }))).toBe(essence(record));
  const folder = mkdtempSync(join(tmpdir(), 'tarry-'));
  try {
    const file = join(folder, 'record.json');
    writeFileSync(file, JSON.stringify(record));
    const read = await readPlan(file);
    expect(read).toMatchObject({ kind: 'read', plan: record.plan });
  } finally {
    rmSync(folder, { recursive: true });
  }
});

test('no inner points and the one-step bound contradict each other, in the file and from outside', async () => {
  const codes = (outcome: { messages: readonly { code: string }[] }) => outcome.messages.map(({ code }) => code);
  expect(codes(readScenario(counts(0, 'one-step'), {}))).toEqual(['value-out-of-range']);
  expect(codes(readScenario(lots({ method: ['counts: { inner: 0 }'] }), {}))).toEqual(['value-out-of-range']);
  expect(codes(readScenario(counts(0, 'regressed'), { upper: 'one-step' }))).toEqual(['bad-override']);
});

test('no inner points and a wanted width go together: the outer paths are left to the pilot', async () => {
  const text = lots({
    method: ['counts: { fit: 4096, inner: 0 }', 'bracket width: { relative: 8% }', 'upper: regressed'],
  });
  const { plan, bracket95, lower } = await recordOf(text);
  expect(plan.innerPointCount).toBe(0);
  expect(bracket95.high - bracket95.low).toBeLessThan(0.08 * lower.value);
});

test('what a library caller asks for beside the scenario is judged, not guessed', async () => {
  const asked = [{ interpreter: 'turbo' as InterpreterKind }, { fitMemoryBytes: Number.NaN }, { fitMemoryBytes: -1 }];
  for (const options of asked) {
    const outcome = await value(lots(), options);
    expect(outcome).toMatchObject({ kind: 'refused', messages: [{ code: 'bad-override' }] });
  }
});

test('a basis column whose square no number can hold is named', async () => {
  const text = lots({
    method: ['basis: [largest(lot), largest(lot) * 1e160]', 'counts: { fit: 1000, outer: 100, inner: 1 }'],
  });
  const outcome = await value(text, { workers: 0 });
  expect(outcome).toMatchObject({ kind: 'refused', messages: [{ code: 'not-finite' }] });
  if (outcome.kind === 'refused') expect(outcome.messages[0]!.what).toMatch(/square of the basis column .*1e160/);
});
