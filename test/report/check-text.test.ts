import { describe, expect, it } from 'vitest';
import { type CheckFindings, checkReport } from '#built/report/check-text.js';
import { sampleAdvice, sampleRecord } from './sample-record.js';

const findings: CheckFindings = {
  title: 'Right to fell one of three groves',
  settings: sampleRecord.settings,
  forecast: {
    sizeCount: 1,
    peakMemoryBytes: 120 * 1024 ** 2,
    machineMemoryBytes: 16 * 1024 ** 3,
    paths: sampleRecord.paths,
    work: { fit: 1.2e6, bounds: null, nested: 0 },
    columnCount: 10,
    polynomialCount: 3,
  },
  advice: [],
};

describe('the text of a check', () => {
  it('counts the settings by where they came from', () => {
    expect(checkReport(findings).split('\n').slice(0, 2)).toEqual([
      'Right to fell one of three groves',
      'No mistakes. 3 settings: 1 from the file, 1 from the command line, 1 by default.',
    ]);
  });

  it('shows every setting with its value and its origin', () => {
    const text = checkReport(findings);
    expect(text).toMatch(/^ {2}clock +years +default$/m);
    expect(text).toMatch(/^ {2}constants\.spread +0\.25 +command line$/m);
    expect(text).toMatch(/^ {2}contract\.payoff +max\(0, largest\(grove\) - 100\) +line 14$/m);
  });

  it('wraps a long value and cuts nothing', () => {
    const value = Array.from({ length: 40 }, (_, index) => `term${index}`).join(' + ');
    const settings = [{ name: 'contract.payoff', value, origin: { kind: 'line', line: 3 } as const }];
    const text = checkReport({ ...findings, settings }, { width: 80 });
    for (let index = 0; index < 40; index += 1) expect(text).toContain(`term${index}`);
    for (const line of text.split('\n')) expect(line.length).toBeLessThanOrEqual(80);
  });

  it('forecasts memory and work, and says what only the pilot knows', () => {
    const text = checkReport(findings);
    expect(text).toMatch(/memory at the peak +about 126 MB of the machine's 17.2 GB/);
    expect(text).toMatch(/regression +10 columns, 3 martingale polynomials/);
    expect(text).toMatch(/work to fit the rule +about 1\.2 million path-dates/);
    expect(text).toMatch(/work for the bounds +set by the pilot/);
    expect(text).not.toContain('Andersen');
    const nested = { ...findings.forecast, machineMemoryBytes: null, work: { fit: 1, bounds: 5, nested: 3e9 } };
    expect(checkReport({ ...findings, forecast: nested })).toMatch(
      /Andersen-Broadie bound +about 3 billion path-dates/,
    );
  });

  it('says that it is the most, where several sizes of the basis may be tried', () => {
    const text = checkReport({ ...findings, forecast: { ...findings.forecast, sizeCount: 3 } });
    expect(text).toMatch(/memory at the peak +at most about 126 MB/);
    expect(text).toMatch(/regression +at most 10 columns, 3 martingale polynomials/);
    expect(text).toMatch(/work to fit the rule +at most about 1\.2 million path-dates/);
    expect(text).toContain('Up to 3 sizes of the automatic basis are fitted in turn');
    expect(checkReport(findings)).not.toMatch(/at most|in turn/);
  });

  it('says whether the paths are kept or recomputed, and by which factor the simulation grows', () => {
    const words = (text: string) => text.replace(/\s+/g, ' ');
    expect(words(checkReport(findings))).toContain('All paths of the fit are kept in memory (29.2 MB).');
    const paths = { kept: 'segments', segmentDates: 4, checkpointCount: 5, workFactor: 1.8333, bytes: 9e6 } as const;
    expect(words(checkReport({ ...findings, forecast: { ...findings.forecast, paths } }))).toContain(
      'The paths of the fit are kept in memory (9 MB) in segments of 4 dates, with 5 checkpoints, and recomputed when another segment is needed: they are simulated 1.83 times instead of once.',
    );
  });

  it('renders advice', () => {
    expect(checkReport({ ...findings, advice: [sampleAdvice] })).toContain('The gap is 2.1% of the value.');
    expect(checkReport(findings)).toContain('Advice\n  None.');
  });
});
