import { Readable } from 'node:stream';
import { describe, expect, it } from 'vitest';
import { readStream } from '#built/store/read-text.js';

const code = (read: Awaited<ReturnType<typeof readStream>>) =>
  read.kind === 'refused' ? read.messages[0]!.code : read.text;

describe('reading a text', () => {
  it('joins a character that was cut between two pieces, and drops a byte-order mark', async () => {
    const bytes = Buffer.from('\uFEFFnäher');
    expect(code(await readStream(Readable.from([bytes.subarray(0, 5), bytes.subarray(5)]), 'x', 100))).toBe('näher');
  });

  it('stops at its limit, however long the stream goes on', async () => {
    const endless = new Readable({
      read() {
        this.push(Buffer.alloc(1000));
      },
    });
    expect(code(await readStream(endless, 'x', 5000))).toBe('file-too-large');
    expect(endless.destroyed).toBe(true);
    expect(code(await readStream(Readable.from([Buffer.alloc(10, 'a')]), 'x', 10))).toBe('aaaaaaaaaa');
  });

  it('refuses bytes that are not UTF-8', async () => {
    expect(code(await readStream(Readable.from([Buffer.from([0x66, 0xff, 0x66])]), 'x', 10))).toBe('file-not-text');
  });

  it('throws on what is a defect of ours', async () => {
    const failing = new Readable({
      read() {
        this.destroy(new TypeError('ours'));
      },
    });
    await expect(readStream(failing, 'x', 10)).rejects.toThrow('ours');
  });
});
