import { spawn } from 'node:child_process';
import { once } from 'node:events';
import { describe, expect, it } from 'vitest';

const LISTENER = new URL('../../dist/cli/interruption.js', import.meta.url).href;

/** A program that listens and works on for a minute whatever happens, unless told to stop being deaf. */
function start(afterFirst: string) {
  const text = `
    import { listenForInterruption } from ${JSON.stringify(LISTENER)};
    const { signal, release } = listenForInterruption(() => console.log('heard', signal.aborted));
    signal.addEventListener('abort', () => { ${afterFirst} });
    setTimeout(() => {}, 60000);
    console.log('ready');`;
  const child = spawn(process.execPath, ['--input-type=module', '--eval', text]);
  let said = '';
  child.stdout.on('data', (piece: Buffer) => {
    said += piece.toString();
  });
  const hears = async (words: string) => {
    while (!said.includes(words)) await once(child.stdout, 'data');
  };
  return { child, hears, said: () => said, ended: once(child, 'exit') };
}

describe('the wish to stop', () => {
  it('ends at once on a second Ctrl-C', async () => {
    const { child, hears, ended } = start('');
    await hears('ready');
    child.kill('SIGINT');
    await hears('heard true');
    child.kill('SIGINT');
    expect(await ended).toEqual([130, null]);
  });

  it('lets a run finish after one request to terminate, and again ends on Ctrl-C', async () => {
    const { child, hears, said, ended } = start('');
    await hears('ready');
    child.kill('SIGTERM');
    await hears('heard true');
    child.kill('SIGTERM');
    await new Promise((resolve) => setTimeout(resolve, 100));
    expect(said().match(/heard/g)).toHaveLength(1);
    expect(child.exitCode).toBeNull();
    child.kill('SIGINT');
    expect(await ended).toEqual([130, null]);
  });

  it('gives the signals back', async () => {
    const { child, hears, ended } = start('release();');
    await hears('ready');
    child.kill('SIGINT');
    await hears('heard true');
    child.kill('SIGINT');
    expect(await ended).toEqual([null, 'SIGINT']);
  });
});
