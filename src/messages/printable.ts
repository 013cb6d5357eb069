const longestQuote = 60;

/**
 * A text from outside with everything replaced that could steer a terminal or hide in a report: control characters,
 * direction marks, halves of surrogate pairs, line ends.
 */
export function printable(text: string): string {
  return text.replace(/[\p{Cc}\p{Cf}\p{Cs}\u2028\u2029]/gu, '\uFFFD');
}

/** A name or value from outside, cut to a readable length and set in back quotes. */
export function quoted(text: string): string {
  const cut = text.length > longestQuote ? `${text.slice(0, longestQuote - 1)}…` : text;
  return `\`${printable(cut)}\``;
}

/**
 * Names in a row, as a sentence needs them.
 *
 * @example listed(['a', 'b', 'c'], 'or') // '`a`, `b` or `c`'
 */
export function listed(names: readonly string[], word: 'and' | 'or'): string {
  const marked = names.map(quoted);
  if (marked.length < 2) return marked.join('');
  return `${marked.slice(0, -1).join(', ')} ${word} ${marked.at(-1)}`;
}
