import type { Driver } from '../paths/drivers.js';
import type { Graph, Node } from '../program/graph.js';
import { sortFalling } from '../program/sorting.js';

/** Largest count of leading ranks that a family of like members brings into the regression. */
export const leadingRankCount = 5;

/** A quantity that the automatic basis is built from, before it is standardised. */
export interface Variable {
  readonly name: string;
  readonly node: Node;
  /** Enters products with other variables; the others enter alone. */
  readonly leading: boolean;
}

/** A family whose members nothing tells apart, or drivers that stand for themselves. */
export interface DriverGroup {
  readonly name: string;
  readonly exchangeable: boolean;
  /** Indices of drivers. */
  readonly members: readonly number[];
}

/**
 * Writes the variables: the logarithm of positive drivers, the plain value of others; like members sorted, largest
 * first, and cut at the leading ranks, with the mean of all members standing for the rest.
 *
 * @param arranged the states with like members in falling order, if somebody has sorted them all already
 */
export function writeVariables(
  graph: Graph,
  drivers: readonly Driver[],
  groups: readonly DriverGroup[],
  states: readonly Node[],
  arranged: readonly Node[] | null,
): Variable[] {
  return groups.flatMap(({ name, exchangeable, members }) => {
    const coordinate = (node: Node, index: number) =>
      drivers[index]!.law.isPositive ? graph.apply('logarithm', node) : node;
    if (!exchangeable) {
      return members.map((index) => ({
        name: drivers[index]!.name,
        node: coordinate(states[index]!, index),
        leading: true,
      }));
    }
    const leadingCount = Math.min(members.length, leadingRankCount);
    const sorted =
      arranged === null
        ? sortFalling(
            graph,
            members.map((index) => states[index]!),
            leadingCount,
          )
        : members.slice(0, leadingCount).map((index) => arranged[index]!);
    const ranks = sorted.map((node, rank) => ({
      name: `${name} ranked ${rank + 1}`,
      node: coordinate(node, members[0]!),
      leading: true,
    }));
    if (members.length <= leadingRankCount) return ranks;
    const all = members.map((index) => coordinate(states[index]!, index));
    const mean = graph.multiply(graph.constant(1 / members.length), graph.sum(all));
    return [...ranks, { name: `mean of ${name}`, node: mean, leading: false }];
  });
}
