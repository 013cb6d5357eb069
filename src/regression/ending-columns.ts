import type { Driver } from '../paths/drivers.js';
import { meaningsOfState } from '../paths/meanings.js';
import type { Expression } from '../program/expression.js';
import type { Graph, Node } from '../program/graph.js';
import { lower, type Meanings } from '../program/lower.js';
import type { CheckedModel } from '../scenario/model.js';
import type { Column } from './basis.js';
import { endingMargins } from './ending-margins.js';
import { writePointStates } from './expected-payoff.js';

/** The clock at a date, and the times to the next date and to the last. */
export interface DateTimes {
  readonly clock: Node;
  readonly untilNext: Node;
  readonly untilLast: Node;
}

/** Keeps a margin without spread, such as one of the clock alone, from being divided by nothing. */
const smallestVariance = 1e-30;

/**
 * The columns that know the ending event: for some times ahead, roughly the probability that it will not hold then, alone
 * and times the payoff.
 *
 * Near the event the continuation value falls within a step or two from much to what the event pays, and no polynomial
 * follows that. The event is taken apart into margins, each one comparison; the probability is the product over them of
 * the normal cumulative of -mean / spread, both over the fixed points of the expected payoff. A column of a regression
 * needs no exact probability: it must fall where the value falls.
 *
 * Which times ahead, and the products with the payoff, were chosen by measurement: see DEVELOPERS.md.
 */
export function writeEndingColumns(
  model: CheckedModel,
  graph: Graph,
  drivers: readonly Driver[],
  states: readonly Node[],
  payoff: Node,
  { clock, untilNext, untilLast }: DateTimes,
  pairCount: number,
): Column[] {
  const { endingEvent } = model.contract;
  if (endingEvent === null) return [];
  const margins = endingMargins(endingEvent.event.tree);
  if (margins.length === 0) return [];
  const twoSteps = graph.apply('minimum', graph.multiply(graph.constant(2), untilNext), untilLast);
  const horizons = [
    { name: 'at the next date', duration: untilNext },
    { name: 'after two steps', duration: twoSteps },
    { name: 'a third of the way', duration: graph.multiply(graph.constant(1 / 3), untilLast) },
  ];
  return horizons.flatMap(({ name, duration }) => {
    const time = graph.add(clock, duration);
    const meanings = writePointStates(model, graph, drivers, states, duration, pairCount).map((point) =>
      meaningsOfState(model, graph, drivers, point, time),
    );
    const goesOn = graph.product(margins.flatMap((margin) => writeGoesOn(graph, margin, meanings)));
    return [
      { name: `contract goes on ${name}`, node: goesOn },
      { name: `payoff × contract goes on ${name}`, node: graph.multiply(payoff, goesOn) },
    ];
  });
}

type Margin = ReturnType<typeof endingMargins>[number];

/** For each way in which a margin may become positive, roughly the probability that it is not. */
function writeGoesOn(graph: Graph, { high, low }: Margin, points: readonly Meanings[]): Node[] {
  const byPoint = points.map((meanings) =>
    eachOf(high, graph, meanings).flatMap((a) => eachOf(low, graph, meanings).map((b) => graph.subtract(a, b))),
  );
  const share = graph.constant(1 / points.length);
  return byPoint[0]!.map((_, way) => {
    const margins = byPoint.map((ways) => ways[way]!);
    const mean = graph.multiply(share, graph.sum(margins));
    const squares = margins.map((margin) => {
      const deviation = graph.subtract(margin, mean);
      return graph.multiply(deviation, deviation);
    });
    const variance = graph.apply(
      'maximum',
      graph.multiply(share, graph.sum(squares)),
      graph.constant(smallestVariance),
    );
    const distance = graph.apply('divide', mean, graph.apply('squareRoot', variance));
    return graph.apply('normalCumulative', graph.apply('negate', distance));
  });
}

/** The values of one side of a margin: each member where any of a family will do. */
function eachOf(side: { readonly tree: Expression } | { readonly family: string }, graph: Graph, meanings: Meanings) {
  return 'family' in side ? meanings.family(side.family) : [lower(side.tree, graph, meanings)];
}
