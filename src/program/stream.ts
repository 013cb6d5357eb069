/**
 * Random streams: a draw is a function of its key and of where it stands, so that a stream can be entered anywhere and
 * nothing that is added elsewhere shifts it.
 *
 * Two published generators share the work. Philox 4×32-10 (Salmon, Moraes, Dror & Shaw 2011, "Parallel random numbers:
 * as easy as 1, 2, 3", SC'11) turns (key; block, date, replicate, strand) into a starting state; four strands of
 * xoshiro128++ (Blackman & Vigna 2021, ACM Trans. Math. Softw. 47:36), lane i on strand i mod 4, run on from there for
 * the lanes of one block. Both use 32-bit integers only, so that plain JavaScript and vector instructions agree.
 */
export interface StreamKey {
  readonly low: number;
  readonly high: number;
}

const multiplier0 = 0xd2511f53;
const multiplier1 = 0xcd9e8d57;
const weyl0 = 0x9e3779b9;
const weyl1 = 0xbb67ae85;

/** High 32 bits of the 64-bit product of two unsigned 32-bit integers. */
function highProduct(a: number, b: number): number {
  const aLow = a & 0xffff;
  const aHigh = a >>> 16;
  const bLow = b & 0xffff;
  const bHigh = b >>> 16;
  const middle = aHigh * bLow + ((aLow * bLow) >>> 16);
  const carry = aLow * bHigh + (middle & 0xffff);
  return (aHigh * bHigh + (middle >>> 16) + (carry >>> 16)) >>> 0;
}

/**
 * Philox 4×32 with ten rounds: writes the four words for a counter into `words`.
 *
 * @source Salmon et al. (2011), section 4.3 and the authors' published known answers
 */
export function philox(key: StreamKey, c0: number, c1: number, c2: number, c3: number, words: Uint32Array): void {
  let k0 = key.low;
  let k1 = key.high;
  for (let round = 0; round < 10; round++) {
    const high0 = highProduct(multiplier0, c0 >>> 0);
    const low0 = Math.imul(multiplier0, c0);
    const high1 = highProduct(multiplier1, c2 >>> 0);
    const low1 = Math.imul(multiplier1, c2);
    c0 = high1 ^ c1 ^ k0;
    c2 = high0 ^ c3 ^ k1;
    c1 = low1;
    c3 = low0;
    k0 = (k0 + weyl0) | 0;
    k1 = (k1 + weyl1) | 0;
  }
  words[0] = c0;
  words[1] = c1;
  words[2] = c2;
  words[3] = c3;
}

const strandCount = 4;
const words = new Uint32Array(4);

/**
 * Fills `out[offset … offset + lanes - 1]` with uniforms (k + ½) · 2⁻⁵², k from 0 to 2⁵² - 1: never 0, never 1.
 *
 * Each takes two words of its strand, the upper 26 bits of each.
 */
export function drawUniforms(
  key: StreamKey,
  block: number,
  date: number,
  replicate: number,
  out: Float64Array,
  offset: number,
  lanes: number,
): void {
  for (let strand = 0; strand < strandCount; strand++) {
    philox(key, block, date, replicate, strand, words);
    let s0 = words[0]! | 0;
    let s1 = words[1]! | 0;
    let s2 = words[2]! | 0;
    let s3 = words[3]! | 0;
    if ((s0 | s1 | s2 | s3) === 0) s0 = 1;
    for (let lane = strand; lane < lanes; lane += strandCount) {
      let sum = (s0 + s3) | 0;
      const upper = (((sum << 7) | (sum >>> 25)) + s0) | 0;
      let shifted = s1 << 9;
      s2 ^= s0;
      s3 ^= s1;
      s1 ^= s2;
      s0 ^= s3;
      s2 ^= shifted;
      s3 = (s3 << 11) | (s3 >>> 21);
      sum = (s0 + s3) | 0;
      const lower = (((sum << 7) | (sum >>> 25)) + s0) | 0;
      shifted = s1 << 9;
      s2 ^= s0;
      s3 ^= s1;
      s1 ^= s2;
      s0 ^= s3;
      s2 ^= shifted;
      s3 = (s3 << 11) | (s3 >>> 21);
      out[offset + lane] = ((upper >>> 6) * 67108864 + (lower >>> 6) + 0.5) * 2.220446049250313e-16;
    }
  }
}
