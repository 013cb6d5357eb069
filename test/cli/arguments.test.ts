import { describe, expect, it } from 'vitest';
import { type Parsed, parseBudget, parseUpper, parseWidth, parseWith, parseWorkers } from '#built/cli/arguments.js';

/** The value, or the code and the first words of the mistake. */
function outcome<T>(parsed: Parsed<T>): T | string {
  return 'value' in parsed ? parsed.value : `${parsed.mistake.code}: ${parsed.mistake.what}`;
}

describe('--with', () => {
  it('parts at the first equals sign and takes spaces around both sides', () => {
    expect(outcome(parseWith(['spread=0.25', ' rate = if(1 >= 0, 0.1, 0)', 'a=-1']))).toEqual({
      spread: '0.25',
      rate: 'if(1 >= 0, 0.1, 0)',
      a: '-1',
    });
    expect(outcome(parseWith([]))).toEqual({});
  });

  it.each(['spread', '=0.25', 'spread=', ' = '])('refuses "%s"', (text) => {
    expect(outcome(parseWith([text]))).toBe(`command-line: --with ${text} is not of the form NAME=EXPRESSION.`);
  });

  it('refuses one name twice', () => {
    expect(outcome(parseWith(['a=1', 'a=2']))).toBe('command-line: --with names a twice.');
  });

  it('takes the name of a built-in property as a plain name', () => {
    const read = outcome(parseWith(['__proto__=1']));
    expect(Object.entries(read)).toEqual([['__proto__', '1']]);
  });
});

describe('--width', () => {
  it.each([
    ['0.1%', '0.1%'],
    ['0.1 %', '0.1%'],
    [' 0.02 ', '0.02'],
    ['2', '2'],
    ['.5%', '.5%'],
    ['1e-3', '1e-3'],
  ])('takes %s', (text, width) => {
    expect(outcome(parseWidth(text))).toBe(width);
  });

  it.each(['', '%', '0', '0%', '-1', '-0.1%', 'narrow', '1e999', 'Infinity', '0x10', '1%%', '1 2'])(
    'refuses "%s"',
    (text) => {
      expect(outcome(parseWidth(text))).toBe(`command-line: --width ${text} is no width.`);
    },
  );
});

describe('--budget', () => {
  it.each([
    ['30s', 30],
    ['2m', 120],
    ['1.5m', 90],
    ['1h', 3600],
    ['0.5 s', 0.5],
  ])('takes %s', (text, seconds) => {
    expect(outcome(parseBudget(text))).toBe(seconds);
  });

  it.each([
    ['30', 'has no unit'],
    ['', 'is no length of time'],
    ['s', 'is no length of time'],
    ['-3s', 'is no length of time'],
    ['soon', 'is no length of time'],
    ['30x', 'is no length of time'],
    ['0s', 'is no time at all'],
    ['1e9h', 'is out of range'],
  ])('refuses "%s"', (text, words) => {
    expect(outcome(parseBudget(text))).toBe(`command-line: --budget ${text} ${words}.`);
  });
});

describe('--workers and --upper', () => {
  it('takes whole numbers from 0', () => {
    expect(['0', '1', '5', '512'].map((text) => outcome(parseWorkers(text)))).toEqual([0, 1, 5, 512]);
  });

  it.each(['-1', '1.5', 'many', '', '513', '1e2'])('refuses %s workers', (text) => {
    expect(outcome(parseWorkers(text))).toBe(`command-line: --workers ${text} is no number of threads.`);
  });

  it('takes the three methods and offers the nearest', () => {
    expect(outcome(parseUpper('andersen-broadie'))).toBe('andersen-broadie');
    const refused = parseUpper('anderson-broadie');
    expect('mistake' in refused && refused.mistake).toMatchObject({
      code: 'command-line',
      what: '--upper anderson-broadie is no method.',
      mend: 'Did you mean `andersen-broadie`?',
    });
  });
});
