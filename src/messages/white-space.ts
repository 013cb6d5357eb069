const names: ReadonlyMap<string, string> = new Map([
  ['\u0085', 'a next-line character'],
  ['\u00A0', 'a no-break space'],
  ['\u2007', 'a figure space'],
  ['\u2009', 'a thin space'],
  ['\u200B', 'a zero-width space'],
  ['\u2028', 'a line separator'],
  ['\u2029', 'a paragraph separator'],
  ['\u202F', 'a narrow no-break space'],
  ['\u3000', 'an ideographic space'],
  ['\uFEFF', 'a byte-order mark'],
]);

const foreign = /[\u0085\u00A0\u1680\u2000-\u200B\u2028\u2029\u202F\u205F\u2060\u3000\uFEFF]/;

/** The first white space in a text that is none of ASCII: it looks like a space and is read as something else. */
export function foreignWhiteSpace(text: string): { readonly offset: number; readonly name: string } | null {
  const offset = text.search(foreign);
  if (offset < 0) return null;
  const character = text[offset]!;
  const code = character.charCodeAt(0).toString(16).toUpperCase().padStart(4, '0');
  return { offset, name: `${names.get(character) ?? 'an unusual space'} (U+${code})` };
}
