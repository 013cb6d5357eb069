import { continuationFloor, decisionSign, writeAmounts } from '../clauses/amounts.js';
import { discountFactors } from '../clauses/discount.js';
import { writePolynomials } from '../martingale/polynomials.js';
import { listDrivers } from '../paths/drivers.js';
import { meaningsOfState } from '../paths/meanings.js';
import { buildStepProgram } from '../paths/step-program.js';
import { compile, type Output } from '../program/compile.js';
import { Graph } from '../program/graph.js';
import type { Program } from '../program/program.js';
import { automaticBasis } from '../regression/automatic-basis.js';
import { groupDrivers } from '../regression/groups.js';
import { statedBasis } from '../regression/stated-basis.js';
import { writeVariables } from '../regression/variables.js';
import type { CheckedModel } from '../scenario/model.js';

/** Where everything of a block stands in the workspace: the first column of each part. */
export interface Layout {
  /** Drivers at the date before the step. */
  readonly state: number;
  /** Independent innovations of the step. */
  readonly innovations: number;
  /** Drivers at the date after the step; amounts and basis are evaluated here. */
  readonly next: number;
  /** Discounted payoff, then the terminal amount. */
  readonly payoff: number;
  readonly terminal: number;
  readonly basis: number;
  readonly variables: number;
  readonly polynomials: number;
  /** Coefficients of the polynomials at `state`. */
  readonly integrands: number;
  /** Free columns for the stages: integrands at `next`, responses, saved drivers. */
  readonly stage: number;
  readonly scratch: number;
}

/** What one column of a regression or one driver is called, and the line that it comes from. */
export interface Named {
  readonly name: string;
  readonly line: number | null;
}

/** Everything of a model that is fixed before the first draw: plain data, sent to every worker. */
export interface Programs {
  readonly layout: Layout;
  readonly step: Program;
  /** Amounts and basis columns at `next`. Uniforms: clock, discount factor, then mean and inverse spread of each variable. */
  readonly evaluate: Program;
  /** Variables at `next`, before they are standardised. */
  readonly variables: Program;
  /** Martingale polynomials of the innovations, given `state`. */
  readonly polynomials: Program;
  readonly drivers: readonly (Named & { readonly start: number })[];
  readonly columns: readonly Named[];
  /** The integrands use this many columns, from the first on. */
  readonly integrandColumnCount: number;
  readonly polynomialNames: readonly string[];
  readonly variableCount: number;
  /** Times of the grid: today first, then the decision dates. */
  readonly times: readonly number[];
  readonly discountFactors: readonly number[];
  readonly todayIsDecisionDate: boolean;
  readonly floor: 0 | null;
  readonly sign: 1 | -1;
  readonly payoffLine: number | null;
}

export const evaluateUniforms = { clock: 0, discountFactor: 1, firstStandard: 2 } as const;

/** Compiles the programs of a model. */
export function buildPrograms(model: CheckedModel): Programs {
  const drivers = listDrivers(model);
  const groups = groupDrivers(model, drivers);
  const count = drivers.length;
  const state = 0;
  const innovations = count;
  const next = 2 * count;
  const payoff = 3 * count;
  const terminal = payoff + 1;
  const basis = payoff + 2;

  const graph = new Graph();
  const states = drivers.map((_, index) => graph.column(next + index));
  const clock = graph.uniform(evaluateUniforms.clock);
  const meanings = meaningsOfState(model, graph, drivers, states, clock);
  const amounts = writeAmounts(graph, model.contract, meanings, graph.uniform(evaluateUniforms.discountFactor));
  const rawVariables = model.method.basis === 'auto' ? writeVariables(graph, drivers, groups, states) : [];
  const standardised = rawVariables.map(({ name, node, leading }, index) => {
    const mean = graph.uniform(evaluateUniforms.firstStandard + 2 * index);
    const inverseSpread = graph.uniform(evaluateUniforms.firstStandard + 2 * index + 1);
    return { name, leading, node: bounded(graph, graph.multiply(graph.subtract(node, mean), inverseSpread)) };
  });
  const { columns, integrandColumnCount } =
    model.method.basis === 'auto'
      ? automaticBasis(graph, standardised, amounts.payoff)
      : statedBasis(model.method.basis, graph, meanings);

  const variables = basis + columns.length;
  const polynomials = variables + rawVariables.length;
  const stepGraph = new Graph();
  const written = writePolynomials(
    stepGraph,
    drivers,
    groups,
    drivers.map((_, index) => stepGraph.column(state + index)),
    drivers.map((_, index) => stepGraph.column(innovations + index)),
  );
  const integrands = polynomials + written.length;
  const stage = integrands + written.length;
  const scratch = stage + stageColumnCount(count, written.length);
  const layout = {
    state,
    innovations,
    next,
    payoff,
    terminal,
    basis,
    variables,
    polynomials,
    integrands,
    stage,
    scratch,
  };

  const uniformCount = evaluateUniforms.firstStandard + 2 * rawVariables.length;
  const at = (first: number, nodes: readonly { node: number }[]): Output[] =>
    nodes.map(({ node }, index) => ({ node, column: first + index }));
  const amountOutputs = [
    { node: amounts.payoff, column: payoff },
    { node: amounts.terminal, column: terminal },
  ];
  const dates = model.contract.decisionDates;
  const constants = new Map(model.constants.map(({ name, value }) => [name, value]));
  const times = dates[0] === 0 ? dates : [0, ...dates];
  return {
    layout,
    step: buildStepProgram(model, drivers, { state, innovations, next, scratch }),
    evaluate: compile(graph, [...amountOutputs, ...at(basis, columns)], uniformCount, scratch),
    variables: compile(graph, at(variables, rawVariables), uniformCount, scratch),
    polynomials: compile(stepGraph, at(polynomials, written), 0, scratch),
    drivers: drivers.map(({ name, start, family }) => ({ name, start, line: family.line })),
    columns: columns.map(({ name, line = null }) => ({ name, line })),
    integrandColumnCount,
    polynomialNames: written.map(({ name }) => name),
    variableCount: rawVariables.length,
    times,
    discountFactors: discountFactors(model.contract, constants, times),
    todayIsDecisionDate: dates[0] === 0,
    floor: continuationFloor(model.contract),
    sign: decisionSign(model.contract),
    payoffLine: model.contract.payoff.line,
  };
}

/** Spreads from the mean beyond which a standardised variable stays where it is. */
const boundInSpreads = 3;

/**
 * Holds a standardised variable between bounds. Polynomials of an unbounded one grow so fast that the few farthest
 * paths would rule the regression, and their errors would be carried back from date to date.
 */
function bounded(graph: Graph, variable: number): number {
  const fromAbove = graph.apply('minimum', variable, graph.constant(boundInSpreads));
  return graph.apply('maximum', fromAbove, graph.constant(-boundInSpreads));
}

/** Columns that the stages use for themselves: saved drivers twice over, integrands or responses, and single columns. */
function stageColumnCount(driverCount: number, polynomialCount: number): number {
  return 2 * driverCount + 2 * polynomialCount + 16;
}
