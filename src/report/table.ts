import { stripVTControlCharacters } from 'node:util';
import Table from 'cli-table3';
import { columnsOf } from '../messages/excerpt.js';
import type { Style } from './style.js';

/** A table as data: its heads, its rows, and the columns whose numbers stand right. */
export interface TableContent {
  readonly heads: readonly string[];
  readonly rows: readonly (readonly string[])[];
  readonly rightColumns?: readonly number[];
}

const NO_LINES = {
  top: '',
  'top-mid': '',
  'top-left': '',
  'top-right': '',
  bottom: '',
  'bottom-mid': '',
  'bottom-left': '',
  'bottom-right': '',
  left: '',
  'left-mid': '',
  mid: '',
  'mid-mid': '',
  right: '',
  'right-mid': '',
  middle: '   ',
} as const;

/** Rows that are laid out at once: the package's time grows with the square of their number. */
const ROWS_AT_ONCE = 100;

/**
 * Lays a table out with one line under its heads and none elsewhere, two columns in from the margin.
 *
 * The line is drawn here because the table package draws lines between all rows or between none.
 *
 * @cost linear in the number of rows
 */
export function layOut({ heads, rows, rightColumns = [] }: TableContent, style: Style): string {
  const all = [heads, ...rows];
  const widest = heads.map((_, column) => widestLine(all.map((row) => row[column] ?? '')));
  const lines: string[] = [];
  for (let first = 0; first < all.length; first += ROWS_AT_ONCE) {
    const table = new Table({
      chars: NO_LINES,
      style: { head: [], border: [], 'padding-left': 0, 'padding-right': 0 },
      colAligns: heads.map((_, column) => (rightColumns.includes(column) ? 'right' : 'left')),
    });
    // The first row gives each piece the columns of the whole table, and is dropped.
    table.push(widest, ...all.slice(first, first + ROWS_AT_ONCE).map((row) => [...row]));
    lines.push(...table.toString().split('\n').slice(1));
  }
  const [head = '', ...body] = lines.map((line) => line.trimEnd());
  const width = [head, ...body].reduce((most, line) => Math.max(most, columnsOf(stripVTControlCharacters(line))), 0);
  return [style('quiet', head), style('quiet', '─'.repeat(width)), ...body].map((line) => `  ${line}`).join('\n');
}

function widestLine(cells: readonly string[]): string {
  let widest = '';
  let most = 0;
  for (const line of cells.flatMap((cell) => cell.split('\n'))) {
    const bare = stripVTControlCharacters(line);
    const columns = columnsOf(bare);
    if (columns > most) [widest, most] = [bare, columns];
  }
  return widest;
}
