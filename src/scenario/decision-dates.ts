import { figure } from '../messages/figures.js';
import * as mistakes from './date-mistakes.js';
import { mostDates } from './date-mistakes.js';
import { readYesNo } from './names.js';
import { readNumber } from './read-expression.js';
import type { Reading } from './reading.js';
import { type Entry, entriesOf, entryOf, itemsOf, type ListNode, type MapNode, type TreeNode, under } from './tree.js';

/** How a day of the calendar is written. */
export const calendarDay = /^\d{4}-\d{2}-\d{2}$/;

const countForm = ['count', 'last', 'today'];
const everyForm = ['first', 'last', 'every', 'today'];

/**
 * Reads the decision dates in any of their three forms: strictly rising times in clock units, 0 among them only if today
 * is one.
 *
 * @fails adds `mixed-forms`, `missing-key`, `value-out-of-range`, `dates-not-rising`, `date-before-today`,
 * `no-date-after-today`, `dates-do-not-divide`, `too-many-dates`, `today-contradicted` and the mistakes of expressions
 */
export function readDecisionDates(reading: Reading): number[] | null {
  const entry = entryOf(under(reading.root, 'contract'), 'decision dates')!;
  const node = entry.value;
  if (node.kind === 'scalar') return null;
  const dates = node.kind === 'list' ? listed(node, reading) : regular(entry, node, reading);
  if (dates === null) return null;
  if (node.kind === 'list') reading.settings.fromText('contract.decision dates', `${dates.length} listed`, node);
  return rises(dates, node, entry, reading) ? dates : null;
}

function listed(node: ListNode, reading: Reading): number[] | null {
  if (node.items.length > mostDates) return mistakes.tooMany(node.items.length, node.span, reading);
  const dates = node.items.map((item, index) => {
    if (item.kind === 'scalar' && calendarDay.test(item.text)) return null;
    return readNumber(item, `date ${index + 1}`, reading)?.value ?? null;
  });
  return dates.includes(null) ? null : (dates as number[]);
}

/** { count, last, today } and { first, last, every, today }. */
function regular(entry: Entry, node: MapNode, reading: Reading): number[] | null {
  const isCounted = node.entries.has('count');
  const form = isCounted ? countForm : everyForm;
  const foreign = [...node.entries.values()].find(({ key }) => !form.includes(key));
  if (foreign !== undefined) return mistakes.mixed(foreign, reading);
  const absent = form.filter((key) => key !== 'today' && !node.entries.has(key));
  if (absent.length > 0) return mistakes.incomplete(entry, absent, reading);
  if (entriesOf(node).some(({ value }) => value.kind === 'scalar' && calendarDay.test(value.text))) return null;
  const number = (key: string) => readNumber(under(node, key), `\`${key}\``, reading)?.value ?? null;
  const todayNode = under(node, 'today');
  const today = readYesNo(todayNode, false);
  const dates = isCounted
    ? counted(number('count'), number('last'), node, reading)
    : spaced(number('first'), number('last'), number('every'), node, reading);
  if (dates === null) return null;
  for (const { key, value } of entriesOf(node)) {
    if (value.kind === 'scalar' && key !== 'today')
      reading.settings.fromText(`contract.decision dates.${key}`, value.text, value);
  }
  if (todayNode === undefined)
    reading.settings.byDefault('contract.decision dates.today', dates[0] === 0 ? 'yes' : 'no');
  else reading.settings.fromText('contract.decision dates.today', today ? 'yes' : 'no', todayNode);
  if (dates[0] !== 0) return today ? [0, ...dates] : dates;
  return todayNode !== undefined && !today ? mistakes.contradicted(todayNode, reading) : dates;
}

function counted(count: number | null, last: number | null, node: MapNode, reading: Reading): number[] | null {
  const isCount = count !== null && isWholeCount(count, under(node, 'count')!, reading);
  if (last !== null && !(last > 0)) return mistakes.notAfterToday('last', last, under(node, 'last')!, reading);
  if (!isCount || last === null) return null;
  return Array.from({ length: count }, (_, index) => (index + 1 === count ? last : (last * (index + 1)) / count));
}

function isWholeCount(count: number, node: TreeNode, reading: Reading): boolean {
  if (count > mostDates) mistakes.tooMany(count, node.span, reading);
  else if (Number.isInteger(count) && count >= 1) return true;
  else mistakes.outOfRange('The count of decision dates', count, 'a whole number, 1 or more', node, reading);
  return false;
}

function spaced(
  first: number | null,
  last: number | null,
  every: number | null,
  node: MapNode,
  reading: Reading,
): number[] | null {
  if (first === null || last === null || every === null) return null;
  const at = (key: string) => under(node, key)!;
  if (first < 0) return mistakes.beforeToday('The first decision date', first, at('first').span, reading);
  if (!(every > 0))
    return mistakes.outOfRange('The time between decision dates', every, 'greater than 0', at('every'), reading);
  if (last < first)
    return mistakes.notRising(
      `The last decision date, ${figure(last)}, lies before the first, ${figure(first)}.`,
      at('last').span,
      reading,
    );
  const steps = (last - first) / every;
  if (steps >= mostDates) return mistakes.tooMany(Math.floor(steps) + 1, at('every').span, reading);
  const whole = Math.round(steps);
  if (Math.abs(steps - whole) > 1e-9 * Math.max(1, whole))
    return mistakes.notDividing(first, last, every, at('every'), reading);
  return Array.from({ length: whole + 1 }, (_, index) => (index === whole ? last : first + index * every));
}

/** The properties that every form must end with. */
function rises(dates: readonly number[], node: TreeNode, entry: Entry, reading: Reading): boolean {
  const placeOf = (index: number) => itemsOf(node)[index]?.span ?? entry.keySpan;
  for (const [index, date] of dates.entries()) {
    const before = index === 0 ? null : dates[index - 1]!;
    if (date < 0) mistakes.beforeToday(`Decision date ${index + 1}`, date, placeOf(index), reading);
    else if (before !== null && date <= before) {
      mistakes.notRising(
        `Decision date ${index + 1}, ${figure(date)}, does not come after the one before it, ${figure(before)}.`,
        placeOf(index),
        reading,
      );
    } else continue;
    return false;
  }
  if (dates.length > 0 && dates.at(-1)! > 0) return true;
  reading.findings.add({
    code: 'no-date-after-today',
    at: entry.keySpan,
    what: 'No decision date lies after today.',
    why: 'Without one there is nothing to wait for; the value is the payoff today, or nothing.',
    mend: 'State at least one time greater than 0.',
  });
  return false;
}
