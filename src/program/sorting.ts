import type { Graph, Node } from './graph.js';

/** One comparator of a sorting network: the larger value goes to `high`, the smaller to `low`. */
type Comparator = readonly [high: number, low: number];

/**
 * Comparators that sort `count` values with the largest first.
 *
 * A network has no branches, so all lanes run through it together; what nobody asks for (the lower ranks of a large
 * family) is never compiled.
 *
 * @source Batcher (1968), "Sorting networks and their applications", AFIPS 32, 307-314 (odd-even merge sort), for any
 * count as in Knuth, The Art of Computer Programming 3, algorithm 5.2.2M
 */
export function sortingNetwork(count: number): Comparator[] {
  const comparators: Comparator[] = [];
  let top = 1;
  while (top < count) top *= 2;
  for (let p = top / 2; p >= 1; p /= 2) {
    let q = top / 2;
    let r = 0;
    let d = p;
    for (;;) {
      for (let i = 0; i + d < count; i++) if ((i & p) === r) comparators.push([i, i + d]);
      if (q === p) break;
      d = q - p;
      q /= 2;
      r = p;
    }
  }
  return comparators;
}

/** The nodes in falling order. @shape as many as given */
export function sortFalling(graph: Graph, nodes: readonly Node[]): Node[] {
  const sorted = [...nodes];
  for (const [high, low] of sortingNetwork(nodes.length)) {
    const [a, b] = [sorted[high]!, sorted[low]!];
    sorted[high] = graph.apply('maximum', a, b);
    sorted[low] = graph.apply('minimum', a, b);
  }
  return sorted;
}

/**
 * Companions in the order that sorts the keys falling: companion of the largest key first.
 *
 * The companions are only permuted, by a permutation that depends on the keys alone. Independent and identically
 * distributed innovations, independent of the keys, therefore keep their joint law.
 */
export function sortCompanions(graph: Graph, keys: readonly Node[], companions: readonly Node[]): Node[] {
  const sortedKeys = [...keys];
  const sorted = [...companions];
  for (const [high, low] of sortingNetwork(keys.length)) {
    const [a, b] = [sortedKeys[high]!, sortedKeys[low]!];
    const [x, y] = [sorted[high]!, sorted[low]!];
    const swap = graph.apply('less', a, b);
    sortedKeys[high] = graph.apply('maximum', a, b);
    sortedKeys[low] = graph.apply('minimum', a, b);
    sorted[high] = graph.apply('select', swap, y, x);
    sorted[low] = graph.apply('select', swap, x, y);
  }
  return sorted;
}
