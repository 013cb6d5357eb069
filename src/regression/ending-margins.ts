import type { Expression } from '../program/expression.js';

/** One side of a comparison: a formula, or the members of a family of which any will do. */
export type MarginSide = { readonly tree: Expression } | { readonly family: string };

/** A comparison that ends the contract as soon as `high` comes above `low`. */
export interface Margin {
  readonly high: MarginSide;
  readonly low: MarginSide;
}

/**
 * Takes an ending event apart into comparisons of which any ends the contract; none if it is not made of comparisons
 * joined by `or`.
 *
 * The largest of a family comes above a level just when one of its members does, so each member has a margin of its own;
 * the smallest likewise below it.
 */
export function endingMargins(event: Expression): Margin[] {
  if (event.kind !== 'binary') return [];
  const { operator, left, right } = event;
  switch (operator) {
    case '>':
    case '>=':
      return [{ high: sideOf(left, 'largest'), low: sideOf(right, 'smallest') }];
    case '<':
    case '<=':
      return [{ high: sideOf(right, 'largest'), low: sideOf(left, 'smallest') }];
    case 'or': {
      const parts = [endingMargins(left), endingMargins(right)];
      return parts.some((margins) => margins.length === 0) ? [] : parts.flat();
    }
    default:
      return [];
  }
}

function sideOf(tree: Expression, extreme: 'largest' | 'smallest'): MarginSide {
  const [first, rank] = tree.kind === 'call' && tree.function === extreme ? tree.arguments : [];
  return first?.kind === 'name' && rank === undefined ? { family: first.name } : { tree };
}
