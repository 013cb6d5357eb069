import { printable } from './printable.js';

/** A piece of a source line and the underline that belongs below it, both ready to print. */
export interface Excerpt {
  readonly text: string;
  readonly underline: string;
}

const widest = 100;
const before = 40;

/**
 * Cuts a line around the place that a message points at, so that a line of any length stays readable.
 *
 * @param column 1-based, in UTF-16 units as editors count them
 */
export function excerpt(line: string, column: number, length: number): Excerpt {
  const start = Math.min(column - 1, line.length);
  const from = line.length <= widest || start <= before ? 0 : start - before;
  const to = Math.min(line.length, from + widest);
  const head = from > 0 ? '…' : '';
  const tail = to < line.length ? '…' : '';
  const shown = (begin: number, end: number) => printable(line.slice(begin, end).replace(/\t/g, ' '));
  const marked = shown(start, Math.min(to, start + length));
  return {
    text: `${head}${shown(from, to)}${tail}`,
    underline: ' '.repeat(head.length + columnsOf(shown(from, start))) + '^'.repeat(Math.max(1, columnsOf(marked))),
  };
}

/** How many columns of a terminal a text takes. */
export function columnsOf(text: string): number {
  let columns = 0;
  for (const character of text) columns += widthOf(character);
  return columns;
}

/** East Asian wide characters and pictographs take two columns, combining marks none. */
function widthOf(character: string): number {
  if (/\p{Mn}|\p{Me}/u.test(character)) return 0;
  const wide =
    /[\u1100-\u115F\u2E80-\uA4CF\uAC00-\uD7A3\uF900-\uFAFF\uFE30-\uFE6F\uFF00-\uFF60\uFFE0-\uFFE6\u{1F300}-\u{1FAFF}\u{20000}-\u{3FFFD}]/u;
  return wide.test(character) ? 2 : 1;
}
