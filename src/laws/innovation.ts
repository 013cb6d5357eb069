import type { Graph, Node } from '../program/graph.js';

/**
 * The law of one independent random input, with the polynomials that make martingale increments of it.
 *
 * Each polynomial of degree 1 and more has mean 0 and variance 1 under the innovation's own law, and different degrees
 * are uncorrelated, so any coefficients known before the draw give an increment whose conditional mean is exactly 0.
 */
export interface Innovation {
  readonly name: 'normal';
  /** Writes the orthonormal polynomial of a degree from 0 up at the draw. */
  polynomial(graph: Graph, degree: number, draw: Node): Node;
  /** Density of the draw, for checks by numerical integration. */
  density(draw: number): number;
}
