import { printable } from '../messages/printable.js';
import type { BoundEstimate, BoundMethod, Estimate, RunRecord } from '../result/record.js';
import { decimalsFor, exactFigure, fixed, fixedOutward, grouped, isWithoutNoise, relativePercent } from './numbers.js';
import { paragraph, wrapWords } from './prose.js';
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

/** Whether both bounds are known but for rounding, as when every path pays the same. */
function isExact({ lower, upper, bracket95: { low, high } }: RunRecord): boolean {
  const isKnown = lower.standardError !== null && upper.standardError !== null;
  return isKnown && isWithoutNoise(high - low, Math.max(Math.abs(low), Math.abs(high)));
}

interface Sentence {
  readonly role: string;
  /** The whole sentence, and the piece of it that is dressed. */
  readonly text: string;
  readonly dressed: string;
}

/** A bracket of the first round is the usual 95% one; those of further rounds reach farther out and say so. */
function kindOfBracket({ plan, rounds }: RunRecord): string {
  const { standardErrors } = rounds.find(({ round }) => round === plan.round) ?? { standardErrors: null };
  if (plan.round === 1 || standardErrors === null) return '95% bracket';
  return `bracket of round ${plan.round}, ${standardErrors.toFixed(2)} standard errors beyond each bound`;
}

/** The one sentence that answers the question: between what and what the value lies. */
function bracketSentence(record: RunRecord): Sentence {
  const { low, high } = record.bracket95;
  const money = printable(record.scenario.money);
  if (isExact(record)) {
    const dressed = `${exactFigure((low + high) / 2)} ${money}`;
    const text = `Value to the holder: ${dressed}. Both bounds give it on every path: it has no sampling error.`;
    return { role: 'strong', text, dressed };
  }
  // Decimals follow the wider of the two intervals; where the bounds are exact, the bracket's own width.
  const widest = Math.max(record.lower.halfWidth95 ?? 0, record.upper.halfWidth95 ?? 0);
  const decimals = decimalsFor(widest > 0 ? widest : (high - low) / 2);
  const from = fixedOutward(low, decimals, 'low');
  const to = fixedOutward(high, decimals, 'high');
  if (low > high) {
    const text = `No bracket: its low end, ${from} ${money}, is above its high end, ${to}. The bounds cross; see the advice.`;
    return { role: 'doubt', text, dressed: text };
  }
  const middle = Math.abs((low + high) / 2);
  const width = middle > 0 ? `, ${relativePercent((high - low) / middle)} wide` : '';
  const dressed = `${from} and ${to} ${money}`;
  return {
    role: 'strong',
    text: `Value to the holder: between ${dressed} (${kindOfBracket(record)}${width}).`,
    dressed,
  };
}

/** Estimates that cross by no more than their error, which a reader of the table would stumble over. */
function crossesWithinError(record: RunRecord): boolean {
  const { lower, upper, bracket95, advice } = record;
  const isDoubted = advice.some(({ code }) => code === 'crossed-bounds');
  return upper.value < lower.value && bracket95.low <= bracket95.high && !isDoubted && !isExact(record);
}

/** The answer, and what a reader must know to trust it. */
export function bracketText(record: RunRecord, width: number, style: Style): string {
  const { role, text, dressed } = bracketSentence(record);
  const lines = [dress(wrapWords(text, width), dressed, (piece) => style(role, piece))];
  if (crossesWithinError(record)) {
    const words =
      'The upper estimate lies below the lower one: the estimates cross within their error, and the bracket is valid.';
    lines.push(wrapWords(words, width));
  }
  return lines.join('\n');
}

/** Dresses a piece of a wrapped text, line by line where it runs over a line end. */
function dress(wrapped: string, piece: string, style: (text: string) => string): string {
  const start = wrapped.replaceAll('\n', ' ').indexOf(piece);
  // A word that had to be broken inside: nothing is dressed, so that nothing is torn.
  if (start < 0) return wrapped;
  const end = start + piece.length;
  const middle = wrapped.slice(start, end).split('\n').map(style).join('\n');
  return `${wrapped.slice(0, start)}${middle}${wrapped.slice(end)}`;
}

/** What each bound promises, for the party that decides. */
function promise(record: RunRecord): string {
  return record.decidedBy === 'holder'
    ? 'The holder decides. The lower bound is what the fitted rule earns; no rule can earn more than the upper bound. The gap is the most that a better rule could add.'
    : 'The issuer decides and wants to pay as little as it can. The upper bound is what the holder receives under the fitted rule; under no rule of the issuer can the holder receive less than the lower bound. The gap is the most that a better rule could save the issuer.';
}

/** @param scale the size of the bounds, beside which a rounding error is no noise */
function estimateRow(name: string, estimate: Estimate, scale: number, paths: string, made: string): string[] {
  const { value, halfWidth95 } = estimate;
  if (halfWidth95 !== null && isWithoutNoise(halfWidth95, scale)) {
    return [name, isWithoutNoise(value, scale) ? '0' : exactFigure(value), '0', paths, made];
  }
  const decimals = decimalsFor(halfWidth95);
  return [name, fixed(value, decimals), halfWidth95 === null ? 'unknown' : fixed(halfWidth95, decimals), paths, made];
}

function boundRow(name: string, bound: BoundEstimate, scale: number): string[] {
  return estimateRow(name, bound, scale, grouped(bound.pathCount), methodWords(bound.method));
}

/** Bounds that were computed beside the bracket's own. */
function besideBracket(record: RunRecord): BoundEstimate[] {
  const own = record.decidedBy === 'holder' ? record.upper : record.lower;
  return record.uppers.filter((bound) => bound.method !== own.method);
}

/** The bounds and their gap as a table, with the meaning of its columns. */
export function boundsText(record: RunRecord, width: number, style: Style): string {
  const otherName =
    record.decidedBy === 'holder' ? 'upper bound (beside the bracket)' : 'lower bound (beside the bracket)';
  const scale = Math.max(Math.abs(record.lower.value), Math.abs(record.upper.value));
  const table = layOut(
    {
      heads: ['', 'value', '±', 'paths', 'made by'],
      rows: [
        boundRow('lower bound', record.lower, scale),
        boundRow('upper bound', record.upper, scale),
        ...besideBracket(record).map((bound) => boundRow(otherName, bound, scale)),
        estimateRow('gap', record.gap, scale, '', 'upper bound less lower bound'),
      ],
      rightColumns: [1, 2, 3],
    },
    style,
  );
  const meaning = `${promise(record)} ± is the half-width of the 95% interval of the estimate beside it.`;
  return `${table}\n\n${style('quiet', paragraph(meaning, width))}`;
}
