import { expect, test } from 'vitest';
import { profileScenario } from '#built/benchmark/profile.js';
import { runYardstick } from '#built/benchmark/yardstick.js';
import { thisMachine } from '#built/workers/machine.js';
import { lots } from '../scenario-texts.js';

test('the yardstick does the work it names: its value agrees with the same work done by other programs', async () => {
  const line = await runYardstick(50_000, thisMachine());
  expect(Object.keys(line).sort()).toEqual(
    [
      'program',
      'nsPerNormal',
      'nsPerStateStep',
      'nsPerPathDateFit',
      'nsPerPathDateForward',
      'lower',
      'halfWidth95',
      'sink',
    ].sort(),
  );
  // Plain lower bound with the same nineteen columns and a million paths, by a hand-written C program and a numpy script
  //: 26.1177 and 26.1438, each ± 0.038. Independent programs, not a published figure.
  expect(Math.abs(line.lower - 26.13)).toBeLessThan(3 * Math.hypot(line.halfWidth95 / 1.96, 0.02));
  expect(line.halfWidth95).toBeGreaterThan(0.1);
  expect(line.halfWidth95).toBeLessThan(0.25);
  for (const time of [line.nsPerNormal, line.nsPerStateStep, line.nsPerPathDateFit, line.nsPerPathDateForward])
    expect(time).toBeGreaterThan(0);
});

test('a profile names every kernel that a stage spends time in, and its shares are shares', async () => {
  const text = lots({ method: ['counts: { fit: 4096, outer: 1024, inner: 8 }'] });
  const outcome = await profileScenario(text, 'lots.yaml', thisMachine());
  if (outcome.kind !== 'measured') throw new Error(JSON.stringify(outcome));
  const { stages } = outcome;
  expect(stages.map(({ stage }) => stage)).toEqual(['fit', 'bounds']);
  for (const { kernels, seconds } of stages) {
    expect(seconds).toBeGreaterThan(0);
    const names = kernels.map(({ name }) => name);
    expect(names).toContain('normal draws');
    expect(names).toContain('program: amounts and basis');
    const total = kernels.reduce((sum, { share }) => sum + share, 0);
    expect(total).toBeGreaterThan(0.1);
    expect(total).toBeLessThanOrEqual(1);
  }
  expect(stages[0]!.kernels.map(({ name }) => name)).toContain('normal equations');
});
