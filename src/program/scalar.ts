import { exp, log, normalCumulative, power } from './elementary.js';
import type { Operation } from './operations.js';

/**
 * Applies one operation to plain numbers: the meaning that every interpreter must reproduce bit for bit.
 *
 * Constant folding and the once-per-step part of a program run through it.
 */
export function applyScalar(operation: Operation, a: number, b: number, c: number): number {
  switch (operation) {
    case 'copy':
      return a;
    case 'add':
      return a + b;
    case 'subtract':
      return a - b;
    case 'multiply':
      return a * b;
    case 'divide':
      return a / b;
    case 'minimum':
      return Math.min(a, b);
    case 'maximum':
      return Math.max(a, b);
    case 'power':
      return power(a, b);
    case 'negate':
      return -a;
    case 'absolute':
      return Math.abs(a);
    case 'squareRoot':
      return Math.sqrt(a);
    case 'exponential':
      return exp(a);
    case 'logarithm':
      return log(a);
    case 'floor':
      return Math.floor(a);
    case 'normalCumulative':
      return normalCumulative(a);
    case 'less':
      return less(a, b);
    case 'lessOrEqual':
      return lessOrEqual(a, b);
    case 'equal':
      return equal(a, b);
    case 'select':
      return select(a, b, c);
  }
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
