import type { Driver } from '../paths/drivers.js';
import { writeStep } from '../paths/step-program.js';
import { normalQuantile } from '../program/elementary.js';
import type { Graph, Node } from '../program/graph.js';
import type { CheckedModel } from '../scenario/model.js';

/** Drivers beyond which the averages would cost several times as much as all other columns together. */
export const largestDriverCount = 40;

/**
 * Writes the payoff's average over fixed points of the innovations after a time: roughly what the payoff is expected to
 * be then.
 *
 * A column of a regression needs no exact mean. What counts is that the average bends where the continuation value
 * does, softly and more softly the longer the time, which polynomials cannot follow.
 *
 * @param payoff writes the payoff for nodes of the drivers
 * @source points: multiples of the square roots of primes (Richtmyer 1951, Los Alamos report LA-1342), mirrored
 */
export function writeExpectedPayoff(
  model: CheckedModel,
  graph: Graph,
  drivers: readonly Driver[],
  states: readonly Node[],
  duration: Node,
  pairCount: number,
  payoff: (states: readonly Node[]) => Node,
): Node {
  const values = writePointStates(model, graph, drivers, states, duration, pairCount).map(payoff);
  return graph.multiply(graph.constant(1 / values.length), graph.sum(values));
}

/**
 * Writes the drivers after a time for each of the fixed points; asked twice for one time, the graph holds them once.
 *
 * @shape points × drivers
 */
export function writePointStates(
  model: CheckedModel,
  graph: Graph,
  drivers: readonly Driver[],
  states: readonly Node[],
  duration: Node,
  pairCount: number,
): Node[][] {
  return evenPoints(drivers.length, pairCount).map((point) => {
    const innovations = point.map((draw) => graph.constant(draw));
    return writeStep(model, graph, drivers, states, innovations, duration);
  });
}

/** Standard normal points, evenly spread and symmetric about 0. @shape 2 × pairs, dimensions */
function evenPoints(dimensionCount: number, pairCount: number): number[][] {
  const steps = primes(dimensionCount).map((prime) => Math.sqrt(prime));
  return Array.from({ length: pairCount }, (_, index) => {
    const point = steps.map((step) => {
      const position = (index + 0.5) * step;
      return normalQuantile(position - Math.floor(position));
    });
    return [point, point.map((draw) => -draw)];
  }).flat();
}

function primes(count: number): number[] {
  const found: number[] = [];
  for (let candidate = 2; found.length < count; candidate++) {
    if (found.every((prime) => candidate % prime !== 0)) found.push(candidate);
  }
  return found;
}
