/** Breaks a text into lines of at most `width` characters, between words where it can and inside a word where it must. */
export function wrapWords(text: string, width: number): string {
  if (text.length <= width) return text;
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
