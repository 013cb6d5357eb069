import type { RunRecord } from '#built/result/record.js';
import type { Interval } from '../bounds/misses.js';
import type { TightRow } from './rows.js';

/** What the runs of a row came to, widths in the money of the contract. */
export interface RowSummary {
  readonly row: TightRow;
  readonly bracketOfMedian: Interval;
  readonly medianWidth: number;
  readonly worstWidth: number;
  /** The largest median width that the row allows, in money. */
  readonly allowedWidth: number;
  readonly medianSeconds: number;
  /** Runs whose bracket lies to what is known as it should. */
  readonly holdCount: number;
  readonly runCount: number;
  readonly furtherRoundCount: number;
}

const widthOf = ({ low, high }: Interval) => high - low;
/** The item in the middle; the later one of two. */
const middle = <T>(sorted: readonly T[]): T => sorted[Math.floor(sorted.length / 2)]!;

function holds({ low, high }: Interval, { relation, exact, published }: TightRow): boolean {
  if (relation === 'contains') return low <= exact! && high >= exact!;
  return published.every((other) =>
    relation === 'overlaps' ? low <= other.high && high >= other.low : low >= other.low && high <= other.high,
  );
}

/** Draws together the runs of a row. */
export function summaryOf(row: TightRow, records: readonly RunRecord[]): RowSummary {
  const brackets = records.map(({ bracket95 }) => bracket95).sort((a, b) => widthOf(a) - widthOf(b));
  const bracketOfMedian = middle(brackets);
  const value = (bracketOfMedian.low + bracketOfMedian.high) / 2;
  return {
    row,
    bracketOfMedian,
    medianWidth: widthOf(bracketOfMedian),
    worstWidth: widthOf(brackets.at(-1)!),
    allowedWidth: 'money' in row.limit ? row.limit.money : row.limit.relative * value,
    medianSeconds: middle(records.map(({ timing }) => timing.totalSeconds).sort((a, b) => a - b)),
    holdCount: brackets.filter((bracket) => holds(bracket, row)).length,
    runCount: records.length,
    furtherRoundCount: records.filter(({ rounds }) => rounds.length > 1).length,
  };
}

const head = [
  '| case | median bracket | median width | worst | wanted | published | published / ours | holds | further rounds | seconds / allowed |',
  '| --- | --- | --- | --- | --- | --- | --- | --- | --- | --- |',
];

/** The summaries as a table in Markdown. */
export function tableOf(summaries: readonly RowSummary[]): string {
  return [...head, ...summaries.map(lineOf)].join('\n');
}

function lineOf(summary: RowSummary): string {
  const { row, bracketOfMedian, medianWidth, worstWidth, holdCount, runCount } = summary;
  const { published, exact, relation } = row;
  const share = (money: number) => `${money.toPrecision(3)} (${((100 * money) / bracketOfMedian.low).toFixed(3)}%)`;
  const narrowest = Math.min(...published.map(widthOf));
  const cells = [
    row.name,
    `${bracketOfMedian.low.toFixed(4)} – ${bracketOfMedian.high.toFixed(4)}`,
    share(medianWidth),
    share(worstWidth),
    summary.allowedWidth.toPrecision(3),
    published.map(({ low, high }) => `[${low}, ${high}]`).join(', '),
    published.length === 0 ? '' : (narrowest / medianWidth).toFixed(2),
    `${holdCount} of ${runCount}: ${relation}${relation === 'contains' ? ` ${exact}` : ''}`,
    `${summary.furtherRoundCount}`,
    `${summary.medianSeconds.toFixed(1)} / ${row.allowedSeconds}`,
  ];
  return `| ${cells.join(' | ')} |`;
}
