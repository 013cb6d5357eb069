import { printable } from '../messages/printable.js';
import type { BoundEstimate, BoundMethod, Estimate, RunRecord } from '../result/record.js';
import { decimalsFor, fixed, fixedOutward, grouped, relativePercent } from './numbers.js';
import { paragraph } from './prose.js';
import type { Style } from './style.js';
import { layOut } from './table.js';

const METHOD_WORDS: Readonly<Record<BoundMethod, string>> = {
  rule: 'fitted rule, one exercise per path',
  'one-step': 'one-step martingale',
  'andersen-broadie': 'Andersen-Broadie, inner paths to exercise',
  regressed: 'regressed martingale, no inner draws',
  'two-level': 'two-level combination',
};

/** How a bound was made, in words a reader knows from the literature. */
export function methodWords(method: BoundMethod): string {
  return METHOD_WORDS[method];
}

/** The one line that answers the question: between what and what the value lies. */
export function bracketSentence(record: RunRecord, style: Style): string {
  const { low, high } = record.bracket95;
  const money = printable(record.scenario.money);
  // Decimals follow the wider of the two intervals; where the bounds are exact, the bracket's own width.
  const widest = Math.max(record.lower.halfWidth95 ?? 0, record.upper.halfWidth95 ?? 0);
  const decimals = decimalsFor(widest > 0 ? widest : (high - low) / 2);
  const from = fixedOutward(low, decimals, 'low');
  const to = fixedOutward(high, decimals, 'high');
  if (low > high) {
    return style(
      'doubt',
      `No bracket: its low end, ${from} ${money}, is above its high end, ${to}. The bounds cross; see the advice.`,
    );
  }
  const middle = Math.abs((low + high) / 2);
  const width = middle > 0 ? `, ${relativePercent((high - low) / middle)} wide` : '';
  return `Value to the holder: between ${style('strong', `${from} and ${to} ${money}`)} (95% bracket${width}).`;
}

/** What each bound promises, for the party that decides. */
function promise(record: RunRecord): string {
  return record.decidedBy === 'holder'
    ? 'The holder decides. The lower bound is what the fitted rule earns; no rule can earn more than the upper bound. The gap is the most that a better rule could add.'
    : 'The issuer decides and wants to pay as little as it can. The upper bound is what the holder receives under the fitted rule; under no rule of the issuer can the holder receive less than the lower bound. The gap is the most that a better rule could save the issuer.';
}

function estimateRow(name: string, estimate: Estimate, paths: string, made: string): string[] {
  const decimals = decimalsFor(estimate.halfWidth95);
  const halfWidth = estimate.halfWidth95 === null ? 'unknown' : fixed(estimate.halfWidth95, decimals);
  return [name, fixed(estimate.value, decimals), halfWidth, paths, made];
}

function boundRow(name: string, bound: BoundEstimate): string[] {
  return estimateRow(name, bound, grouped(bound.pathCount), methodWords(bound.method));
}

/** Bounds that were computed beside the bracket's own. */
function besideBracket(record: RunRecord): BoundEstimate[] {
  const own = record.decidedBy === 'holder' ? record.upper : record.lower;
  return record.uppers.filter((bound) => bound.method !== own.method);
}

/** The bounds and their gap as a table, with the meaning of its columns. */
export function boundsText(record: RunRecord, width: number, style: Style): string {
  const otherName = record.decidedBy === 'holder' ? 'another upper bound' : 'another lower bound';
  const table = layOut(
    {
      heads: ['', 'value', '±', 'paths', 'made by'],
      rows: [
        boundRow('lower bound', record.lower),
        boundRow('upper bound', record.upper),
        ...besideBracket(record).map((bound) => boundRow(otherName, bound)),
        estimateRow('gap', record.gap, '', 'upper bound less lower bound'),
      ],
      rightColumns: [1, 2, 3],
    },
    style,
  );
  const meaning = `${promise(record)} ± is the half-width of the 95% interval of the estimate beside it.`;
  return `${table}\n\n${style('quiet', paragraph(meaning, width))}`;
}
