import { figure } from '../messages/figures.js';
import { quoted } from '../messages/printable.js';
import type { Reading } from './reading.js';
import type { TextSpan } from './source-text.js';
import type { Entry, TreeNode } from './tree.js';

// What can be wrong with decision dates, one function for each mistake; all give null, for the dates that there are not.

/** The most decision dates that a contract may have. */
export const mostDates = 100_000;

/** Keys of both regular forms together. */
export function mixed({ key, keySpan }: Entry, reading: Reading): null {
  reading.findings.add({
    code: 'mixed-forms',
    at: keySpan,
    what: `${quoted(key)} does not go together with the other keys here.`,
    why: 'Regular dates are stated by their number or by the time between them; both together could contradict.',
    mend: 'Write { count, last } for equal steps from today, or { first, last, every }.',
    evidence: { key },
  });
  return null;
}

/** A regular form without one of its keys. */
export function incomplete(entry: Entry, absent: readonly string[], reading: Reading): null {
  reading.findings.add({
    code: 'missing-key',
    at: entry.keySpan,
    what: `The decision dates have no ${absent.map(quoted).join(' and no ')}.`,
    why: 'Without it the dates are not known.',
    mend: 'Write { count, last } for equal steps from today, { first, last, every }, or a list of times.',
    evidence: { absent },
  });
  return null;
}

/** A number that describes no list of dates. */
export function outOfRange(name: string, value: number, words: string, node: TreeNode, reading: Reading): null {
  reading.findings.add({
    code: 'value-out-of-range',
    at: node.span,
    what: `${name} is ${figure(value)}; it must be ${words}.`,
    why: 'Other values describe no list of dates.',
    mend: `Write ${words.startsWith('a ') ? words : `a number ${words}`}.`,
    evidence: { value },
  });
  return null;
}

/** A last date that is not after today. */
export function notAfterToday(key: string, value: number, node: TreeNode, reading: Reading): null {
  if (value < 0) return beforeToday(quoted(key), value, node.span, reading);
  return outOfRange('The last decision date', value, 'greater than 0', node, reading);
}

/** A date before today. */
export function beforeToday(name: string, value: number, at: TextSpan, reading: Reading): null {
  reading.findings.add({
    code: 'date-before-today',
    at,
    what: `${name} is ${figure(value)}, before today.`,
    why: 'Times count from today, which is 0; what lies before can no longer be decided.',
    mend: 'Leave out the dates that have passed, and state starts and constants as of today.',
    evidence: { value },
  });
  return null;
}

/** Two dates at one time, or out of order. */
export function notRising(what: string, at: TextSpan, reading: Reading): null {
  reading.findings.add({
    code: 'dates-not-rising',
    at,
    what,
    why: 'Dates are worked through in their order; two at one time, or out of order, are most often a slip.',
    mend: 'Write the times in rising order, each one once.',
  });
  return null;
}

/** A last date that is not reached in whole steps. */
export function notDividing(first: number, last: number, every: number, node: TreeNode, reading: Reading): null {
  const steps = Math.floor((last - first) / every);
  reading.findings.add({
    code: 'dates-do-not-divide',
    at: node.span,
    what: `From ${figure(first)} in steps of ${figure(every)} the dates reach ${figure(first + steps * every)} and then pass ${figure(last)}.`,
    why: 'It is not clear whether the last date is one of the steps or one more.',
    mend: 'Change `last`, `first` or `every` so that they meet, or write the list of dates.',
    evidence: { first, last, every },
  });
  return null;
}

/** More dates than are taken. */
export function tooMany(count: number, at: TextSpan, reading: Reading): null {
  reading.findings.add({
    code: 'too-many-dates',
    at,
    what: `There are ${figure(count)} decision dates; at most ${mostDates} are taken.`,
    why: 'Each date takes a regression of its own.',
    mend: 'Decide less often: with more dates than that the value hardly moves.',
    evidence: { count, mostDates },
  });
  return null;
}

/** A first date of 0 where `today` says no. */
export function contradicted(node: TreeNode, reading: Reading): null {
  reading.findings.add({
    code: 'today-contradicted',
    at: node.span,
    what: 'The first date is today, but `today` says that today is no decision date.',
    why: 'Only one of the two can hold.',
    mend: 'Write `today: yes`, or a `first` greater than 0.',
  });
  return null;
}
