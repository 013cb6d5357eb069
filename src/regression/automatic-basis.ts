import type { Graph, Node } from '../program/graph.js';
import { hermitePolynomial } from '../program/hermite.js';
import { multiIndices } from '../program/multi-indices.js';
import type { Basis, Column } from './basis.js';

/** A standardised variable: mean about 0 and spread about 1 on the fit's paths at each date. */
export interface StandardVariable {
  readonly name: string;
  readonly node: Node;
  readonly leading: boolean;
}

/** Total degree of the polynomials for a count of leading variables; beyond the list, no products. */
const degreeForCount = [0, 16, 6, 4, 4, 3, 2, 2, 2];

/** The same for the integrands of the martingale, whose many coefficients need columns without long tails. */
const integrandDegreeForCount = [0, 16, 4, 3, 2, 2, 2, 2, 2];

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
): Basis {
  const leading = variables.filter((variable) => variable.leading);
  const degree = degreeForCount[leading.length] ?? 0;
  const integrandDegree = integrandDegreeForCount[leading.length] ?? 0;
  const products = multiIndices(leading.length, degree);
  const alone = degree === 0 ? variables : variables.filter((variable) => !variable.leading);
  const low = products.filter((exponents) => totalDegree(exponents) <= integrandDegree);
  const high = products.filter((exponents) => totalDegree(exponents) > integrandDegree);
  const first = [
    { name: '1', node: graph.constant(1) },
    ...low.map((exponents) => productColumn(graph, leading, exponents)),
    ...alone.map(({ name, node }) => ({ name: `H1(${name})`, node })),
    ...payoffs,
  ];
  const rest = [
    ...high.map((exponents) => productColumn(graph, leading, exponents)),
    ...alone.map(({ name, node }) => ({ name: `H2(${name})`, node: hermitePolynomial(graph, 2, node) })),
  ];
  return { columns: [...first, ...rest], integrandColumnCount: first.length };
}

function totalDegree(exponents: readonly number[]): number {
  return exponents.reduce((total, exponent) => total + exponent, 0);
}

function productColumn(graph: Graph, variables: readonly StandardVariable[], exponents: readonly number[]): Column {
  const factors = exponents.flatMap((exponent, index) =>
    exponent === 0 ? [] : [{ exponent, variable: variables[index]! }],
  );
  return {
    name: factors.map(({ exponent, variable }) => `H${exponent}(${variable.name})`).join(' × '),
    node: graph.product(factors.map(({ exponent, variable }) => hermitePolynomial(graph, exponent, variable.node))),
  };
}
