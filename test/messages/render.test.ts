import { expect, test } from 'vitest';
import { advice, mistake } from '#built/messages/build.js';
import { printable, quoted } from '#built/messages/printable.js';
import { renderMessages } from '#built/messages/render.js';

const place = { file: 'lots.yaml', line: 12, column: 18, length: 5 };
const parts = { what: '`strik` is not a name.', why: 'Names are a closed list.', mend: 'Write strike.' };

test('a message shows place, code, finding, source with underline, reason and remedy', () => {
  const message = mistake('unknown-name', { ...parts, place, sourceLine: '  payoff: max(0, strik - price)' });
  expect(renderMessages([message])).toBe(`lots.yaml:12:18  mistake  unknown-name
  \`strik\` is not a name.

    payoff: max(0, strik - price)
                   ^^^^^
  Why:  Names are a closed list.
  Mend: Write strike.
`);
});

test('without a place there is no source, and messages stand apart', () => {
  const text = renderMessages([mistake('command-line', parts), advice('wide-gap', parts)]);
  expect(text).toBe(`mistake  command-line
  \`strik\` is not a name.
  Why:  Names are a closed list.
  Mend: Write strike.

advice  wide-gap
  \`strik\` is not a name.
  Why:  Names are a closed list.
  Mend: Write strike.
`);
});

test('a remedy of several lines is indented', () => {
  expect(renderMessages([mistake('command-line', { ...parts, mend: 'Write\n  a: 1' })])).toContain(
    '  Mend: Write\n          a: 1\n',
  );
});

test('a style is told the role of each piece', () => {
  const message = mistake('unknown-name', { ...parts, place, sourceLine: 'a'.repeat(40) });
  const roles: string[] = [];
  const bare = renderMessages([message]);
  const dressed = renderMessages([message], (role, text) => {
    roles.push(role);
    return text;
  });
  expect(dressed).toBe(bare);
  expect(new Set(roles)).toEqual(new Set(['place', 'mistake', 'code', 'source', 'caret', 'label', 'mend']));
});

test.each([
  ['tabs', '\tx: strik', 5],
  ['wide characters', '穀物: strik', 5],
  ['a long line', `${'x'.repeat(500)} strik ${'y'.repeat(500)}`, 502],
  ['a pictograph', '🌾🌾: strik', 7],
])('the underline stands under the place with %s', (_name, sourceLine, column) => {
  const lines = renderMessages([mistake('unknown-name', { ...parts, place: { ...place, column }, sourceLine })]).split(
    '\n',
  );
  const [source, underline] = [lines[3]!, lines[4]!];
  const columns = (text: string) => [...text].reduce((sum, c) => sum + (/[穀物🌾]/u.test(c) ? 2 : 1), 0);
  expect(columns(underline.slice(0, underline.indexOf('^')))).toBe(columns(source.slice(0, source.indexOf('strik'))));
  expect(underline.trim()).toBe('^^^^^');
  expect(source.length).toBeLessThan(110);
});

test('a place beyond the end of its line is still shown', () => {
  const message = mistake('unknown-name', { ...parts, place: { ...place, column: 40 }, sourceLine: 'short' });
  expect(renderMessages([message])).toContain('short\n         ^\n');
});

test('nothing from outside can steer the terminal', () => {
  const hostile = '\u001B[2J\u0007\u202E\r\u2028';
  const message = mistake('unknown-name', {
    what: hostile,
    why: hostile,
    mend: hostile,
    place: { ...place, file: hostile },
    sourceLine: hostile,
  });
  expect(renderMessages([message])).not.toMatch(/[\p{Cf}\u2028]|(?!\n)\p{Cc}/u);
  expect(printable('a\nb\uD800')).toBe('a\uFFFDb\uFFFD');
  expect(quoted('x'.repeat(100))).toBe(`\`${'x'.repeat(59)}…\``);
});
