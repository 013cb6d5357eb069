import { styleText } from 'node:util';
import type { Style } from '../report/style.js';

type Format = Parameters<typeof styleText>[0];

const FORMATS: ReadonlyMap<string, Format> = new Map<string, Format>([
  ['title', 'bold'],
  ['strong', 'bold'],
  ['quiet', 'dim'],
  ['good', 'green'],
  ['doubt', 'yellow'],
  ['mistake', 'red'],
  ['advice', 'yellow'],
  ['caret', 'red'],
  ['code', 'dim'],
  ['place', 'bold'],
  ['label', 'dim'],
  ['mend', 'green'],
]);

/** Whether colour may be used: only on a terminal, and never against the reader's wish. */
function mayColour(stream: NodeJS.WriteStream): boolean {
  const { NO_COLOR, TERM } = process.env;
  return stream.isTTY === true && (NO_COLOR === undefined || NO_COLOR === '') && TERM !== 'dumb';
}

/** Colours for a terminal; the bare text for anything else. Roles without a colour stay bare. */
export function styleFor(stream: NodeJS.WriteStream): Style {
  if (!mayColour(stream)) return (_role, text) => text;
  return (role, text) => {
    const format = FORMATS.get(role);
    if (format === undefined) return text;
    // Line by line, so that no colour runs over a line end into whatever prints next.
    return text
      .split('\n')
      .map((line) => (line === '' ? line : styleText(format, line, { validateStream: false })))
      .join('\n');
  };
}

/** The width of the page: the terminal's own within readable limits, or a fixed one for files and pipes. */
export function pageWidth(stream: NodeJS.WriteStream): number {
  return Math.min(120, Math.max(20, stream.isTTY ? stream.columns : 100));
}

/** The width of messages: a terminal's own; a file or pipe gets whole sentences, which a search finds. */
export function messageWidth(stream: NodeJS.WriteStream): number {
  return stream.isTTY ? pageWidth(stream) : Number.POSITIVE_INFINITY;
}

/**
 * Lets a reader leave early (`| head`): the rest of the output is dropped and the command goes on to its own end.
 * Every other failure to write stays an error.
 */
export function tolerateClosedPipes(): void {
  for (const stream of [process.stdout, process.stderr]) {
    stream.on('error', (error: NodeJS.ErrnoException) => {
      if (error.code !== 'EPIPE') throw error;
    });
  }
}
