import type { Expression } from './expression.js';
import { Graph } from './graph.js';
import { lower } from './lower.js';

/**
 * The value of an expression of constants (and, in a family, `number`).
 *
 * It goes through the same graph as every program, so that a folded constant and a computed one have the same bits.
 *
 * @fails throws what `constantOf` throws; a name that is no constant is a defect of the check
 */
export function evaluateConstant(tree: Expression, constantOf: (name: string) => number): number {
  const graph = new Graph();
  const node = lower(tree, graph, {
    value: (name) => graph.constant(constantOf(name)),
    family: (name) => {
      throw new Error(`the family ${name} in an expression of constants`);
    },
  });
  return graph.constantValue(node)!;
}
