/** Breaks a text into lines of at most `width` characters, between words where it can and inside a word where it must. */
export function wrapWords(text: string, width: number): string {
  const lines: string[] = [];
  let line = '';
  for (const word of text.split(' ')) {
    if (line !== '' && line.length + 1 + word.length > width) {
      lines.push(line);
      line = '';
    }
    line = line === '' ? word : `${line} ${word}`;
    while (line.length > width) {
      lines.push(line.slice(0, width));
      line = line.slice(width);
    }
  }
  if (line !== '' || lines.length === 0) lines.push(line);
  return lines.join('\n');
}

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
