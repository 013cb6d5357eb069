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
      return b < a ? b : a;
    case 'maximum':
      return a < b ? b : a;
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
      return a < b ? 1 : 0;
    case 'lessOrEqual':
      return a <= b ? 1 : 0;
    case 'equal':
      return a === b ? 1 : 0;
    case 'and':
      return a !== 0 && b !== 0 ? 1 : 0;
    case 'or':
      return a !== 0 || b !== 0 ? 1 : 0;
    case 'not':
      return a === 0 ? 1 : 0;
    case 'select':
      return a !== 0 ? b : c;
  }
}
