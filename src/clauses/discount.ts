import { exp } from '../program/elementary.js';
import { evaluateConstant } from '../program/evaluate.js';
import type { Contract } from './contract.js';

/**
 * Factors exp(-rate × t) that bring money of each time to today.
 *
 * @param constants values by name
 * @unit money today per money then
 */
export function discountFactors(
  { discount }: Contract,
  constants: ReadonlyMap<string, number>,
  times: readonly number[],
): number[] {
  const rate = evaluateConstant(discount.tree, (name) => constants.get(name)!);
  return times.map((time) => exp(-rate * time));
}
