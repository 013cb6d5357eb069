import { stripVTControlCharacters } from 'node:util';
import Table from 'cli-table3';
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

/**
 * Lays a table out with one line under its heads and none elsewhere, two columns in from the margin.
 *
 * The line is drawn here because the table package draws lines between all rows or between none.
 */
export function layOut({ heads, rows, rightColumns = [] }: TableContent, style: Style): string {
  const table = new Table({
    chars: NO_LINES,
    style: { head: [], border: [], 'padding-left': 0, 'padding-right': 0 },
    colAligns: heads.map((_, column) => (rightColumns.includes(column) ? 'right' : 'left')),
  });
  table.push(...[heads, ...rows].map((row) => [...row]));
  const [head = '', ...body] = table
    .toString()
    .split('\n')
    .map((line) => line.trimEnd());
  const width = Math.max(...[head, ...body].map((line) => [...stripVTControlCharacters(line)].length));
  return [style('quiet', head), style('quiet', '─'.repeat(width)), ...body].map((line) => `  ${line}`).join('\n');
}
