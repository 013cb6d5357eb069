import type { Graph, Node } from '../program/graph.js';
import { hermitePolynomial } from '../program/hermite.js';
import { multiIndices } from '../program/multi-indices.js';
import type { Basis, Column } from './basis.js';
import type { BasisSize } from './basis-size.js';

/** A standardised variable: mean about 0 and spread about 1 on the fit's paths at each date. */
export interface StandardVariable {
  readonly name: string;
  readonly node: Node;
  readonly leading: boolean;
}

/**
 * Spreads from the mean beyond which a variable stays where it is, in products of low and of high total degree.
 *
 * High powers of an unbounded variable grow so fast that the few farthest paths would rule the regression; low ones
 * must go on, since the continuation value does: held at three spreads, they left twice the gap with five lots.
 */
const boundInSpreads = { low: 5, high: 3 } as const;

/**
 * The automatic basis: products of Hermite polynomials of the standardised variables up to a total degree, and columns
 * made from the payoff.
 *
 * Hermite polynomials and not powers, because standardised columns that are nearly uncorrelated keep the normal
 * equations well conditioned; the payoff brings the bends that no smooth polynomial can follow.
 */
export function automaticBasis(
  graph: Graph,
  variables: readonly StandardVariable[],
  payoffs: readonly Column[],
  { degree, integrandDegree }: BasisSize,
): Basis {
  const leading = variables.filter((variable) => variable.leading);
  const products = multiIndices(leading.length, degree);
  const alone = degree === 0 ? variables : variables.filter((variable) => !variable.leading);
  const low = products.filter((exponents) => totalDegree(exponents) <= integrandDegree);
  const high = products.filter((exponents) => totalDegree(exponents) > integrandDegree);
  const first = [
    { name: '1', node: graph.constant(1) },
    ...low.map((exponents) => productColumn(graph, leading, exponents)),
    ...alone.map(({ name, node }) => ({ name: `H1(${name})`, node: bounded(graph, node, boundInSpreads.low) })),
    ...payoffs,
  ];
  const rest = [
    ...high.map((exponents) => productColumn(graph, leading, exponents)),
    ...alone.map(({ name, node }) => ({
      name: `H2(${name})`,
      node: hermitePolynomial(graph, 2, bounded(graph, node, boundInSpreads.low)),
    })),
  ];
  return { columns: [...first, ...rest], integrandColumnCount: first.length };
}

function totalDegree(exponents: readonly number[]): number {
  return exponents.reduce((total, exponent) => total + exponent, 0);
}

/** Highest total degree that counts as low: fewer variables leave more paths for each far corner. */
function lowDegree(variableCount: number): number {
  return variableCount <= 2 ? 4 : variableCount <= 4 ? 3 : 2;
}

function productColumn(graph: Graph, variables: readonly StandardVariable[], exponents: readonly number[]): Column {
  const bound = totalDegree(exponents) <= lowDegree(variables.length) ? boundInSpreads.low : boundInSpreads.high;
  const factors = exponents.flatMap((exponent, index) =>
    exponent === 0 ? [] : [{ exponent, variable: variables[index]! }],
  );
  return {
    name: factors.map(({ exponent, variable }) => `H${exponent}(${variable.name})`).join(' × '),
    node: graph.product(
      factors.map(({ exponent, variable }) => hermitePolynomial(graph, exponent, bounded(graph, variable.node, bound))),
    ),
  };
}

function bounded(graph: Graph, variable: Node, bound: number): Node {
  const fromAbove = graph.apply('minimum', variable, graph.constant(bound));
  return graph.apply('maximum', fromAbove, graph.constant(-bound));
}
