import type { Graph, Node } from '../program/graph.js';
import { sortFalling } from '../program/sorting.js';
import type { DriverGroup } from './variables.js';

/**
 * The drivers' values with those of like members in falling order, in the members' places.
 *
 * A column that is averaged over fixed points gives each driver its own coordinates; only after sorting does it give the
 * same value to states that differ by a permutation, as the continuation value does. Unsorted, five lots had twice the
 * gap.
 */
export function arrangeStates(graph: Graph, groups: readonly DriverGroup[], states: readonly Node[]): Node[] {
  const arranged = [...states];
  for (const { exchangeable, members } of groups) {
    if (!exchangeable) continue;
    const sorted = sortFalling(
      graph,
      members.map((index) => states[index]!),
      members.length,
    );
    members.forEach((index, rank) => {
      arranged[index] = sorted[rank]!;
    });
  }
  return arranged;
}
