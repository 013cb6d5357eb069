import { quoted } from '../messages/printable.js';
import { reservedWords } from '../program/functions.js';
import type { Reading } from './reading.js';
import { type Entry, entriesOf, under } from './tree.js';

const lawful = /^[A-Za-z_][A-Za-z0-9_]*$/;
const longestName = 100;

/**
 * Declares every constant and driver, so that expressions can be checked in any order.
 *
 * @fails adds `bad-name`, `reserved-name` and `name-used-twice`; such a name is not declared
 */
export function declareNames(reading: Reading): void {
  const lineOf = new Map<string, number>();
  const isFree = (entry: Entry, what: string) => {
    if (!isLawful(entry, what, reading)) return false;
    const line = lineOf.get(entry.key);
    if (line !== undefined) {
      usedTwice(entry, line, reading);
      reading.unclear.add(entry.key);
    } else lineOf.set(entry.key, reading.source.lineOf(entry.keySpan.start));
    return line === undefined;
  };
  for (const entry of entriesOf(under(reading.root, 'constants'))) {
    if (isFree(entry, 'constant')) reading.symbols.set(entry.key, { kind: 'constant' });
  }
  for (const entry of entriesOf(under(reading.root, 'drivers'))) {
    if (!isFree(entry, 'driver')) continue;
    const observed = readYesNo(under(entry.value, 'observed'), true);
    const isFamily = under(entry.value, 'count') !== undefined;
    reading.symbols.set(entry.key, isFamily ? { kind: 'family', count: null, observed } : { kind: 'driver', observed });
  }
  reading.symbols.set('t', { kind: 'clock' });
  reading.symbols.set('number', { kind: 'number' });
}

/** `yes`, `no`, `true` or `false`, whichever way YAML gave it to us. */
export function readYesNo(node: ReturnType<typeof under>, absent: boolean): boolean {
  if (node?.kind !== 'scalar') return absent;
  return node.value === 'yes' || node.value === true;
}

function isLawful({ key, keySpan }: Entry, what: string, reading: Reading): boolean {
  if (!lawful.test(key) || key.length > longestName) {
    reading.findings.add({
      code: 'bad-name',
      at: keySpan,
      what: `${quoted(key)} cannot be the name of a ${what}.`,
      why: 'Expressions could not use it: their names begin with a letter or underscore and hold only A-Z, a-z, 0-9 and underscores.',
      mend: `Write a name such as ${quoted(suggestion(key))}.`,
      evidence: { name: key.slice(0, longestName) },
    });
    return false;
  }
  if (!reservedWords.has(key)) return true;
  reading.findings.add({
    code: 'reserved-name',
    at: keySpan,
    what: `${quoted(key)} cannot be the name of a ${what}.`,
    why: 'It is a word of the language, and an expression that uses it would have two meanings.',
    mend: 'Choose another name.',
    evidence: { name: key },
  });
  return false;
}

function suggestion(key: string): string {
  const bare = key
    .slice(0, 30)
    .replace(/[^A-Za-z0-9_]+/g, '_')
    .replace(/^_+|_+$/g, '');
  if (bare === '') return 'a_name';
  return /^[0-9]/.test(bare) ? `n${bare}` : bare;
}

function usedTwice({ key, keySpan }: Entry, line: number, reading: Reading): void {
  reading.findings.add({
    code: 'name-used-twice',
    at: keySpan,
    what: `${quoted(key)} is the name of a constant already, on line ${line}.`,
    why: 'An expression that uses it would have two meanings.',
    mend: 'Rename one of the two.',
    evidence: { name: key, line },
  });
}
