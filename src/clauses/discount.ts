import { exp } from '../program/elementary.js';
import { evaluateConstant } from '../program/evaluate.js';
import type { CheckedModel } from '../scenario/model.js';

/** Factors exp(-rate × t) that bring money of each time to today. @unit money today per money then */
export function discountFactors(model: CheckedModel, times: readonly number[]): number[] {
  const constants = new Map(model.constants.map(({ name, value }) => [name, value]));
  const rate = evaluateConstant(model.contract.discount.tree, (name) => constants.get(name)!);
  return times.map((time) => exp(-rate * time));
}
