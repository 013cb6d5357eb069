/**
 * Makes the generating vector of `src/paths/lattice-tables.ts`, component by component.
 *
 * Worst-case errors are those of the weighted Korobov space of smoothness 2 with equal weights:
 * e² = -1 + mean over the points of Π (1 + γ 2π² B₂(coordinate)), B₂(x) = x² - x + 1/6.
 */

/** Lattices of 2^4 to 2^11 points are made good together. */
export const lowestLevel = 4;
export const highestLevel = 11;

/** The weight of every coordinate: alike, because a model's drivers come in no order of importance. */
export const weight = 1 / 32;

/** A candidate must be better by this share, so that the smallest of equally good ones wins whatever is rounded. */
const tie = 1e-9;

const pointCount = 2 ** highestLevel;

/** The factor that a coordinate of i / 2^11 brings. */
const factors = Float64Array.from({ length: pointCount }, (_, i) => {
  const x = i / pointCount;
  return 1 + weight * 2 * Math.PI ** 2 * (x * x - x + 1 / 6);
});

/** Points by number, in the order of the radical inverse, as multiples of 2^-11. */
const order = Int32Array.from({ length: pointCount }, (_, point) => {
  let mirrored = 0;
  for (let digit = 0; digit < highestLevel; digit++) mirrored = 2 * mirrored + ((point >> digit) & 1);
  return mirrored;
});

const levels = Array.from({ length: highestLevel - lowestLevel + 1 }, (_, i) => lowestLevel + i);

/** Σ products × factors of one more coordinate, over some of the points. */
function sumOver(products: Float64Array, z: number, from: number, to: number): number {
  let sum = 0;
  for (let point = from; point < to; point++)
    sum += products[point]! * factors[(order[point]! * z) & (pointCount - 1)]!;
  return sum;
}

/** What a search for one more component starts from, and what it found. */
interface Search {
  /** Product over the components so far, for each point. */
  readonly products: Float64Array;
  /** Chosen component and its score. */
  z: number;
  score: number;
}

/** Takes the odd candidate of least score; one and its opposite are the same lattice mirrored, so half are tried. */
function addComponent(search: Search, candidateCount: number, scoreOf: (z: number) => number): void {
  search.score = Number.POSITIVE_INFINITY;
  for (let z = 1; z < 2 * candidateCount; z += 2) {
    const score = scoreOf(z);
    if (score < search.score * (1 - tie)) {
      search.score = score;
      search.z = z;
    }
  }
  const { products, z } = search;
  for (let point = 0; point < products.length; point++)
    products[point] = products[point]! * factors[(order[point]! * z) & (pointCount - 1)]!;
}

/** Squared errors at one level of the vector made for this level alone, by count of components. */
function bestAlone(level: number, dimensionCount: number): number[] {
  const count = 2 ** level;
  const search: Search = { products: new Float64Array(count).fill(1), z: 1, score: 0 };
  return Array.from({ length: dimensionCount }, (_, dimension) => {
    const candidateCount = dimension === 0 ? 1 : count / 4;
    addComponent(search, candidateCount, (z) => sumOver(search.products, z, 0, count) / count - 1);
    return search.score;
  });
}

/** A vector, and how far it lies behind vectors made for one level each. */
export interface Construction {
  readonly vector: readonly number[];
  /** By count of components: the largest ratio of squared errors over all levels. */
  readonly worstRatios: readonly number[];
}

/**
 * The vector whose largest ratio of squared errors, over all levels, to the vector made for that level alone is least at
 * every component.
 */
export function constructVector(dimensionCount: number): Construction {
  const references = levels.map((level) => bestAlone(level, dimensionCount));
  const search: Search = { products: new Float64Array(pointCount).fill(1), z: 1, score: 0 };
  const vector: number[] = [];
  const worstRatios: number[] = [];
  for (let dimension = 0; dimension < dimensionCount; dimension++) {
    addComponent(search, dimension === 0 ? 1 : pointCount / 4, (z) => {
      let [sum, from, worst] = [0, 0, 0];
      levels.forEach((level, i) => {
        const to = 2 ** level;
        sum += sumOver(search.products, z, from, to);
        worst = Math.max(worst, (sum / to - 1) / references[i]![dimension]!);
        from = to;
      });
      return worst;
    });
    vector.push(search.z);
    worstRatios.push(search.score);
  }
  return { vector, worstRatios };
}
