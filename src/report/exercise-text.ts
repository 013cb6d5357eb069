import { printable } from '../messages/printable.js';
import type { RunRecord } from '../result/record.js';
import { clockTime, percent } from './numbers.js';
import { paragraph } from './prose.js';
import type { Style } from './style.js';
import { layOut } from './table.js';

const MOST_ROWS = 12;
const BAR_WIDTH = 24;

interface DateGroup {
  readonly when: string;
  readonly share: number;
  /** Null where no event can end the contract. */
  readonly endedShare: number | null;
}

/** Joins neighbouring dates, equally many to a row, until the table fits a screen. */
function groupDates(dates: RunRecord['dates'], hasEvent: boolean): DateGroup[] {
  const size = Math.ceil(dates.length / MOST_ROWS);
  const groups: DateGroup[] = [];
  for (let first = 0; first < dates.length; first += size) {
    const members = dates.slice(first, first + size);
    const from = clockTime(members[0]!.time);
    const to = clockTime(members[members.length - 1]!.time);
    groups.push({
      when: members.length === 1 ? from : `${from} to ${to}`,
      share: members.reduce((sum, date) => sum + date.exerciseShare, 0),
      endedShare: hasEvent ? members.reduce((sum, date) => sum + (date.endedShare ?? 0), 0) : null,
    });
  }
  return groups;
}

/** The clock's name as the scenario writes it, if the record echoes it. */
function clockName(record: RunRecord): string {
  const clock = record.settings.find((setting) => setting.name === 'clock')?.value;
  return clock === undefined ? 'date' : `date (${printable(clock)})`;
}

/**
 * When the fitted rule exercises: the share of the outer paths by date, the share that never does, and, where an event
 * may end the contract, the share that it ends before.
 */
export function exerciseText(record: RunRecord, width: number, style: Style): string {
  // A record from before ending events were built has no such share.
  const endedByEventShare = record.endedByEventShare ?? null;
  const groups = groupDates(record.dates, endedByEventShare !== null);
  const largest = Math.max(record.neverExercisedShare, ...groups.map((group) => group.share));
  const bar = (share: number) =>
    style('quiet', '▪'.repeat(largest > 0 ? Math.round((BAR_WIDTH * share) / largest) : 0));
  let soFar = 0;
  const rows = groups.map((group) => {
    soFar += group.share;
    const ended = group.endedShare === null ? [] : [percent(group.endedShare)];
    return [group.when, percent(group.share), percent(Math.min(1, soFar)), ...ended, bar(group.share)];
  });
  const noShare = endedByEventShare === null ? [] : [''];
  rows.push(['never', percent(record.neverExercisedShare), '', ...noShare, bar(record.neverExercisedShare)]);
  const table = layOut(
    {
      heads: [clockName(record), 'share of paths', 'so far', ...(endedByEventShare === null ? [] : ['ended']), ''],
      rows,
      rightColumns: endedByEventShare === null ? [1, 2] : [1, 2, 3],
    },
    style,
  );
  const sentences: string[] = [];
  const quantiles = record.exerciseTimeQuantiles;
  if (quantiles !== null) {
    const { p05, p50, p95 } = quantiles;
    sentences.push(
      `Of the paths that exercise, 5% have done so by ${clockTime(p05)}, half by ${clockTime(p50)} and 95% by ${clockTime(p95)}.`,
    );
  }
  if (endedByEventShare !== null)
    sentences.push(
      `On ${percent(endedByEventShare)} of the paths the ending event ends the contract before the right is used.`,
    );
  return sentences.length === 0 ? table : `${table}\n\n${paragraph(sentences.join(' '), width)}`;
}
