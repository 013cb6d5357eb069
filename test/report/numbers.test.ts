import { describe, expect, it } from 'vitest';
import {
  counted,
  decimalsFor,
  duration,
  fixed,
  fixedOutward,
  grouped,
  memory,
  percent,
  relativePercent,
  roughCount,
} from '#built/report/numbers.js';

describe('digits of an estimate', () => {
  it.each([
    [0.0042, 4],
    [0.042, 3],
    [0.42, 2],
    [4.2, 1],
    [42, 0],
    [4200, 0],
    // Rounds up to 0.010, which two digits show with three decimals.
    [0.00996, 3],
    [9.96, 0],
    [null, 6],
    [0, 6],
  ])('half-width %s has %s decimals', (halfWidth, decimals) => {
    expect(decimalsFor(halfWidth)).toBe(decimals);
  });

  it('prints no minus before a zero', () => {
    expect(fixed(-0.00001, 2)).toBe('0.00');
    expect(fixed(-0.01, 2)).toBe('-0.01');
  });

  it('rounds an interval outward, and leaves what is exact', () => {
    expect(fixedOutward(16.1469, 2, 'low')).toBe('16.14');
    expect(fixedOutward(16.1411, 2, 'high')).toBe('16.15');
    expect(fixedOutward(-0.001, 2, 'low')).toBe('-0.01');
    expect(fixedOutward(0.25, 2, 'low')).toBe('0.25');
    expect(fixedOutward(0.25, 2, 'high')).toBe('0.25');
    expect(fixedOutward(0.3, 1, 'low')).toBe('0.3');
  });
});

describe('counts, shares, times, memory', () => {
  it('parts thousands', () => {
    expect([0, 999, 1000, 1234567].map(grouped)).toEqual(['0', '999', '1,000', '1,234,567']);
    expect(counted(1, 'path')).toBe('1 path');
    expect(counted(2048, 'path')).toBe('2,048 paths');
  });

  it('says large counts roughly', () => {
    expect([512, 61440, 1.234e6, 4.56e10].map(roughCount)).toEqual(['512', '61 thousand', '1.2 million', '46 billion']);
  });

  it('never shows a small share as none', () => {
    expect([0, 0.0001, 0.0312, 1].map(percent)).toEqual(['0.0%', '<0.1%', '3.1%', '100.0%']);
    expect([0.00115, 0.0123, 0.5].map(relativePercent)).toEqual(['0.11%', '1.2%', '50%']);
  });

  it('says spans of time in the unit that fits', () => {
    expect([0.04, 12.34, 59.96, 80, 3725].map(duration)).toEqual([
      '0.0 s',
      '12.3 s',
      '1 min 0 s',
      '1 min 20 s',
      '1 h 2 min',
    ]);
  });

  it('says memory in units of 1000 and never as a power of ten', () => {
    expect([512, 1536, 120e6, 25.3e9, 999.9e6, 2.884e12].map(memory)).toEqual([
      '512 bytes',
      '1.54 KB',
      '120 MB',
      '25.3 GB',
      '1 GB',
      '2,880 GB',
    ]);
  });
});
