/** Numbers at which operations change their ways: signs of zero, the edges of the range, ties, steps of the kernels. */
export const specialNumbers: readonly number[] = [
  ...[0, Number.MIN_VALUE, 2 ** -1073, 2 ** -1022 - Number.MIN_VALUE, 2 ** -1022, 1e-300, 2 ** -54, 2 ** -53, 1e-9],
  ...[0.25, 0.5, Math.SQRT1_2, 0.9999999999999999, 1, 1.0000000000000002, Math.SQRT2, 1.5, 2, 2.5, 3, 7.5, 26.5],
  // Halves of log 2, where the exponential's multiple of it is a tie; then the edges of its ordinary and whole range.
  ...[Math.LN2 / 2, 1.5 * Math.LN2, 2.5 * Math.LN2, 707.9999999999999, 708, 708.4, 709, 709.782712893384, 710, 710.5],
  ...[709.7827128933841, 744.4400719213812, 745.1332191019411, 745.1332191019412, 746, 747, 800],
  // Where the normal cumulative becomes subnormal, vanishes and is cut.
  ...[37.5, 38.4, 38.485, 38.6, 38.99999999999999, 39, 40],
  ...[2 ** 31, 2 ** 32, 4503599627370495.5, 2 ** 52, 2 ** 53, 1e200, Number.MAX_VALUE, Number.POSITIVE_INFINITY],
].flatMap((x) => [x, -x]);

/** All of them, and not-a-number. */
export const specialValues: readonly number[] = [...specialNumbers, Number.NaN];

/** A small generator of the tests' own, so that what is tested does not make its own inputs. */
export class TestNumbers {
  #state: number;
  readonly #double = new Float64Array(1);
  readonly #words = new Uint32Array(this.#double.buffer);

  constructor(seed: number) {
    this.#state = seed | 0;
  }

  /** Below 2^32: the mixing function of MurmurHash3 (Appleby) over a counter. */
  word(): number {
    this.#state = (this.#state + 0x9e3779b9) | 0;
    let x = this.#state;
    x = Math.imul(x ^ (x >>> 16), 0x85ebca6b);
    x = Math.imul(x ^ (x >>> 13), 0xc2b2ae35);
    return (x ^ (x >>> 16)) >>> 0;
  }

  below(count: number): number {
    return this.word() % count;
  }

  /** From -1 to 1, all digits random. */
  fraction(): number {
    return (this.word() / 2 ** 32 + this.word() / 2 ** 64) * 2 - 1;
  }

  /** Any bits, so any exponent. */
  anyDouble(): number {
    this.#words[0] = this.word();
    this.#words[1] = this.word();
    return this.#double[0]!;
  }

  /** Of every kind: special, of any exponent, in the ranges where the elementary functions work. */
  mixed(): number {
    switch (this.below(8)) {
      case 0:
        return specialValues[this.below(specialValues.length)]!;
      case 1:
        return this.anyDouble();
      case 2:
        return this.fraction() * 750;
      case 3:
        return this.fraction() * 40;
      case 4:
        return Math.round(this.fraction() * 20) / 2;
      default:
        return this.fraction() * 4;
    }
  }

  /** Finite, over some orders of magnitude: sums of these depend on their order. */
  ordinary(): number {
    return this.fraction() * 10 ** (this.below(5) - 2);
  }

  fill(values: Float64Array, next: () => number): Float64Array {
    for (let i = 0; i < values.length; i++) values[i] = next();
    return values;
  }
}

/** Where two arrays differ to the last bit; any not-a-number counts as any other. */
export function firstDifference(a: ArrayLike<number>, b: ArrayLike<number>): string | null {
  if (a.length !== b.length) return `lengths ${a.length} and ${b.length}`;
  for (let i = 0; i < a.length; i++) if (!Object.is(a[i], b[i])) return `at ${i}: ${a[i]} and ${b[i]}`;
  return null;
}
