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

/** What a network moves: a value that is compared, and a companion that goes where its value goes. */
interface Item {
  readonly key: Node;
  readonly companion: Node | null;
}

/**
 * The largest of several nodes in falling order, as many as asked for.
 *
 * @param count how many; all if left out
 * @cost linear in the nodes for a fixed count
 */
export function sortFalling(graph: Graph, nodes: readonly Node[], count = nodes.length): Node[] {
  const items = nodes.map((key) => ({ key, companion: null }));
  return leadingItems(graph, items, count).map(({ key }) => key);
}

/**
 * Companions in the order that sorts the keys falling: companion of the largest key first, as many as asked for.
 *
 * The companions are only permuted, by a permutation that depends on the keys alone. Independent and identically
 * distributed innovations, independent of the keys, therefore keep their joint law.
 *
 * @cost linear in the keys for a fixed count
 */
export function sortCompanions(
  graph: Graph,
  keys: readonly Node[],
  companions: readonly Node[],
  count = keys.length,
): Node[] {
  const items = keys.map((key, index) => ({ key, companion: companions[index]! }));
  return leadingItems(graph, items, count).map(({ companion }) => companion!);
}

/**
 * The leading items, sorted. Of many items each half is reduced to its leading ones first; of two falling lists the
 * larger of first and last, second and last but one, and so on, are the leading ones of both together.
 */
function leadingItems(graph: Graph, items: readonly Item[], count: number): Item[] {
  if (count < 1) return [];
  if (items.length < 2 * count) return sortItems(graph, items).slice(0, count);
  const middle = Math.floor(items.length / 2);
  const left = leadingItems(graph, items.slice(0, middle), count);
  const right = leadingItems(graph, items.slice(middle), count);
  const both = left.map((item, index) => larger(graph, item, right[count - 1 - index]!));
  return sortItems(graph, both);
}

function sortItems(graph: Graph, items: readonly Item[]): Item[] {
  const sorted = [...items];
  for (const [high, low] of sortingNetwork(items.length)) {
    const [a, b] = [sorted[high]!, sorted[low]!];
    sorted[high] = larger(graph, a, b);
    sorted[low] = smaller(graph, a, b);
  }
  return sorted;
}

function larger(graph: Graph, a: Item, b: Item): Item {
  return { key: graph.apply('maximum', a.key, b.key), companion: companionOf(graph, a, b, b, a) };
}

function smaller(graph: Graph, a: Item, b: Item): Item {
  return { key: graph.apply('minimum', a.key, b.key), companion: companionOf(graph, a, b, a, b) };
}

/** The first choice's companion where a is less than b, else the second's. */
function companionOf(graph: Graph, a: Item, b: Item, whenLess: Item, otherwise: Item): Node | null {
  if (whenLess.companion === null || otherwise.companion === null) return null;
  return graph.apply('select', graph.apply('less', a.key, b.key), whenLess.companion, otherwise.companion);
}
