import { generatingVector } from './lattice-tables.js';

/**
 * Dimensions of the largest lattice: with more innovations than the generating vector has numbers, points are plain draws.
 *
 * All of the innovations or none: with a hundred drivers, lattices in the first forty and plain draws in the others took away
 * a third to a half of the variance that lattices in all did (measured, see DEVELOPERS.md).
 */
export const largestLatticeDimensionCount = generatingVector.length;

/**
 * Writes where a point of the lattice lies before it is shifted: frac(φ(point) z), φ the radical inverse in base 2 and z the
 * generating vector.
 *
 * In this order the first 2^m points are the whole lattice of 2^m points, for every m: first the even multiples of z / 2^m,
 * then the odd ones, and each half the same way. Nothing is rounded: φ has as many binary digits as the point's number.
 *
 * Points 2 i and 2 i + 1 lie half apart in every dimension, z being odd, so that folded by the tent they are opposite draws:
 * whatever is odd in the draws averages to 0 over every such pair.
 *
 * @param point from 0 up
 * @param offsets to fill, from 0 up to 1. @shape dimensions
 * @source the order: van der Corput (1935), Proc. Akad. Wet. Amsterdam 38, 813-821; embedded lattices: Cools, Kuo &
 *   Nuyens (2006), SIAM J. Sci. Comput. 28, 2162-2188
 */
export function latticeOffsets(point: number, offsets: Float64Array): void {
  const position = radicalInverse(point);
  for (let dimension = 0; dimension < offsets.length; dimension++) {
    const place = position * generatingVector[dimension]!;
    offsets[dimension] = place - Math.floor(place);
  }
}

/** The binary digits of a whole number, mirrored at the point: 6 = 110 gives 0.011. */
function radicalInverse(whole: number): number {
  let inverse = 0;
  let weight = 0.5;
  for (let rest = whole; rest > 0; rest = Math.floor(rest / 2)) {
    inverse += (rest % 2) * weight;
    weight /= 2;
  }
  return inverse;
}
