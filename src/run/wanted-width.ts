import type { Method } from '../scenario/model.js';

/** The width that a method asks for, in money, for a contract of about this value. */
export function wantedWidthOf({ bracketWidth }: Method, value: number): number {
  return 'money' in bracketWidth ? bracketWidth.money : bracketWidth.relative * Math.abs(value);
}
