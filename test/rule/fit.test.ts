import { expect, test } from 'vitest';
import { columnStride } from '#built/program/program.js';
import { fitted } from '../fitted.js';
import { lots } from '../scenario-texts.js';

test('the increment takes out most of the spread of the next value, at every date', async () => {
  const { fits } = await fitted(lots(), 16_384);
  for (const { spread, controlledSpread } of fits) expect(controlledSpread).toBeLessThan(0.35 * spread);
});

test('today holds one state: the regression keeps the constant alone and says so', async () => {
  const { fits, programs } = await fitted(lots(), 4096);
  expect(fits[0]!.kept).toHaveLength(1);
  expect(fits[0]!.dropped).toHaveLength(programs.columns.length - 1);
  expect(fits[0]!.explainedShare).toBeCloseTo(0, 6);
});

test('a driver that is added leaves the draws of the others as they were', async () => {
  const alone = await fitted(lots({ count: 1, payoff: 'max(0, lot[1] - 100)' }), 512);
  const together = await fitted(
    lots({
      count: 1,
      payoff: 'max(0, lot[1] - 100)',
      drivers: ['  fuel:', '    start: 3', '    law: normal', '    volatility: 0.4'],
    }),
    512,
  );
  const dates = alone.programs.times.length - 1;
  for (let date = 0; date < dates; date++) {
    const lotOf = (paths: Float64Array, driverCount: number) => {
      const start = date * driverCount * columnStride;
      return [...paths.subarray(start, start + 512)];
    };
    expect(lotOf(together.context.store.paths, 2)).toEqual(lotOf(alone.context.store.paths, 1));
  }
});

test('the fitted continuation value today does not depend on the sign convention: an issuer of the negative decides alike', async () => {
  const holder = await fitted(lots({ count: 1, payoff: 'lot[1] - 100', atExpiry: 'lapse' }), 4096);
  const issuer = await fitted(lots({ count: 1, payoff: '100 - lot[1]', atExpiry: 'lapse', decidedBy: 'issuer' }), 4096);
  expect([...issuer.rule.continuation]).toEqual([...holder.rule.continuation]);
  expect([...issuer.rule.integrands]).toEqual([...holder.rule.integrands]);
});
