import { compile } from '../program/compile.js';
import { Graph, type Node } from '../program/graph.js';
import { lower } from '../program/lower.js';
import type { Program } from '../program/program.js';
import type { CheckedModel } from '../scenario/model.js';
import { factorCorrelation } from './correlation-factor.js';
import type { Driver } from './drivers.js';
import { meaningsOfMember } from './meanings.js';

/** Columns of the workspace that a step reads and writes; each the first of as many as there are drivers. */
export interface StepColumns {
  readonly state: number;
  readonly innovations: number;
  readonly next: number;
  readonly scratch: number;
}

/** Uniform inputs of the step program, by position. */
export const stepUniforms = { duration: 0, count: 1 } as const;

/** Compiles the step that moves every driver from one date to the next. */
export function buildStepProgram(model: CheckedModel, drivers: readonly Driver[], columns: StepColumns): Program {
  const graph = new Graph();
  const duration = graph.uniform(stepUniforms.duration);
  const columnsFrom = (first: number) => drivers.map((_, index) => graph.column(first + index));
  const next = writeStep(model, graph, drivers, columnsFrom(columns.state), columnsFrom(columns.innovations), duration);
  const outputs = next.map((node, index) => ({ node, column: columns.next + index }));
  return compile(graph, outputs, stepUniforms.count, columns.scratch, 'step');
}

/** Writes the drivers after a step from nodes for the drivers before it, independent innovations and the duration. */
export function writeStep(
  model: CheckedModel,
  graph: Graph,
  drivers: readonly Driver[],
  states: readonly Node[],
  innovations: readonly Node[],
  duration: Node,
): Node[] {
  const shocks = correlatedShocks(model, graph, innovations);
  return drivers.map((driver, index) => {
    const meanings = meaningsOfMember(model, graph, driver.number);
    return driver.law.step(graph, {
      state: states[index]!,
      shock: shocks[index]!,
      duration,
      parameter: (key) => lower(driver.family.parameters[key]!.tree, graph, meanings),
    });
  });
}

/**
 * Correlated shocks from independent innovations.
 *
 * Within a family block of the form a·I + b·11ᵀ the common sum is computed once, so the work is linear in the members.
 */
function correlatedShocks(model: CheckedModel, graph: Graph, innovations: readonly Node[]): Node[] {
  const sizes = model.families.map((family) => family.count);
  const factor = factorCorrelation(model.correlation, sizes);
  return factor.map((row) => {
    const terms: Node[] = [];
    let start = 0;
    for (const size of sizes) {
      terms.push(...blockTerms(graph, row.slice(start, start + size), innovations.slice(start, start + size)));
      start += size;
    }
    return graph.sum(terms);
  });
}

/** Σ weight × innovation over one block, with the most common weight taken out as a sum over the whole block. */
function blockTerms(graph: Graph, weights: readonly number[], innovations: readonly Node[]): Node[] {
  const common = weights.length > 2 ? (weights[0] === weights[1] ? weights[0]! : weights[2]!) : 0;
  const terms: Node[] = common === 0 ? [] : [graph.multiply(graph.constant(common), graph.sum(innovations))];
  weights.forEach((weight, index) => {
    if (weight !== common) terms.push(graph.multiply(graph.constant(weight - common), innovations[index]!));
  });
  return terms;
}
