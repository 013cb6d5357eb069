import { type Amounts, writeAmounts, writeScaled } from '../clauses/amounts.js';
import type { Driver } from '../paths/drivers.js';
import { meaningsOfState } from '../paths/meanings.js';
import { Graph, type Node } from '../program/graph.js';
import { lower } from '../program/lower.js';
import { arrangeStates } from '../regression/arrange-states.js';
import { automaticBasis } from '../regression/automatic-basis.js';
import type { Basis, Column } from '../regression/basis.js';
import { basisSizes } from '../regression/basis-size.js';
import { writeEndingColumns } from '../regression/ending-columns.js';
import { largestDriverCount, writeExpectedPayoff } from '../regression/expected-payoff.js';
import { statedBasis } from '../regression/stated-basis.js';
import { type DriverGroup, type Variable, writeVariables } from '../regression/variables.js';
import type { CheckedModel } from '../scenario/model.js';
import type { DriverLayout } from './layout.js';

/**
 * Uniform inputs of the programs that look at one date, by position; mean and inverse spread of each variable follow
 * from `firstStandard` on.
 */
export const dateUniforms = {
  clock: 0,
  discountFactor: 1,
  untilNext: 2,
  untilLast: 3,
  /** 1 where somebody may decide, 0 today if nobody may. */
  isDecisionDate: 4,
  firstStandard: 5,
} as const;

/** Everything about one date as a function of the drivers in `next`: amounts, basis, variables before standardising. */
export interface DateGraph {
  readonly graph: Graph;
  readonly amounts: Amounts;
  readonly basis: Basis;
  readonly variables: readonly Variable[];
  readonly uniformCount: number;
  /** Sizes that the basis could have; 1 where the scenario states it. */
  readonly sizeCount: number;
  /** Paths of the fit for each column, when nobody says. */
  readonly pathsPerColumn: number;
}

/** Paths of the fit for each column of a basis that the scenario states. */
const statedPathsPerColumn = 800;

/**
 * Writes amounts and basis of a date.
 *
 * @param size which of the automatic basis' sizes, from 0 on
 * @fails throws if there is no such size
 */
export function writeDateGraph(
  model: CheckedModel,
  drivers: readonly Driver[],
  groups: readonly DriverGroup[],
  layout: DriverLayout,
  size: number,
): DateGraph {
  const graph = new Graph();
  const states = drivers.map((_, index) => graph.column(layout.next + index));
  const clock = graph.uniform(dateUniforms.clock);
  const factor = graph.uniform(dateUniforms.discountFactor);
  const meanings = meaningsOfState(model, graph, drivers, states, clock);
  const amounts = writeAmounts(graph, model.contract, meanings, factor, graph.uniform(dateUniforms.isDecisionDate));
  if (model.method.basis !== 'auto') {
    const basis = unlessEnded(graph, statedBasis(model.method.basis, graph, meanings), amounts);
    return {
      graph,
      amounts,
      basis,
      variables: [],
      uniformCount: dateUniforms.firstStandard,
      sizeCount: 1,
      pathsPerColumn: statedPathsPerColumn,
    };
  }
  const arranged = drivers.length <= largestDriverCount ? arrangeStates(graph, groups, states) : null;
  const variables = writeVariables(graph, drivers, groups, states, arranged);
  const standardised = variables.map(({ name, node, leading }, index) => {
    const mean = graph.uniform(dateUniforms.firstStandard + 2 * index);
    const inverseSpread = graph.uniform(dateUniforms.firstStandard + 2 * index + 1);
    return { name, leading, node: graph.multiply(graph.subtract(node, mean), inverseSpread) };
  });
  const sizes = basisSizes(variables.filter(({ leading }) => leading).length);
  const basisSize = sizes[size];
  if (basisSize === undefined) throw new Error(`the automatic basis has no size ${size}`);
  const payoffs: Column[] = [{ name: 'payoff', node: amounts.payoff }];
  if (arranged !== null) {
    const expectedAfter = (uniform: number) => {
      const duration = graph.uniform(uniform);
      const payoffAt = (nodes: readonly Node[]) => {
        const later = meaningsOfState(model, graph, drivers, nodes, graph.add(clock, duration));
        return lower(model.contract.payoff.tree, graph, later);
      };
      const expected = writeExpectedPayoff(model, graph, drivers, arranged, duration, basisSize.pairCount, payoffAt);
      return writeScaled(graph, model.contract, expected, factor);
    };
    payoffs.push({ name: 'payoff expected at the next date', node: expectedAfter(dateUniforms.untilNext) });
    payoffs.push({ name: 'payoff expected at the last date', node: expectedAfter(dateUniforms.untilLast) });
    const untilNext = graph.uniform(dateUniforms.untilNext);
    const untilLast = graph.uniform(dateUniforms.untilLast);
    const times = { clock, untilNext, untilLast };
    payoffs.push(...writeEndingColumns(model, graph, drivers, arranged, amounts.payoff, times, basisSize.pairCount));
  }
  const basis = unlessEnded(graph, automaticBasis(graph, standardised, payoffs, basisSize), amounts);
  const uniformCount = dateUniforms.firstStandard + 2 * variables.length;
  return {
    graph,
    amounts,
    basis,
    variables,
    uniformCount,
    sizeCount: sizes.length,
    pathsPerColumn: basisSize.pathsPerColumn,
  };
}

/**
 * Makes every column 0 where the ending event holds, the constant too: such a state has no continuation, and so adds
 * nothing to the regression and takes nothing from it.
 */
function unlessEnded(graph: Graph, basis: Basis, { ended }: Amounts): Basis {
  if (ended === null) return basis;
  const zero = graph.constant(0);
  const columns = basis.columns.map((column) => ({ ...column, node: graph.apply('select', ended, zero, column.node) }));
  return { ...basis, columns };
}
