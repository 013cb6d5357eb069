import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { tarry } from './run-tarry.js';
import { smallScenario } from './small-scenario.js';

const version: string = JSON.parse(readFileSync(new URL('../../package.json', import.meta.url), 'utf8')).version;

describe('help and version', () => {
  it('prints the version of the package', async () => {
    expect(await tarry(['--version'])).toEqual({ code: 0, stdout: `${version}\n`, stderr: '' });
  });

  it('lists commands, options and exit codes', async () => {
    const { code, stdout } = await tarry(['--help']);
    expect(code).toBe(0);
    for (const word of ['check', 'value', 'Exit codes:', '5  finished, but advice']) expect(stdout).toContain(word);
    const value = (await tarry(['value', '--help'])).stdout;
    const options = ['with', 'seed', 'width', 'budget', 'plan', 'upper', 'workers', 'run-dir', 'json', 'strict'];
    for (const option of options) expect(value).toContain(`--${option}`);
  });

  it('answers a bare call with its help, as a mistake', async () => {
    const { code, stdout, stderr } = await tarry([]);
    expect([code, stdout]).toEqual([2, '']);
    expect(stderr).toContain('Usage: tarry');
  });
});

describe('mistakes on the command line end with 2, a message and a remedy', () => {
  it.each([
    [['valeu', 'x.yaml'], "Unknown command 'valeu'.", 'Did you mean value?'],
    [['value', 'x.yaml', '--strct'], "Unknown option '--strct'.", 'Did you mean --strict?'],
    [['check', 'x.yaml', '--jsn'], "Unknown option '--jsn'.", 'Did you mean --json?'],
    [['value'], "Missing required argument 'FILE'.", '`tarry value --help`'],
    [['value', 'x.yaml', 'y.yaml'], 'Too many arguments', '`tarry value --help`'],
    [['value', 'x.yaml', '--seed'], 'argument missing', '`tarry value --help`'],
    [['value', 'x.yaml', '--upper', 'regresed'], '--upper regresed is no method.', 'Did you mean `regressed`?'],
    [['value', 'x.yaml', '--plan', 'p', '--budget', '3s'], '--plan and --budget are both given.', 'Leave --budget or'],
    [['check', 'x.yaml', '--with', 'spread'], 'is not of the form NAME=EXPRESSION.', '--with spread=0.25'],
  ])('%j', async (words, what, mend) => {
    const { code, stdout, stderr } = await tarry(words);
    expect([code, stdout]).toEqual([2, '']);
    expect(stderr).toContain('command-line');
    expect(stderr).toContain(what);
    expect(stderr).toContain(mend);
    expect(stderr).not.toMatch(/^\s+at /m);
  });

  it('finds all of them at once', async () => {
    const words = ['value', '-', '--json', '--width', 'thin', '--budget', '5', '--workers', 'all', '--with', 'x'];
    const { code, stdout } = await tarry(words, smallScenario);
    expect(code).toBe(2);
    const document = JSON.parse(stdout);
    expect(document).toMatchObject({ schemaVersion: 1, status: 'refused' });
    expect(document.messages.map((message: { code: string }) => message.code)).toEqual(Array(4).fill('command-line'));
  });
});

describe('files that cannot be used end with 1', () => {
  it.each([
    [['value', 'no such.yaml'], 'file-unreadable'],
    [['check', '.'], 'file-unreadable'],
    [['check', process.execPath], 'file-too-large'],
    [['value', '-', '--plan', 'no such.json'], 'file-unreadable'],
    [['value', '-', '--plan', 'package.json'], 'record-invalid'],
    [['value', '-', '--run-dir', 'package.json/runs'], 'run-directory-unwritable'],
  ])('%j', async (words, messageCode) => {
    const plain = await tarry(words, smallScenario);
    expect([plain.code, plain.stdout]).toEqual([1, '']);
    expect(plain.stderr).toContain(messageCode);
    expect(plain.stderr).not.toMatch(/^\s+at /m);
    const asked = await tarry([...words, '--json'], smallScenario);
    expect(asked.code).toBe(1);
    const document = JSON.parse(asked.stdout);
    expect(document.status).toBe('refused');
    expect(document.messages[0].code).toBe(messageCode);
  });
});
