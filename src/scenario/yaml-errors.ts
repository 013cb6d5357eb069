import type { ErrorCode } from 'yaml';

interface Words {
  readonly what: string;
  readonly mend: string;
}

const brackets =
  'Close what was opened. Inside [ ] and { } put formulas that hold commas or square brackets in quotes, as "lot[2]".';

const words: ReadonlyMap<ErrorCode, Words> = new Map<ErrorCode, Words>([
  [
    'BAD_INDENT',
    {
      what: 'The indentation of this line fits none of the lines above.',
      mend: 'Keys of one group begin in the same column; a bracket or quote that was opened above must be closed.',
    },
  ],
  ['TAB_AS_INDENT', { what: 'A tab is used as indentation here.', mend: 'Indent with spaces.' }],
  ['MISSING_CHAR', { what: 'A quote, a bracket, a comma or a space is missing before this place.', mend: brackets }],
  ['UNEXPECTED_TOKEN', { what: 'This cannot stand here.', mend: brackets }],
  ['BAD_SCALAR_START', { what: 'A value cannot begin with this character.', mend: 'Put the value in quotes.' }],
  [
    'BAD_DQ_ESCAPE',
    {
      what: 'This backslash makes no known character.',
      mend: 'Use single quotes, where a backslash is an ordinary character, or write \\\\ for one.',
    },
  ],
  [
    'BLOCK_AS_IMPLICIT_KEY',
    {
      what: 'There is a second colon in this line.',
      mend: 'Put a value that holds `: ` in quotes, or begin a new line.',
    },
  ],
  [
    'BLOCK_IN_FLOW',
    { what: 'Lines with dashes or keys cannot stand inside brackets.', mend: 'Use commas inside [ ] and { }.' },
  ],
  [
    'MULTILINE_IMPLICIT_KEY',
    { what: 'This key has no colon, or runs over several lines.', mend: 'Write `key: value`, the key in one line.' },
  ],
  [
    'KEY_OVER_1024_CHARS',
    { what: 'This key is longer than a key can be.', mend: 'Write `key: value`, with a short key.' },
  ],
  [
    'MULTIPLE_ANCHORS',
    { what: 'There are several anchors here.', mend: 'Take them away; write the value where it is wanted.' },
  ],
  ['MULTIPLE_TAGS', { what: 'There are several tags here.', mend: 'Take them away.' }],
  [
    'BAD_ALIAS',
    { what: 'This is no name for an anchor or alias.', mend: 'Put a value that begins with * or & in quotes.' },
  ],
]);

/** Our words for what the YAML reader complains about; the reader's own code stays in the evidence. */
export function yamlWords(code: ErrorCode): Words {
  return (
    words.get(code) ?? {
      what: 'The text breaks the rules of YAML here.',
      mend: 'Write `key: value` lines, indented by spaces.',
    }
  );
}
