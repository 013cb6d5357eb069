import { wrapWords } from '../messages/wrap-words.js';

export { wrapWords };

/** A paragraph two columns in from the margin, wrapped to the width of the page. */
export function paragraph(text: string, width: number): string {
  return wrapWords(text, Math.max(20, width - 2))
    .split('\n')
    .map((line) => `  ${line}`)
    .join('\n');
}

/** A word as a shell reads it back unchanged. */
export function shellWord(text: string): string {
  return /^[\w./:@%+,=-]+$/.test(text) ? text : `'${text.replaceAll("'", `'\\''`)}'`;
}
