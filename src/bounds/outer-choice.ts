import { compile, type Output } from '../program/compile.js';
import { Graph, type Node } from '../program/graph.js';
import type { Program } from '../program/program.js';
import type { Programs } from '../rule/programs.js';
import type { OuterColumns, OuterKind } from './outer-programs.js';

/**
 * What happens at a date on a path: hindsight's maxima take the amount in, and a running path on which the rule
 * exercises takes it as its result. On the last date every running path ends; it ends unused if doing nothing, or the
 * floor, is what it takes.
 *
 * Where the ending event holds, the amount is what it pays: a running path takes it as its result without exercising,
 * and it is the last amount that hindsight takes in.
 */
export function buildChoose(
  { layout, floor }: Programs,
  columns: OuterColumns,
  kind: OuterKind,
  isLast: boolean,
): Program {
  const graph = new Graph();
  const column = (index: number) => graph.column(index);
  const outputs: Output[] = [];
  const amount = column(isLast ? layout.terminal : layout.payoff);
  const ended = layout.ended === null ? null : column(layout.ended);
  const note = (upper: number, martingale: number): Node => {
    const net = graph.subtract(amount, column(martingale));
    const larger = graph.apply('maximum', column(upper), net);
    const noted = ended === null ? larger : graph.apply('select', column(columns.alive), larger, column(upper));
    outputs.push({ node: noted, column: upper });
    return net;
  };
  const regressedNet = note(columns.regressedUpper, columns.regressed);
  let net = regressedNet;
  if (kind === 'one-step') {
    net = note(columns.upper, columns.martingale);
    note(columns.halfUpper, columns.halfMartingale);
  }
  const running = column(columns.running);
  const ends = ended === null ? null : graph.multiply(running, ended);
  const open = ends === null ? running : graph.subtract(running, ends);
  const exercises = isLast ? open : graph.multiply(open, graph.apply('less', column(layout.hold), amount));
  const takes = ends === null ? exercises : graph.add(exercises, ends);
  outputs.push({ node: graph.apply('select', takes, net, column(columns.lower)), column: columns.lower });
  outputs.push({ node: graph.apply('select', takes, amount, column(columns.plain)), column: columns.plain });
  if (isLast) {
    const isIdle = graph.apply('less', column(layout.payoff), amount);
    const isWorthless = floor === null ? graph.constant(0) : graph.apply('lessOrEqual', amount, graph.constant(floor));
    const unused = graph.multiply(open, graph.apply('maximum', isIdle, isWorthless));
    outputs.push({ node: unused, column: columns.unused });
    outputs.push({ node: graph.subtract(open, unused), column: columns.exercised });
  } else {
    outputs.push({ node: exercises, column: columns.exercised });
    outputs.push({ node: graph.subtract(open, exercises), column: columns.running });
  }
  if (ended !== null && ends !== null) {
    outputs.push({ node: ends, column: columns.ended });
    const goesOn = graph.subtract(graph.constant(1), ended);
    outputs.push({ node: graph.multiply(column(columns.alive), goesOn), column: columns.alive });
  }
  return compile(graph, outputs, 0, layout.scratch, 'choice');
}
