import { expect, test } from 'vitest';
import { value } from '#built/index.js';
import { buildPrograms } from '#built/rule/programs.js';
import { readScenario } from '#built/scenario/read.js';
import { recordOf } from '../run-value.js';

interface Change {
  readonly clause?: string | null;
  readonly payoff?: string;
  readonly decidedBy?: 'holder' | 'issuer';
  readonly atExpiry?: string;
  readonly dates?: string;
  readonly start?: string;
  readonly method?: string;
}

const counts =
  'counts: { fit: 4096, outer: 1024, inner: 8 }, upper: { method: andersen-broadie, outer: 512, inner: 4 }';

function lots(change: Change = {}): string {
  const { clause = '{ event: largest(lot) >= 130, watched: decision dates }', dates = '{ count: 4, last: 2 }' } =
    change;
  return [
    'seed: oak',
    'drivers:',
    `  lot: { count: 2, start: ${change.start ?? '100'}, law: lognormal, growth of mean: 0, volatility: 0.2 }`,
    'contract:',
    `  decided by: ${change.decidedBy ?? 'holder'}`,
    `  decision dates: ${dates}`,
    `  payoff: ${change.payoff ?? 'max(0, largest(lot) - 100)'}`,
    ...(clause === null ? [] : [`  ends when: ${clause}`]),
    `  at expiry: ${change.atExpiry ?? 'lapse'}`,
    '  discount: 0.05',
    `method: { ${change.method ?? counts} }`,
    '',
  ].join('\n');
}

const clauseOf = (event: string, pays = '0') => `{ event: "${event}", watched: decision dates, pays: "${pays}" }`;

test('an event that never holds leaves the value, the rule and both bounds as they are without it', async () => {
  const basis = `basis: [largest(lot), largest(lot) ^ 2], ${counts}`;
  const free = await recordOf(lots({ clause: null, method: basis }));
  const idle = await recordOf(lots({ clause: clauseOf('largest(lot) >= 1e9'), method: basis }));
  for (const part of ['lower', 'upper', 'uppers', 'gap', 'bracket95', 'crossChecks'] as const)
    expect(idle[part]).toEqual(free[part]);
  expect(free.endedByEventShare).toBeNull();
  expect(idle.endedByEventShare).toBe(0);
  const withColumns = await recordOf(lots({ clause: clauseOf('largest(lot) >= 1e9') }));
  expect(withColumns.basis.columns.length).toBeGreaterThan(
    (await recordOf(lots({ clause: null }))).basis.columns.length,
  );
});

test.each([
  ['largest(lot) > 0', 'lapse'],
  ['1 > 0', 'lapse'],
  ['t >= 0.5', '7'],
] as const)(
  'an event that always holds, %s, pays its amount on the first date exactly, whoever decides',
  async (event, atExpiry) => {
    for (const decidedBy of ['holder', 'issuer'] as const) {
      const record = await recordOf(lots({ clause: clauseOf(event, '3'), decidedBy, atExpiry }));
      const sure = 3 * Math.exp(-0.05 * 0.5);
      for (const bound of [record.lower, record.upper, ...record.uppers]) {
        expect(bound.value).toBeCloseTo(sure, 12);
        expect(bound.standardError).toBeLessThan(1e-13);
      }
      expect(record.endedByEventShare).toBe(1);
      expect(record.dates.map(({ endedShare }) => endedShare)).toEqual([1, 0, 0, 0]);
      expect([record.neverExercisedShare, record.exerciseTimeQuantiles]).toEqual([0, null]);
      expect(record.advice.map(({ code }) => code)).not.toContain('effort-too-small');
    }
  },
);

test('the issuer of the negative right mirrors the holder, what the event pays included', async () => {
  const holder = await recordOf(lots({ payoff: 'largest(lot) - 100', clause: clauseOf('smallest(lot) <= 80', '2') }));
  const issuer = await recordOf(
    lots({ payoff: '100 - largest(lot)', clause: clauseOf('smallest(lot) <= 80', '-2'), decidedBy: 'issuer' }),
  );
  expect(issuer.upper.value).toBe(-holder.lower.value);
  expect(issuer.lower.value).toBe(-holder.upper.value);
  expect(issuer.endedByEventShare).toBe(holder.endedByEventShare);
  expect(holder.endedByEventShare).toBeGreaterThan(0.05);
});

test('today counts only as a decision date', async () => {
  const clause = clauseOf('largest(lot) >= 100', '3');
  const watched = await recordOf(lots({ clause, dates: '{ count: 4, last: 2, today: yes }' }));
  expect(watched.lower.value).toBe(3);
  expect(watched.upper.value).toBe(3);
  expect(watched.dates[0]).toMatchObject({ time: 0, endedShare: 1, exerciseShare: 0 });
  const later = await recordOf(lots({ clause }));
  expect(later.endedByEventShare).toBeLessThan(1);
  expect(later.lower.value).not.toBeCloseTo(3, 1);
});

test('on the last date the event comes before the payoff and before what expiry pays', async () => {
  // One date, always at or above the level or below it: the holder gets 9 or the payoff, nothing is chosen.
  const record = await recordOf(
    lots({ dates: '[1]', clause: clauseOf('largest(lot) >= 100', '9'), payoff: '1000', atExpiry: 'forced' }),
  );
  const ended = record.endedByEventShare!;
  expect(record.crossChecks.plainLower.value).toBeCloseTo(Math.exp(-0.05) * (9 * ended + 1000 * (1 - ended)), 9);
  expect(record.dates[0]!.exerciseShare).toBeCloseTo(1 - ended, 12);
});

test('an event that may cost the one who decides takes the proved floor away', () => {
  const floorOf = (change: Change) => buildPrograms(readScenario(lots(change), {}).scenario!.model).floor;
  const pays = (amount: string) => clauseOf('largest(lot) >= 130', amount);
  for (const amount of ['0', '2', 'max(0, lot[1] - 3)', 'lot[1] * t', 'if(t < 1, 2, lot[2])'])
    expect(floorOf({ clause: pays(amount) })).toBe(0);
  for (const amount of ['-2', '100 - lot[1]', 'log(lot[1])', 'lot[1] - 3'])
    expect(floorOf({ clause: pays(amount) })).toBeNull();
  expect(floorOf({ clause: pays('2'), decidedBy: 'issuer' })).toBeNull();
  expect(floorOf({ clause: pays('-lot[1]'), decidedBy: 'issuer' })).toBe(0);
  expect(floorOf({ clause: pays('2'), atExpiry: 'forced' })).toBeNull();
  expect(floorOf({ clause: null })).toBe(0);
});

test('a penalty in the event is weighed against exercising early', async () => {
  const bare = await recordOf(lots({ clause: clauseOf('largest(lot) >= 130', '0') }));
  const penalty = await recordOf(lots({ clause: clauseOf('largest(lot) >= 130', '-60') }));
  expect(penalty.upper.value).toBeLessThan(bare.lower.value);
  expect(penalty.endedByEventShare).toBeLessThan(bare.endedByEventShare!);
});

test('an event that names a member tells the members of a family apart', async () => {
  const named = await recordOf(lots({ clause: clauseOf('lot[1] >= 130') }));
  const paid = await recordOf(lots({ clause: clauseOf('largest(lot) >= 130', 'max(0, lot[2] - 100)') }));
  const alike = await recordOf(lots());
  expect(alike.basis.columns).toContain('H1(lot ranked 1)');
  for (const { basis } of [named, paid]) expect(basis.columns).toContain('H1(lot[1])');
});

test('what is not finite in the event or in what it pays is named with its line', async () => {
  const wordsOf = async (clause: string) => {
    const outcome = await value(lots({ clause, method: `basis: [largest(lot)], ${counts}` }), { workers: 0 });
    if (outcome.kind !== 'refused') throw new Error('a run that cannot be');
    return outcome.messages.map(({ code, what, place }) => `${code} ${place?.line} ${what}`);
  };
  expect((await wordsOf(clauseOf('log(lot[1] - 90) > 5')))[0]).toMatch(/^not-finite 8 .*the ending event/i);
  expect((await wordsOf(clauseOf('lot[1] < 90', 'log(lot[1] - 90)')))[0]).toMatch(
    /^not-finite 8 .*the amount that the ending event pays/i,
  );
});

test('paths that are computed again, and threads, change no digit of a right that may end', async () => {
  const text = lots({ dates: '{ count: 12, last: 2 }' });
  const essence = async (options: object) => {
    const { timing, paths, ...figures } = await recordOf(text, options);
    expect(timing.totalSeconds + paths.bytes).toBeGreaterThan(0);
    return JSON.stringify(figures);
  };
  const plain = await essence({});
  expect(await essence({ fitMemoryBytes: 600_000 })).toBe(plain);
  expect(await essence({ workers: 2 })).toBe(plain);
});
