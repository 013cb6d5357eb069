import { Graph, type Node } from '#built/program/graph.js';

/** The value of a function of one node at a number, by constant folding. */
export function evaluateAt(write: (graph: Graph, at: Node) => Node, x: number): number {
  const graph = new Graph();
  return graph.constantValue(write(graph, graph.constant(x)))!;
}
