import { figure } from '../messages/figures.js';
import { usedSymbols } from '../program/check-expression.js';
import type { PlacedExpression } from '../program/expression.js';
import { computed } from './read-expression.js';
import type { Reading } from './reading.js';
import { notFinite } from './structure.js';
import type { TreeNode } from './tree.js';

const mostMemberWork = 2_000_000;
/** What a value must be: `holds` judges it, `words` complete "must be". */
export interface Range {
  readonly holds: (value: number) => boolean;
  readonly words: string;
}

/** Any finite number. */
export const finite: Range = { holds: () => true, words: 'finite' };
/** Prices and other quantities that cannot vanish. */
export const positive: Range = { holds: (value) => value > 0, words: 'greater than 0' };
/** Volatilities and other sizes. */
export const notNegative: Range = { holds: (value) => value >= 0, words: '0 or more' };

/** The values of a formula for the members of a family (one value if they are all the same); null after a mistake. */
export function memberValues(
  expression: PlacedExpression,
  label: string,
  node: TreeNode,
  count: number | null,
  range: Range,
  reading: Reading,
): number[] | null {
  const isSame = !usedSymbols(expression.tree, reading).usesNumber;
  const last = isSame ? 1 : (count ?? 1);
  if (last * expression.text.length > mostMemberWork) {
    reading.findings.add({
      code: 'expression-too-long',
      at: node.span,
      what: `A formula of ${expression.text.length} characters stands for each of ${last} members.`,
      why: 'Computing it for all of them would take longer than the valuation itself.',
      mend: 'Write a shorter formula, or name parts of it as constants.',
      evidence: { length: expression.text.length, count: last },
    });
    return null;
  }
  const values: number[] = [];
  for (let number = 1; number <= last; number += 1) {
    const value = computed(expression.tree, reading, number);
    const name = isSame ? label : `${label}, member ${number},`;
    if (value === null || !judge(name, value, range, node, reading)) return null;
    values.push(value);
  }
  return values;
}

/** Whether a value is finite and within its range; adds a mistake if it is not. */
export function judge(label: string, value: number, range: Range, node: TreeNode, reading: Reading): boolean {
  if (!Number.isFinite(value)) notFinite(label, node.span, reading.findings);
  else if (!range.holds(value)) {
    reading.findings.add({
      code: 'value-out-of-range',
      at: node.span,
      what: `${label} is ${figure(value)}; it must be ${range.words}.`,
      why: 'The law of this driver has no meaning for it.',
      mend: `Write a value that is ${range.words}.`,
      evidence: { value },
    });
  } else return true;
  return false;
}
