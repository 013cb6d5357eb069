import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { paragraph, shellWord, wrapWords } from '#built/report/prose.js';

describe('wrapping', () => {
  it('breaks between words, and inside a word only where it must', () => {
    expect(wrapWords('the right to wait', 9)).toBe('the right\nto wait');
    expect(wrapWords('abcdefghijkl mn', 5)).toBe('abcde\nfghij\nkl mn');
    expect(wrapWords('', 5)).toBe('');
  });

  it('keeps every character and every limit', () => {
    fc.assert(
      fc.property(
        fc.stringMatching(/^[a-z]{0,9}( [a-z]{1,9}){0,9}$/),
        fc.integer({ min: 1, max: 12 }),
        (text, width) => {
          const wrapped = wrapWords(text, width);
          expect(wrapped.replaceAll(/[ \n]/g, '')).toBe(text.replaceAll(' ', ''));
          for (const line of wrapped.split('\n')) expect(line.length).toBeLessThanOrEqual(width);
        },
      ),
    );
  });

  it('sets a paragraph in from the margin', () => {
    expect(paragraph('one two three four five', 20)).toBe('  one two three four\n  five');
  });
});

describe('words for a shell', () => {
  it.each([
    ['scenarios/02-five-lots.yaml', 'scenarios/02-five-lots.yaml'],
    ['barn door', "'barn door'"],
    ["it's", "'it'\\''s'"],
    ['$(id)', "'$(id)'"],
    ['', "''"],
  ])('%s', (text, word) => {
    expect(shellWord(text)).toBe(word);
  });
});
