import { quoted } from '../messages/printable.js';
import { calendarDay } from './decision-dates.js';
import type { Reading } from './reading.js';
import { type TreeNode, under } from './tree.js';

/** The seed of every scenario that states none, so that edited scenarios stay paired draw by draw. */
export const defaultSeed = 'barn door';

/** What a scenario says about itself. */
export interface General {
  readonly title: string;
  readonly asOf: string | null;
  readonly money: string;
  readonly clock: string;
  readonly seed: string;
}

/**
 * Reads title, day, units and seed.
 *
 * @fails adds `bad-date`, `wrong-type` and `bad-override`
 */
export function readGeneral(reading: Reading): General {
  const title = readText('title', 'untitled', reading);
  const asOf = readAsOf(reading);
  const money = readText('money', 'units of money', reading);
  const clock = readText('clock', 'years', reading);
  return { title, asOf, money, clock, seed: readSeed(reading) };
}

function readText(key: string, absent: string, reading: Reading): string {
  const node = under(reading.root, key);
  if (node?.kind !== 'scalar') {
    reading.settings.byDefault(key, absent);
    return absent;
  }
  const text = node.text.replace(/\s+/g, ' ').trim();
  if (text === '') emptyText(key, node, reading);
  reading.settings.fromText(key, text, node);
  return text;
}

function readSeed(reading: Reading): string {
  const { overrides, settings, findings } = reading;
  if (overrides.seed === undefined) {
    const node = under(reading.root, 'seed');
    if (node?.kind !== 'scalar') settings.byDefault('seed', defaultSeed);
    else if (node.text === '') emptyText('seed', node, reading);
    else settings.fromText('seed', node.text, node);
    return node?.kind === 'scalar' ? node.text : defaultSeed;
  }
  if (typeof overrides.seed !== 'string' || overrides.seed === '') {
    findings.add({
      code: 'bad-override',
      at: null,
      what: 'The seed asked for is no text.',
      why: 'Every draw is a function of the seed text; an empty one is most often a slip.',
      mend: 'Give any text that is not empty.',
      evidence: { override: '--seed' },
    });
  }
  settings.fromCommandLine('seed', String(overrides.seed));
  return String(overrides.seed);
}

function readAsOf(reading: Reading): string | null {
  const node = under(reading.root, 'as of');
  if (node?.kind !== 'scalar') return null;
  const day = node.text;
  if (!calendarDay.test(day) || !isDay(day)) {
    reading.findings.add({
      code: 'bad-date',
      at: node.span,
      what: `${quoted(day)} is not a day of the calendar.`,
      why: 'The day tells a reader when starts and constants were observed.',
      mend: 'Write year, month and day as 2027-03-01.',
    });
    return null;
  }
  reading.settings.fromText('as of', day, node);
  return day;
}

/** Counted by hand: a date object would roll 2027-02-30 over into March. */
function isDay(day: string): boolean {
  const [year, month, dayOfMonth] = day.split('-').map(Number) as [number, number, number];
  const isLeap = (year % 4 === 0 && year % 100 !== 0) || year % 400 === 0;
  const lengths = [31, isLeap ? 29 : 28, 31, 30, 31, 30, 31, 31, 30, 31, 30, 31];
  return month >= 1 && month <= 12 && dayOfMonth >= 1 && dayOfMonth <= lengths[month - 1]!;
}

function emptyText(key: string, node: TreeNode, reading: Reading): void {
  reading.findings.add({
    code: 'wrong-type',
    at: node.span,
    what: `${quoted(key)} is empty.`,
    why: 'An empty text is most often a slip.',
    mend: 'Write a text, or take the key away.',
  });
}
