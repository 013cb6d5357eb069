/**
 * The operations of a program: the whole instruction set, in one table.
 *
 * A condition is 1 or 0, or not a number when what it compares is not: whatever is not a number stays so through every
 * operation, `minimum`, `maximum`, comparisons and `select` included, so that it cannot vanish before it is noticed.
 */
export const operations = {
  copy: { code: 0, arity: 1 },
  add: { code: 1, arity: 2 },
  subtract: { code: 2, arity: 2 },
  multiply: { code: 3, arity: 2 },
  divide: { code: 4, arity: 2 },
  minimum: { code: 5, arity: 2 },
  maximum: { code: 6, arity: 2 },
  power: { code: 7, arity: 2 },
  negate: { code: 8, arity: 1 },
  absolute: { code: 9, arity: 1 },
  squareRoot: { code: 10, arity: 1 },
  exponential: { code: 11, arity: 1 },
  logarithm: { code: 12, arity: 1 },
  floor: { code: 13, arity: 1 },
  normalCumulative: { code: 14, arity: 1 },
  less: { code: 15, arity: 2 },
  lessOrEqual: { code: 16, arity: 2 },
  equal: { code: 17, arity: 2 },
  select: { code: 18, arity: 3 },
} as const;

/** The name of an operation. */
export type Operation = keyof typeof operations;

/** Operations whose two operands may change places without changing a bit of the result. */
export const commutative: ReadonlySet<Operation> = new Set(['add', 'multiply', 'minimum', 'maximum', 'equal']);
