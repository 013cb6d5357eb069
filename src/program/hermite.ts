import type { Graph, Node } from './graph.js';

/**
 * Writes the Hermite polynomial of the degree, scaled to variance 1 under the standard normal law, at a node.
 *
 * @source He_{n+1}(z) = z He_n(z) - n He_{n-1}(z), variance n! (Abramowitz & Stegun 1964, 22.2.15 and 22.7.14); scaled
 * by 1/√n! the recurrence is √(n+1) h_{n+1} = z h_n - √n h_{n-1}
 */
export function hermitePolynomial(graph: Graph, degree: number, at: Node): Node {
  let previous = graph.constant(1);
  if (degree === 0) return previous;
  let current = at;
  for (let n = 1; n < degree; n++) {
    const next = graph.subtract(graph.multiply(at, current), graph.multiply(graph.constant(Math.sqrt(n)), previous));
    previous = current;
    current = graph.multiply(graph.constant(1 / Math.sqrt(n + 1)), next);
  }
  return current;
}
