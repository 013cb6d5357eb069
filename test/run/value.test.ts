import { expect, test } from 'vitest';
import { value } from '#built/index.js';
import { recordOf } from '../run-value.js';
import { lots } from '../scenario-texts.js';
import { smallPlan } from '../small-plan.js';

const small = ['counts: { fit: 4000, outer: 1024, inner: 8 }'];

test('a plan replays the run that it comes from, without a pilot and to the last digit', async () => {
  const first = await recordOf(lots({ method: ['bracket width: { relative: 3% }'] }));
  expect(first.pilot).not.toBeNull();
  const again = await recordOf(lots({ method: ['bracket width: { relative: 3% }'] }), { plan: first.plan });
  expect(again.pilot).toBeNull();
  for (const part of ['lower', 'upper', 'uppers', 'gap', 'bracket95', 'plan'] as const)
    expect(again[part]).toEqual(first[part]);
});

test('another seed gives other digits and an overlapping bracket', async () => {
  const a = await recordOf(lots({ seed: 'ash', method: small }));
  const b = await recordOf(lots({ seed: 'elm', method: small }));
  expect(a.lower.value).not.toBe(b.lower.value);
  expect(a.bracket95.low).toBeLessThan(b.bracket95.high);
  expect(b.bracket95.low).toBeLessThan(a.bracket95.high);
});

test('a wanted width is met from the pilot, and the bracket holds the exact value 13.9018', async () => {
  // Independent quadrature, error at most 0.0001.
  const { bracket95, advice } = await recordOf(lots({ method: ['bracket width: { relative: 1.2% }'] }));
  expect(bracket95.low).toBeLessThan(13.9018);
  expect(bracket95.high).toBeGreaterThan(13.9018);
  expect(bracket95.high - bracket95.low).toBeLessThan(0.012 * 13.9018);
  expect(advice).toEqual([]);
});

test('the issuer of the negative right mirrors the holder: every figure with its sign turned', async () => {
  const method = small;
  const holder = await recordOf(lots({ payoff: 'largest(lot) - 100', atExpiry: 'lapse', method }));
  const issuer = await recordOf(lots({ payoff: '100 - largest(lot)', atExpiry: 'lapse', decidedBy: 'issuer', method }));
  expect(issuer.upper.method).toBe('rule');
  expect(issuer.lower.method).toBe('one-step');
  expect(issuer.upper.value).toBe(-holder.lower.value);
  expect(issuer.lower.value).toBe(-holder.upper.value);
  expect(issuer.bracket95.low).toBe(-holder.bracket95.high);
  expect(issuer.gap).toEqual(holder.gap);
});

test('ten times the money is ten times the value', async () => {
  const one = await recordOf(lots({ payoff: 'max(0, largest(lot) - 100)', method: small }));
  const ten = await recordOf(lots({ payoff: '10 * max(0, largest(lot) - 100)', method: small }));
  expect(ten.lower.value / one.lower.value).toBeCloseTo(10, 6);
  expect(ten.upper.value / one.upper.value).toBeCloseTo(10, 6);
});

test('forced at expiry is worth less than a right that may lapse, an amount at expiry at least that amount', async () => {
  const payoff = 'largest(lot) - 130';
  const lapse = await recordOf(lots({ payoff, atExpiry: 'lapse', method: small }));
  const forced = await recordOf(lots({ payoff, atExpiry: 'forced', method: small }));
  const paid = await recordOf(lots({ payoff, atExpiry: '20', method: small }));
  expect(forced.upper.value).toBeLessThan(lapse.lower.value);
  expect(paid.bracket95.high).toBeGreaterThan(20 * Math.exp(-0.15));
  expect(paid.lower.value).toBeGreaterThan(lapse.upper.value);
  expect(forced.neverExercisedShare).toBe(0);
});

test('today as a decision date: a right that is worth more now is exercised now, at its payoff exactly', async () => {
  const record = await recordOf(
    lots({
      payoff: 'largest(lot)',
      volatility: '0.05',
      dates: '{ count: 4, last: 2, today: yes }',
      method: small,
    }),
  );
  expect(record.dates[0]).toMatchObject({ time: 0, exerciseShare: 1 });
  expect(record.lower.value).toBeCloseTo(100, 9);
  expect(record.upper.value).toBeGreaterThanOrEqual(record.lower.value);
});

test('a basis of one column still gives an honest, wide bracket', async () => {
  const { bracket95, advice } = await recordOf(lots({ method: [...small, 'basis: [largest(lot)]'] }));
  expect(bracket95.low).toBeLessThan(13.9018);
  expect(bracket95.high).toBeGreaterThan(13.9018);
  expect(advice.map(({ code }) => code)).toContain('wide-gap');
});

test('a normal driver: a one-date right meets the closed form of Bachelier (1900)', async () => {
  const text = lots({
    count: 1,
    start: 0,
    payoff: 'max(0, lot[1])',
    dates: '[2]',
    method: ['counts: { fit: 4000, outer: 4096, inner: 32 }'],
  })
    .replace('law: lognormal', 'law: normal')
    .replace('growth of mean: -0.05', 'drift: 0')
    .replace('volatility: 0.2', 'volatility: 10');
  const { lower } = await recordOf(text);
  const expected = (Math.exp(-0.1) * 10 * Math.sqrt(2)) / Math.sqrt(2 * Math.PI);
  expect(Math.abs(lower.value - expected) / lower.standardError!).toBeLessThan(3.6);
});

test('a budget becomes counts once, and those replay', async () => {
  const record = await recordOf(lots(), { budgetSeconds: 2.5 });
  expect(record.plan.outerPathCount).toBeGreaterThan(1000);
  const again = await recordOf(lots(), { plan: record.plan });
  expect(again.bracket95).toEqual(record.bracket95);
});

test('a run that is stopped during the bounds delivers the unbroken first part, as a run of that size would', async () => {
  const method = ['counts: { fit: 4000, outer: 20480, inner: 40 }'];
  const stop = new AbortController();
  const record = await recordOf(lots({ method }), {
    signal: stop.signal,
    onProgress: ({ stage, done }) => {
      if (stage === 'bounds' && done === 5) stop.abort();
    },
  });
  expect(record.status).toBe('stopped');
  const { pathCount } = record.lower;
  expect(pathCount).toBeGreaterThanOrEqual(512);
  expect(pathCount).toBeLessThan(20480);
  const whole = await recordOf(lots({ method: [`counts: { fit: 4000, outer: ${pathCount}, inner: 40 }`] }));
  expect(whole.status).toBe('complete');
  expect(record.lower).toEqual(whole.lower);
});

test('a run that is stopped in the fit has nothing to deliver and says where it was', async () => {
  const stop = new AbortController();
  const outcome = await value(lots({ method: small }), {
    workers: 0,
    signal: stop.signal,
    onProgress: () => stop.abort(),
  });
  expect(outcome).toEqual({ kind: 'stopped', stage: 'fit' });
});

test('a scenario object and its text are the same scenario', async () => {
  const object = {
    title: 'Right on some lots',
    seed: 'oak',
    drivers: { lot: { count: 2, start: 100, law: 'lognormal', 'growth of mean': -0.05, volatility: 0.2 } },
    contract: {
      'decided by': 'holder',
      'decision dates': { count: 9, last: 3 },
      payoff: 'max(0, largest(lot) - 100)',
      'at expiry': 'lapse',
      discount: 0.05,
    },
    method: { counts: { fit: 4000, outer: 1024, inner: 8 } },
  };
  const fromObject = await recordOf(object);
  const fromText = await recordOf(lots({ method: small }));
  expect(fromObject.bracket95).toEqual(fromText.bracket95);
});

async function refusalOf(text: string) {
  const outcome = await value(text, { workers: 0 });
  return outcome.kind === 'refused' ? outcome.messages : [];
}

test('a basis column that stops being a number on a valuation path stops the run, with the place', async () => {
  const text = lots({
    count: 1,
    start: 40,
    payoff: 'max(0, 40 - lot[1])',
    method: ['counts: { fit: 600, outer: 4000, inner: 8 }', 'basis: ["log(lot[1] - 11)", "lot[1]"]'],
  });
  const [message] = await refusalOf(text);
  expect(message!.code).toBe('not-finite');
  expect(message!.what).toContain('log(lot[1] - 11)');
  expect(message!.sourceLine).toContain('basis:');
});

test('a driver that falls below the smallest number is named with its line', async () => {
  const [message] = await refusalOf(lots({ volatility: '60', method: small }));
  expect(message!.code).toBe('not-finite');
  expect(message!.what).toMatch(/driver lot\[\d\]/);
  expect(message!.place).not.toBeNull();
});

test('a right that hardly any path exercises is delivered with its doubt', async () => {
  const { advice, passedChecks } = await recordOf(
    lots({ count: 1, payoff: 'max(0, 44 - lot[1])', dates: '[0.25, 0.5, 0.75, 1]', method: small }),
  );
  expect(advice.map(({ code }) => code)).toContain('effort-too-small');
  expect(passedChecks.join(' ')).not.toContain('exercises on');
});

test('one inner point is allowed, and the pilot can still be read', async () => {
  const { plan, lower, upper } = await recordOf(lots({ method: ['counts: { fit: 4000, inner: 1 }'] }));
  expect(plan.innerPointCount).toBe(1);
  expect(upper.value).toBeGreaterThan(lower.value);
});

test('the plan of a regressed upper bound knows its gap', async () => {
  const { pilot, bracket95, gap, upper, lower } = await recordOf(
    lots({ method: ['counts: { fit: 8000 }', 'bracket width: { relative: 6% }', 'upper: regressed'] }),
  );
  expect(upper.method).toBe('regressed');
  expect(gap.value).toBeCloseTo(upper.value - lower.value, 9);
  const width = bracket95.high - bracket95.low;
  expect(Math.abs(width - pilot!.expectedWidth)).toBeLessThan(0.35 * width);
});

test('seeds that differ beyond Latin letters give different paths', async () => {
  const a = await recordOf(lots({ seed: 'Łódź', method: small }));
  const b = await recordOf(lots({ seed: 'Aódź', method: small }));
  expect(a.lower.value).not.toBe(b.lower.value);
});

test.each([[{ outerPathCount: 1 }], [{ upper: 'best' }], [{ upper: 'andersen-broadie', nestedOuterPathCount: 0 }]])(
  'a plan with %j is refused',
  async (change) => {
    const plan = { ...smallPlan, ...change } as never;
    const outcome = await value(lots(), { workers: 0, plan });
    expect(outcome.kind === 'refused' && outcome.messages[0]!.code).toBe('plan-does-not-fit');
  },
);
