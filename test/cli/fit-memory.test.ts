import { describe, expect, it } from 'vitest';
import { parseFitMemory } from '#built/cli/arguments.js';
import { memoryToGive } from '#built/messages/figures.js';
import { tarry } from './run-tarry.js';
import { smallScenario } from './small-scenario.js';

function outcome(text: string): number | string {
  const parsed = parseFitMemory(text);
  return 'value' in parsed ? parsed.value : `${parsed.mistake.code}: ${parsed.mistake.what}`;
}

describe('--fit-memory', () => {
  it.each([
    ['256MB', 256e6],
    ['1GB', 1e9],
    ['1.5 gb', 1.5e9],
    [' 800KB ', 8e5],
    ['.5TB', 5e11],
  ])('takes %s', (text, bytes) => {
    expect(outcome(text)).toBe(bytes);
  });

  it.each([
    ['256', 'has no unit'],
    ['', 'is no amount of memory'],
    ['MB', 'is no amount of memory'],
    ['-1MB', 'is no amount of memory'],
    ['0MB', 'is no amount of memory'],
    ['256MiB', 'is no amount of memory'],
    ['much', 'is no amount of memory'],
    ['1e9TB', 'is out of range'],
  ])('refuses "%s"', (text, words) => {
    expect(outcome(text)).toBe(`command-line: --fit-memory ${text} ${words}.`);
  });

  it('is offered in sizes that are read back as no less', () => {
    expect([12_345_678, 1e6, 999_999, 2_560_000, 1.0001e9].map(memoryToGive)).toEqual([
      '12.4MB',
      '1MB',
      '1000KB',
      '2.56MB',
      '1.01GB',
    ]);
    for (let bytes = 17; bytes < 1e12; bytes *= 1.37) {
      const read = outcome(memoryToGive(bytes)) as number;
      expect(read).toBeGreaterThanOrEqual(bytes * (1 - 1e-12));
      expect(read).toBeLessThan(bytes * 1.0101);
    }
  });

  it('is heard by check and by value', async () => {
    const few = ['-', '--fit-memory', '70KB'];
    const checked = await tarry(['check', ...few], smallScenario);
    expect(checked.stdout.replace(/\s+/g, ' ')).toContain(
      'The paths of the fit are kept in memory (66.6 KB) in segments of 1 date, and recomputed when another segment is needed: they are simulated 1.33 times instead of once.',
    );
    const valued = await tarry(['value', ...few, '--json', '--workers', '0'], smallScenario);
    expect(JSON.parse(valued.stdout).paths).toMatchObject({ kept: 'segments', segmentDates: 1, bytes: 66_560 });
  });

  it('ends with 2 where the scenario cannot follow', async () => {
    const { code, stderr } = await tarry(['check', '-', '--fit-memory', '10KB'], smallScenario);
    expect(code).toBe(2);
    expect(stderr).toContain('fit-memory-too-small');
    expect(stderr).toContain('--fit-memory 66.6KB');
  });
});
