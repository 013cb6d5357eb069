import { PassThrough } from 'node:stream';
import { describe, expect, it } from 'vitest';
import { progressOn, timeLeft } from '#built/cli/progress.js';

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
});
