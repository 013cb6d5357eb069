/**
 * One coordinate of one point of a randomly shifted lattice, folded by the tent transformation: 1 - |2 u - 1| with
 * u = shift + offset less its whole part.
 *
 * Nothing is rounded. A shift is an odd multiple of 2⁻⁵³ (what `drawUniforms` draws) and an offset a multiple of 2⁻⁵²,
 * so shift + (offset - 1) is an odd multiple of 2⁻⁵³ between -1 and 1, which a double holds, while shift + offset above 1
 * would be one digit too long. The tent has period 1 and is even, so it needs no whole part taken off. The result is an odd
 * multiple of 2⁻⁵², (k + ½) 2⁻⁵¹: never 0, never 1, and each value as likely as any other where the shift is uniform.
 *
 * @param offset from 0 up to 1, without 1
 * @source Cranley & Patterson (1976), SIAM J. Numer. Anal. 13, 904-914 (shift); Hickernell (2002), Monte Carlo and
 *   Quasi-Monte Carlo Methods 2000, 274-289 (tent)
 */
export function latticeUniform(shift: number, offset: number): number {
  const place = shift + (offset - 1);
  return 1 - Math.abs(Math.abs(place + place) - 1);
}
