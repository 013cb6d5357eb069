import { exp, log, normalCumulative, power } from './elementary.js';
import type { Operation } from './operations.js';

/**
 * What each operation means for plain numbers: the meaning that every interpreter must reproduce bit for bit.
 *
 * Constant folding and the once-per-run part of a program use it directly.
 */
export const scalarFunctions: Readonly<Record<Operation, (a: number, b: number, c: number) => number>> = {
  copy: (a) => a,
  add: (a, b) => a + b,
  subtract: (a, b) => a - b,
  multiply: (a, b) => a * b,
  divide: (a, b) => a / b,
  minimum,
  maximum,
  power,
  negate: (a) => -a,
  absolute: Math.abs,
  squareRoot: Math.sqrt,
  exponential: exp,
  logarithm: log,
  floor: Math.floor,
  normalCumulative,
  less,
  lessOrEqual,
  equal,
  select,
};

/** Applies one operation to plain numbers; operands beyond its own are ignored. */
export function applyScalar(operation: Operation, a: number, b: number, c: number): number {
  return scalarFunctions[operation](a, b, c);
}

/** The smaller; of equal ones (0 and -0 are) the first; not a number if an operand is not. */
export function minimum(a: number, b: number): number {
  return b < a ? b : Number.isNaN(b) ? b : a;
}

/** The larger; of equal ones (0 and -0 are) the first; not a number if an operand is not. */
export function maximum(a: number, b: number): number {
  return a < b ? b : Number.isNaN(b) ? b : a;
}

/** 1 or 0; not a number if an operand is not. */
export function less(a: number, b: number): number {
  return a < b ? 1 : a >= b ? 0 : Number.NaN;
}

/** 1 or 0; not a number if an operand is not. */
export function lessOrEqual(a: number, b: number): number {
  return a <= b ? 1 : a > b ? 0 : Number.NaN;
}

/** 1 or 0; not a number if an operand is not. */
export function equal(a: number, b: number): number {
  return a === b ? 1 : Number.isNaN(a) || Number.isNaN(b) ? Number.NaN : 0;
}

/** `whenTrue` for a condition that is not 0, `otherwise` for 0; not a number if the condition is not. */
export function select(condition: number, whenTrue: number, otherwise: number): number {
  return condition === 0 ? otherwise : Number.isNaN(condition) ? Number.NaN : whenTrue;
}
