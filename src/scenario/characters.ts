import type { Findings } from './findings.js';

// biome-ignore lint/suspicious/noControlCharactersInRegex: these are the characters looked for
const control = /[\u0000-\u0008\u000B\u000C\u000E-\u001F\u007F-\u0084\u0086-\u009F]/;

const names: ReadonlyMap<string, string> = new Map([
  ['\u0000', 'a NUL character'],
  ['\u0007', 'a bell character'],
  ['\u0008', 'a backspace'],
  ['\u000C', 'a form feed'],
  ['\u001B', 'an escape character'],
  ['\u007F', 'a delete character'],
]);

/**
 * Refuses a text with characters that no editor shows, and one whose lines end in a way that is not read as a line end.
 *
 * @fails adds one `not-yaml`, at the first such character
 */
export function refuseCharacters(text: string, findings: Findings): boolean {
  const offset = text.search(control);
  if (offset >= 0) {
    const character = text[offset]!;
    const code = `U+${character.charCodeAt(0).toString(16).toUpperCase().padStart(4, '0')}`;
    findings.add({
      code: 'not-yaml',
      at: { start: offset, end: offset + 1 },
      what: `There is ${names.get(character) ?? 'a control character'} (${code}) here.`,
      why: 'Control characters are not shown by an editor, so the text could say something else than it seems to.',
      mend: 'Take it away; a file full of them is no text, or is saved in another encoding than UTF-8.',
      evidence: { character: code },
    });
    return true;
  }
  const bare = /\r(?!\n)/.exec(text);
  if (bare === null) return false;
  findings.add({
    code: 'not-yaml',
    at: { start: bare.index, end: bare.index + 1 },
    what: 'A carriage return without a line feed stands here; it does not end a line.',
    why: 'Everything behind it would be read as part of the same line.',
    mend: 'Save the file with the line ends LF or CR LF.',
    evidence: { character: 'U+000D' },
  });
  return true;
}
