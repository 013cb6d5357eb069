import { decisionSign } from '../clauses/amounts.js';
import { continuationFloor } from '../clauses/continuation-floor.js';
import { discountFactors } from '../clauses/discount.js';
import { writePolynomials } from '../martingale/polynomials.js';
import { type Driver, listDrivers } from '../paths/drivers.js';
import { buildStepProgram } from '../paths/step-program.js';
import { compile, type Output } from '../program/compile.js';
import { Graph, type Node } from '../program/graph.js';
import type { Program } from '../program/program.js';
import { groupDrivers } from '../regression/groups.js';
import type { DriverGroup } from '../regression/variables.js';
import type { CheckedModel } from '../scenario/model.js';
import { writeDateGraph } from './date-graph.js';
import { type DriverLayout, type Layout, layOut, layOutDrivers } from './layout.js';

/** What one column of a regression or one driver is called, and the line that it comes from. */
export interface Named {
  readonly name: string;
  readonly line: number | null;
}

/** Everything of a model that is fixed before the first draw: plain data, sent to every worker. */
export interface Programs {
  readonly layout: Layout;
  /** Moves the drivers from `state` to `next`. */
  readonly step: Program;
  /** Amounts and basis columns at `next`; uniforms as `dateUniforms` says. */
  readonly evaluate: Program;
  /** The amounts alone, with the same uniforms: all that the last date needs. */
  readonly amounts: Program;
  /** Variables at `next`, before they are standardised. */
  readonly variables: Program;
  /** Martingale polynomials of the innovations, given `state`. */
  readonly polynomials: Program;
  /**
   * From payoff and the regression's continuation value in `hold`: its proved floor put in, and the larger to `value`; the
   * amount of the ending event where that holds.
   */
  readonly value: Program;
  /** What the fit carries back along a path: what the rule brings, drawn towards `hold`; from and to as `buildCarry` says. */
  readonly carry: Program;
  /** `value` made 0 where the contract ends at the date in `next`: it belongs to no continuation. */
  readonly unlessEnded: Program;
  /** `value`, where the contract goes on, less what the first column of the stages holds, to the latter. */
  readonly rest: Program;
  /** Response × polynomial for each polynomial, from the first column of the stages to those after it. */
  readonly responses: Program;
  readonly drivers: readonly (Named & { readonly start: number; readonly isPositive: boolean })[];
  readonly columns: readonly Named[];
  /** The integrands use this many columns, from the first on. */
  readonly integrandColumnCount: number;
  readonly polynomialNames: readonly string[];
  readonly variableCount: number;
  /** Which of the automatic basis' sizes this is, from 0 on, and how many there are; 0 of 1 for a stated basis. */
  readonly basisSize: number;
  readonly basisSizeCount: number;
  /** Paths of the fit for each column, when nobody says. */
  readonly pathsPerColumn: number;
  /** Times of the grid: today first, then the decision dates. */
  readonly times: readonly number[];
  readonly discountFactors: readonly number[];
  readonly todayIsDecisionDate: boolean;
  readonly floor: 0 | null;
  readonly sign: 1 | -1;
  readonly payoffLine: number | null;
  /** Lines of the ending event and of what it pays. */
  readonly endingLines: { readonly event: number | null; readonly pays: number | null } | null;
}

/**
 * Compiles the programs of a model.
 *
 * @param basisSize which of the automatic basis' sizes
 * @fails throws if there is no such size
 */
export function buildPrograms(model: CheckedModel, basisSize = 0): Programs {
  const drivers = listDrivers(model);
  const groups = groupDrivers(model, drivers);
  const { contract } = model;
  const { endingEvent } = contract;
  const first = layOutDrivers(drivers.length, endingEvent !== null);
  const { graph, amounts, basis, variables, uniformCount, sizeCount, pathsPerColumn } = writeDateGraph(
    model,
    drivers,
    groups,
    first,
    basisSize,
  );
  const innovations = writePolynomialGraph(drivers, groups, first);
  const layout = layOut(first, drivers.length, basis.columns.length, variables.length, innovations.polynomials.length);
  const amountOutputs = [
    { node: amounts.payoff, column: layout.payoff },
    { node: amounts.terminal, column: layout.terminal },
    ...(amounts.ended === null ? [] : [{ node: amounts.ended, column: layout.ended! }]),
  ];
  const dates = contract.decisionDates;
  const times = dates[0] === 0 ? dates : [0, ...dates];
  const constants = new Map(model.constants.map(({ name, value }) => [name, value]));
  const positiveDrivers = new Set(drivers.filter(({ law }) => law.isPositive).map(({ family }) => family.name));
  const floor = continuationFloor(contract, { constants, positiveDrivers });
  return {
    layout,
    step: buildStepProgram(model, drivers, layout),
    evaluate: compile(
      graph,
      [...amountOutputs, ...outputsFrom(layout.basis, basis.columns)],
      uniformCount,
      layout.scratch,
      'amounts and basis',
    ),
    amounts: compile(graph, amountOutputs, uniformCount, layout.scratch, 'amounts'),
    variables: compile(graph, outputsFrom(layout.variables, variables), uniformCount, layout.scratch, 'variables'),
    polynomials: compile(
      innovations.graph,
      outputsFrom(layout.polynomials, innovations.polynomials),
      0,
      layout.scratch,
      'polynomials',
    ),
    value: buildValue(layout, floor),
    carry: buildCarry(layout, times.length - 1),
    unlessEnded: buildUnlessEnded(layout),
    rest: buildRest(layout),
    responses: buildResponses(layout, innovations.polynomials.length),
    drivers: drivers.map(({ name, start, family, law }) => ({
      name,
      start,
      isPositive: law.isPositive,
      line: family.line,
    })),
    columns: basis.columns.map(({ name, line = null }) => ({ name, line })),
    integrandColumnCount: basis.integrandColumnCount,
    polynomialNames: innovations.polynomials.map(({ name }) => name),
    variableCount: variables.length,
    basisSize,
    basisSizeCount: sizeCount,
    pathsPerColumn,
    times,
    discountFactors: discountFactors(contract, constants, times),
    todayIsDecisionDate: dates[0] === 0,
    floor,
    sign: decisionSign(contract),
    payoffLine: contract.payoff.line,
    endingLines: endingEvent === null ? null : { event: endingEvent.event.line, pays: endingEvent.pays.line },
  };
}

/** The same model without a martingale: the fit then is one regression for each date, and nothing is taken off payoffs. */
export function withoutMartingale(programs: Programs): Programs {
  const nothing = compile(new Graph(), [], 0, programs.layout.scratch, 'nothing');
  return { ...programs, polynomialNames: [], polynomials: nothing, responses: nothing };
}

/** All programs, in the order in which a block loads them. */
export function programList(programs: Programs): Program[] {
  const { step, evaluate, amounts, variables, polynomials, value, carry, unlessEnded, rest, responses } = programs;
  return [step, evaluate, amounts, variables, polynomials, value, carry, unlessEnded, rest, responses];
}

/** Columns of the workspace that all programs together need. */
export function workspaceColumnCount(programs: Programs): number {
  return Math.max(programs.layout.scratch, ...programList(programs).map((program) => program.columnCount));
}

/** Most numbers that go to or come from the workspace at once: sums of the normal equations, coefficients, keys. */
export function largestNumberCount({ columns, drivers, integrandColumnCount, polynomialNames }: Programs): number {
  const columnCount = columns.length;
  return Math.max(
    (columnCount * (columnCount + 1)) / 2,
    columnCount,
    integrandColumnCount * polynomialNames.length,
    drivers.length,
  );
}

function buildValue({ payoff, ended, hold, value, scratch }: Layout, floor: 0 | null): Program {
  const graph = new Graph();
  const regressed = graph.column(hold);
  const held = floor === null ? regressed : graph.apply('maximum', regressed, graph.constant(floor));
  const larger = graph.apply('maximum', graph.column(payoff), held);
  const worth = ended === null ? larger : graph.apply('select', graph.column(ended), graph.column(payoff), larger);
  const floored = floor === null ? [] : [{ node: held, column: hold }];
  return compile(graph, [...floored, { node: worth, column: value }], 0, scratch, 'value');
}

/** Dates, as a share of all, over which the fit looks ahead along its own paths before it trusts the fitted value. */
const lookAheadShare = 1 / 3;

/**
 * Turns `value`, the fitted one at a date, into what the date before regresses on: where the rule exercises the payoff, where
 * the contract ends what that pays, elsewhere C + λ (G - C), with G in the first column of the stages what the path brings later less its martingale, and
 * λ = 1 - 1 / (dates looked ahead). For few dates λ is 0 and `value` stays.
 *
 * Regressing on the fitted value alone projects the bend of max(payoff, C) anew at each date, and over hundreds of dates
 * these errors add up in one direction; what the path brings knows no C in between, but carries the noise of all later
 * steps.
 *
 * @source Sutton (1988), Machine Learning 3, 9-44: temporal differences, with the λ of that paper
 */
function buildCarry({ ended, hold, value, stage, scratch }: Layout, dateCount: number): Program {
  const share = Math.max(0, 1 - 1 / (lookAheadShare * dateCount));
  const graph = new Graph();
  const held = graph.column(hold);
  const fitted = graph.column(value);
  const ahead = graph.subtract(graph.column(stage), held);
  const carried = graph.add(held, graph.multiply(graph.constant(share), ahead));
  const brought = graph.apply('select', graph.apply('less', held, fitted), fitted, carried);
  const node = ended === null ? brought : graph.apply('select', graph.column(ended), fitted, brought);
  return compile(graph, [{ node, column: value }], 0, scratch, 'carry');
}

function buildUnlessEnded(layout: Layout): Program {
  const graph = new Graph();
  const outputs = [{ node: writeUnlessEnded(graph, layout), column: layout.value }];
  return compile(graph, outputs, 0, layout.scratch, 'value unless ended');
}

function writeUnlessEnded(graph: Graph, { value, ended }: Layout): Node {
  const worth = graph.column(value);
  return ended === null ? worth : graph.apply('select', graph.column(ended), graph.constant(0), worth);
}

function buildRest(layout: Layout): Program {
  const { stage, scratch } = layout;
  const graph = new Graph();
  const rest = graph.subtract(writeUnlessEnded(graph, layout), graph.column(stage));
  return compile(graph, [{ node: rest, column: stage }], 0, scratch, 'rest');
}

function buildResponses({ stage, polynomials, scratch }: Layout, polynomialCount: number): Program {
  const graph = new Graph();
  const response = graph.column(stage);
  const outputs = Array.from({ length: polynomialCount }, (_, p) => ({
    node: graph.multiply(response, graph.column(polynomials + p)),
    column: stage + 1 + p,
  }));
  return compile(graph, outputs, 0, scratch, 'responses');
}

/** The polynomials of one step's innovations, given the drivers before it. */
function writePolynomialGraph(
  drivers: readonly Driver[],
  groups: readonly DriverGroup[],
  { state, innovations }: DriverLayout,
) {
  const graph = new Graph();
  const columnsFrom = (first: number) => drivers.map((_, index) => graph.column(first + index));
  return { graph, polynomials: writePolynomials(graph, drivers, groups, columnsFrom(state), columnsFrom(innovations)) };
}

function outputsFrom(first: number, nodes: readonly { readonly node: Node }[]): Output[] {
  return nodes.map(({ node }, index) => ({ node, column: first + index }));
}
