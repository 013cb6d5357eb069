import type { PlacedExpression } from '../program/expression.js';
import type { Graph } from '../program/graph.js';
import { lower, type Meanings } from '../program/lower.js';
import type { Basis } from './basis.js';

/** The basis that a scenario states, with the constant in front; the integrands use all of it. */
export function statedBasis(expressions: readonly PlacedExpression[], graph: Graph, meanings: Meanings): Basis {
  const stated = expressions.map(({ text, tree, line }) => ({ name: text, node: lower(tree, graph, meanings), line }));
  return { columns: [{ name: '1', node: graph.constant(1) }, ...stated], integrandColumnCount: 1 + stated.length };
}
