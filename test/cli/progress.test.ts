import { PassThrough } from 'node:stream';
import { describe, expect, it } from 'vitest';
import { progressOn, timeLeft } from '#built/cli/progress.js';
import { stageWords, stageWordsWidth } from '#built/cli/stage-words.js';

describe('time left', () => {
  it.each([
    [10, 1, 4, '30 s left'],
    [10, 1, 11, '1 min 40 s left'],
    [100, 1, 100, '2 h 45 min left'],
    [10, 4, 4, '0 s left'],
    // Too early to tell.
    [0.1, 1, 100, ''],
    [10, 0, 4, ''],
  ])('after %s s with %s of %s done: "%s"', (elapsed, done, total, words) => {
    expect(timeLeft(elapsed, done, total)).toBe(words);
  });
});

describe('what a run is doing', () => {
  const at = { done: 1, total: 2 };

  it.each([
    [{ stage: 'fit' }, 'fitting the rule'],
    [{ stage: 'fit', columnCount: 255 }, 'fitting the rule, 255 columns'],
    [{ stage: 'select', columnCount: 1, round: 1 }, 'trying the basis, 1 column'],
    [{ stage: 'pilot', columnCount: 24, round: 1 }, 'pilot'],
    [{ stage: 'bounds', round: 1 }, 'both bounds'],
    [{ stage: 'bounds', round: 2 }, 'both bounds, round 2'],
    [{ stage: 'nested', round: 3 }, 'Andersen-Broadie bound, round 3'],
  ] as const)('%j: %s', (progress, words) => {
    expect(stageWords({ ...at, ...progress })).toBe(words);
    expect(words.length).toBeLessThanOrEqual(stageWordsWidth);
  });
});

/** A stream that remembers what was written, in the place of standard error. */
function standIn(isTerminal: boolean) {
  let written = '';
  const stream = Object.assign(new PassThrough(), { isTTY: isTerminal, columns: 100 });
  stream.on('data', (piece: Buffer) => {
    written += piece.toString();
  });
  return { stream: stream as unknown as NodeJS.WriteStream, written: () => written };
}

describe('the bar', () => {
  it('is silent where nobody watches', () => {
    const { stream, written } = standIn(false);
    const bar = progressOn(stream);
    bar.show({ stage: 'fit', done: 1, total: 2 });
    bar.end();
    expect(written()).toBe('');
  });

  it('names each stage on a terminal, clears its line, and leaves Ctrl-C alone', () => {
    const listeners = process.listenerCount('SIGINT');
    const { stream, written } = standIn(true);
    const bar = progressOn(stream);
    bar.show({ stage: 'fit', done: 1, total: 2 });
    bar.show({ stage: 'bounds', done: 1, total: 4 });
    expect(process.listenerCount('SIGINT')).toBe(listeners);
    bar.end();
    bar.end();
    expect(written()).toContain('fitting the rule');
    expect(written()).toContain('both bounds');
    expect(written().endsWith('\u001b[2K')).toBe(true);
  });

  it('begins anew with another size of the basis and with another round', () => {
    const { stream, written } = standIn(true);
    const bar = progressOn(stream);
    const shown: string[] = [];
    const show = (progress: Parameters<typeof bar.show>[0]) => {
      const before = written().length;
      bar.show(progress);
      shown.push(written().slice(before));
    };
    show({ stage: 'fit', columnCount: 24, done: 2, total: 2 });
    show({ stage: 'fit', columnCount: 59, done: 1, total: 9 });
    show({ stage: 'bounds', round: 1, done: 4, total: 4 });
    show({ stage: 'bounds', round: 2, done: 1, total: 8 });
    bar.end();
    expect(shown[1]).toContain('fitting the rule, 59 columns');
    expect(shown[1]).toContain('  0%');
    expect(shown[3]).toContain('both bounds, round 2');
    expect(shown[3]).toContain('  0%');
  });
});
