import { describe, expect, it } from 'vitest';
import { runId } from '#built/store/run-id.js';

describe('the id of a run', () => {
  it('is made of the time and the content', () => {
    // The hash is the head of the SHA-256 of "{}", as `printf '{}' | sha256sum` prints it.
    expect(runId(new Date(Date.UTC(2027, 2, 1, 9, 30, 15, 7)), '{}')).toBe('20270301-093015007-44136fa3');
  });

  it('sorts by time and differs by content', () => {
    const moments = [0, 999, 1000, 1e9, 1e12].map((time) => runId(new Date(time), String(Math.sin(time))));
    expect([...moments].sort()).toEqual(moments);
    expect(runId(new Date(0), 'a')).not.toBe(runId(new Date(0), 'b'));
  });
});
