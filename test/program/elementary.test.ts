/**
 * The elementary functions against 60-digit reference values (elementary-oracle.json, made by make-elementary-oracle.py).
 *
 * The largest error found on the reference arguments is frozen beside the bound that the doc comment promises; it can
 * only change when the bits change, and a digest of all result bits says whether they did.
 */
import { createHash } from 'node:crypto';
import { describe, expect, test } from 'vitest';
import { exp, log, normalCumulative, normalQuantile, power } from '#built/program/elementary.js';
import { evaluateConstant } from '#built/program/evaluate.js';
import { errorOf, lastPlace, oracle } from './elementary-oracle.js';

const view = new DataView(new ArrayBuffer(8));

function largestError(name: string, compute: (x: number) => number, from = -Infinity, to = Infinity): number {
  const errors = oracle
    .get(name)!
    .filter(({ arguments: [x] }) => !(x! < from || x! > to))
    .map((reference) => errorOf(compute(reference.arguments[0]!), reference));
  expect(errors.length).toBeGreaterThan(300);
  return Math.max(...errors);
}

function grid(from: number, to: number, count: number): number[] {
  return Array.from({ length: count + 1 }, (_, index) => from + ((to - from) * index) / count);
}

describe('errors in units of the last place', () => {
  const cases = [
    { name: 'exp', compute: exp, from: -Infinity, to: Infinity, bound: 1, measured: 0.76 },
    { name: 'log', compute: log, from: -Infinity, to: Infinity, bound: 1, measured: 0.65 },
    { name: 'normalCumulative', compute: normalCumulative, from: -Infinity, to: -8, bound: 8, measured: 3.8 },
    { name: 'normalCumulative', compute: normalCumulative, from: -8, to: 0, bound: 8, measured: 4.4 },
    { name: 'normalCumulative', compute: normalCumulative, from: 0, to: Infinity, bound: 2.5, measured: 1.48 },
    { name: 'normalQuantile', compute: normalQuantile, from: -Infinity, to: Infinity, bound: 5, measured: 3.79 },
  ];
  for (const { name, compute, from, to, bound, measured } of cases) {
    test(`${name} from ${from} to ${to}: at most ${bound}, measured ${measured}`, () => {
      const error = largestError(name, compute, from, to);
      expect(error).toBeLessThanOrEqual(bound);
      expect(error).toBeCloseTo(measured, 2);
    });
  }

  test('exp is farthest off next to an odd multiple of log(2) / 2: 0.91', () => {
    const worst = { arguments: [2.4260151319598178], result: 11.313708498984864, rest: 0.09108552884174208 };
    expect(errorOf(exp(worst.arguments[0]!), worst)).toBeCloseTo(0.91, 2);
  });

  test('normalCumulative keeps a relative error of 1e-14 up to 8 on both sides (bound in the doc comment: 1e-15)', () => {
    for (const reference of oracle.get('normalCumulative')!) {
      const x = reference.arguments[0]!;
      if (!(Math.abs(x) <= 8)) continue;
      const absolute = errorOf(normalCumulative(x), reference) * lastPlace(reference.result);
      expect(absolute / reference.result).toBeLessThan(1e-15);
    }
  });

  test('power: relative error at most (1 + 1.5 |exponent * log(base)|) 2^-52; special cases exact', () => {
    for (const reference of oracle.get('power')!) {
      const [base, exponent] = reference.arguments as [number, number];
      const error = errorOf(power(base, exponent), reference);
      if (error === 0) continue;
      const allowed = (1 + 1.5 * Math.abs(exponent * Math.log(base))) * 2 ** -52;
      expect((error * lastPlace(reference.result)) / reference.result, `${base} ^ ${exponent}`).toBeLessThan(allowed);
    }
  });

  test('the bits are the ones of every other machine', () => {
    const hash = createHash('sha256');
    const functions = { exp, log, normalCumulative, normalQuantile, power } as Record<
      string,
      (...values: number[]) => number
    >;
    for (const [name, references] of oracle) {
      for (const { arguments: values } of references) {
        const got = functions[name]!(...values);
        view.setFloat64(0, Number.isNaN(got) ? NaN : got);
        hash.update(Number.isNaN(got) ? 'NaN' : new Uint8Array(view.buffer));
      }
    }
    expect(hash.digest('hex').slice(0, 16)).toBe('7747ce865e9ff2a7');
  });
});

describe('negative controls: the same check catches worse functions, and passes a good one of another origin', () => {
  test('an exponential by a series of twelve terms', () => {
    const short = (x: number) => {
      const k = Math.round(x / Math.LN2);
      const r = x - k * Math.LN2;
      let sum = 1;
      for (let n = 11; n >= 1; n--) sum = 1 + (r * sum) / n;
      return sum * 2 ** k;
    };
    expect(largestError('exp', short, -1, 1)).toBeGreaterThan(8);
    expect(largestError('exp', Math.exp)).toBeLessThan(1.1);
  });

  test('a logarithm that loses the digits near 1', () => {
    expect(largestError('log', (x) => log(x * 2) - log(2), 0.4, 2.5)).toBeGreaterThan(100);
    expect(largestError('log', Math.log)).toBeLessThan(1.1);
  });

  test('a cumulative whose exponent is rounded, and one that takes the small tail from 1', () => {
    const rounded = (x: number) => (normalCumulative(x) / exactSquare(x)) * exp(-0.5 * x * x);
    const exactSquare = (x: number) => {
      const head = Math.fround(x);
      return exp(-0.5 * head * head) * exp(-0.5 * (x - head) * (x + head));
    };
    expect(largestError('normalCumulative', rounded, -8, 0)).toBeGreaterThan(8);
    expect(largestError('normalCumulative', (x) => 1 - normalCumulative(-x), -8, 0)).toBeGreaterThan(1e6);
  });

  test('a quantile off by 1e-9, and one whose argument is off by 1e-15', () => {
    expect(largestError('normalQuantile', (p) => normalQuantile(p) * (1 + 1e-9), 0.1, 0.9)).toBeGreaterThan(1e5);
    expect(largestError('normalQuantile', (p) => normalQuantile(p + 1e-15), 0.1, 0.9)).toBeGreaterThan(5);
  });
});

describe('order and inverses', () => {
  test('all four rise wherever the true step exceeds the errors', () => {
    for (const [compute, points] of [
      [exp, grid(-708, 709, 50_000)],
      [log, grid(1e-3, 50, 50_000)],
      [normalCumulative, grid(-37.4, 7.5, 50_000)],
      [normalQuantile, grid(1e-6, 1 - 1e-6, 50_000)],
    ] as const) {
      const values = points.map(compute);
      const falls = values.findIndex((value, index) => index > 0 && !(value > values[index - 1]!));
      expect(falls).toBe(-1);
    }
  });

  test('log undoes exp within 2e-16 + 2e-16 |x|, exp undoes log within 2^-52 (1 + |log x|)', () => {
    for (const x of grid(-700, 700, 9_973)) expect(Math.abs(log(exp(x)) - x)).toBeLessThan(2e-16 * (1 + Math.abs(x)));
    for (const x of grid(1e-9, 1e3, 9_973)) {
      expect(Math.abs(exp(log(x)) / x - 1)).toBeLessThan(2 ** -52 * (1 + Math.abs(log(x))));
    }
  });

  test('normalQuantile undoes normalCumulative within 2e-15 (1 + |x|), on the right plus what p near 1 has lost', () => {
    for (const x of grid(-37, 8, 20_011)) {
      const density = exp(-0.5 * x * x) / Math.sqrt(2 * Math.PI);
      const lost = x > 0 ? 3e-16 / density : 0;
      expect(Math.abs(normalQuantile(normalCumulative(x)) - x)).toBeLessThan(2e-15 * (1 + Math.abs(x)) + lost);
    }
  });

  test('normalCumulative undoes normalQuantile within 1e-15 (1 + x^2), relative', () => {
    for (const exponent of grid(-300, 0, 10_007).slice(0, -1)) {
      const p = exp(exponent * Math.LN10);
      const x = normalQuantile(p);
      expect(Math.abs(normalCumulative(x) / p - 1)).toBeLessThan(1e-15 * (1 + x * x));
    }
  });

  test('p and 1 - p have opposite quantiles', () => {
    for (const p of grid(2 ** -12, 0.5, 2047)) expect(normalQuantile(1 - p) + normalQuantile(p)).toBe(0);
  });
});

describe('powers with a whole constant exponent, as expressions compile them', () => {
  const span = { start: 0, end: 0 };
  const integerPower = (base: number, exponent: number) =>
    evaluateConstant(
      {
        kind: 'binary',
        operator: '^',
        left: { kind: 'name', name: 'base', span },
        right: { kind: 'number', value: exponent, span },
        span,
      },
      () => base,
    );

  /** A double as whole * 2^-1074, so that powers and differences can be taken without any rounding. */
  function exactly(value: number): bigint {
    view.setFloat64(0, value);
    const bits = view.getBigUint64(0);
    const biased = (bits >> 52n) & 0x7ffn;
    const whole = (bits & 0xfffffffffffffn) | (biased > 0n ? 1n << 52n : 0n);
    return (whole << (biased > 0n ? biased - 1n : 0n)) * (bits >> 63n ? -1n : 1n);
  }

  test('relative error at most |exponent| 2^-53, against whole-number arithmetic', () => {
    const unit = 1n << 1074n;
    for (const base of [0.1, 1.0000001, -1.7, 3.3, 0.9999, 7.77, -0.3]) {
      for (let exponent = -64; exponent <= 64; exponent++) {
        const count = BigInt(Math.abs(exponent));
        const truth = exactly(base) ** count;
        const scale = unit ** count;
        const got = exactly(integerPower(base, exponent));
        // got / unit against truth / scale, or against scale / truth
        const [a, b] = exponent >= 0 ? [got * scale, truth * unit] : [got * truth, scale * unit];
        const relative = Number(((a - b) * 10n ** 25n) / b) / 1e25;
        expect(Math.abs(relative), `${base} ^ ${exponent}`).toBeLessThanOrEqual(Math.abs(exponent) * 2 ** -53);
      }
    }
  });

  test('exact where whole numbers fit, signs and edges', () => {
    expect(integerPower(3, 33)).toBe(5559060566555523);
    expect(integerPower(-2, 53)).toBe(-9007199254740992);
    expect(integerPower(-2, -3)).toBe(-0.125);
    expect(integerPower(0, 0)).toBe(1);
    expect(integerPower(0, -1)).toBe(Infinity);
    expect(integerPower(1e200, 2)).toBe(Infinity);
    expect(integerPower(NaN, 3)).toBeNaN();
  });
});
