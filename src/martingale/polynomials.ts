import type { Driver } from '../paths/drivers.js';
import type { Graph, Node } from '../program/graph.js';
import { multiIndices } from '../program/multi-indices.js';
import { sortCompanions } from '../program/sorting.js';
import { type DriverGroup, leadingRankCount } from '../regression/variables.js';

/** A function of one step's innovations with conditional mean 0 and variance 1, whatever the state. */
export interface InnovationPolynomial {
  readonly name: string;
  readonly node: Node;
}

/** Total degree for a count of innovations; beyond the list every innovation enters alone. */
const degreeForCount = [0, 2, 3, 2, 2, 2, 2];

/** Innovations beyond this count stay without a polynomial: the increment is exact all the same, only less telling. */
const largestInnovationCount = 40;

/**
 * Writes the polynomials whose regressed multiples make the martingale's increments.
 *
 * The innovations of like members are taken in the order of the members' states before the step: a permutation known
 * before the draw, so means and variances stay exact while "the innovation of the largest" keeps one meaning.
 */
export function writePolynomials(
  graph: Graph,
  drivers: readonly Driver[],
  groups: readonly DriverGroup[],
  states: readonly Node[],
  innovations: readonly Node[],
): InnovationPolynomial[] {
  const inputs = groups
    .flatMap(({ name, exchangeable, members }) => {
      const draws = members.map((index) => innovations[index]!);
      if (!exchangeable)
        return members.map((index, i) => ({
          name: drivers[index]!.name,
          draw: draws[i]!,
          innovation: drivers[index]!.law.innovation,
        }));
      const sorted = sortCompanions(
        graph,
        members.map((index) => states[index]!),
        draws,
        Math.min(members.length, leadingRankCount),
      );
      return sorted.map((draw, rank) => ({
        name: `${name} ranked ${rank + 1}`,
        draw,
        innovation: drivers[members[0]!]!.law.innovation,
      }));
    })
    .slice(0, largestInnovationCount);
  const degree = degreeForCount[inputs.length] ?? 1;
  return multiIndices(inputs.length, degree).map((exponents) => {
    const factors = exponents.flatMap((exponent, index) =>
      exponent === 0 ? [] : [{ exponent, input: inputs[index]! }],
    );
    return {
      name: factors.map(({ exponent, input }) => `h${exponent}(innovation of ${input.name})`).join(' × '),
      node: graph.product(
        factors.map(({ exponent, input }) => input.innovation.polynomial(graph, exponent, input.draw)),
      ),
    };
  });
}
