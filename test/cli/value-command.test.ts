import { mkdtemp, readdir, readFile, rm, writeFile } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { startTarry, tarry } from './run-tarry.js';
import { smallScenario } from './small-scenario.js';

let folder = '';
let file = '';
beforeAll(async () => {
  folder = await mkdtemp(join(tmpdir(), 'tarry-cli-'));
  file = join(folder, 'two fields.yaml');
  await writeFile(file, smallScenario);
});
afterAll(() => rm(folder, { recursive: true, force: true }));

const few = ['--workers', '1'];
const numbersOf = ({ lower, upper, bracket95 }: Record<string, unknown>) => JSON.stringify({ lower, upper, bracket95 });

describe('tarry value', () => {
  it('prints a bracket for people, and nothing beside it', async () => {
    const { code, stdout, stderr } = await tarry(['value', file, ...few]);
    expect([code, stderr]).toEqual([0, '']);
    const [title, answer] = stdout.split('\n');
    expect(title).toBe('Right to sell the better of two fields');
    expect(answer).toMatch(/^Value to the holder: between [\d.]+ and [\d.]+ crowns \(95% bracket, [\d.]+% wide\)\.$/);
    expect(stdout).toContain('no advice to trade');
    expect(stdout).not.toMatch(/NaN|undefined|Infinity|\[object/);
  });

  it('prints one record with --json, and reads its plan back to the same digits', async () => {
    const { code, stdout } = await tarry(['value', file, '--json', ...few]);
    expect(code).toBe(0);
    const record = JSON.parse(stdout);
    expect(record).toMatchObject({
      schemaVersion: 1,
      status: 'complete',
      scenario: { path: file, title: 'Right to sell the better of two fields' },
      plan: { fitPathCount: 2000, outerPathCount: 512, innerPointCount: 8 },
    });
    const kept = join(folder, 'record.json');
    await writeFile(kept, stdout);
    const again = await tarry(['value', file, '--json', '--plan', kept, '--workers', '2']);
    expect(again.code).toBe(0);
    expect(numbersOf(JSON.parse(again.stdout))).toBe(numbersOf(record));
    const otherSeed = await tarry(['value', file, '--json', '--plan', kept, '--seed', 'owl', ...few]);
    expect(numbersOf(JSON.parse(otherSeed.stdout))).not.toBe(numbersOf(record));
  });

  it('keeps the record in a run directory and says where', async () => {
    const runs = join(folder, 'runs');
    const { code, stdout, stderr } = await tarry(['value', file, '--json', '--run-dir', runs, ...few]);
    expect(code).toBe(0);
    const names = await readdir(runs);
    expect(names).toHaveLength(1);
    expect(names[0]).toMatch(/^\d{8}-\d{9}-[0-9a-f]{8}\.json$/);
    expect(await readFile(join(runs, names[0]!), 'utf8')).toBe(stdout);
    expect(stderr).toContain(names[0]!.replace('.json', ''));
  });

  it('remarks that a plan comes from another text, and replays it all the same', async () => {
    const kept = join(folder, 'other.json');
    await writeFile(kept, (await tarry(['value', file, '--json', ...few])).stdout);
    const same = await tarry(['value', file, '--json', '--plan', kept, ...few]);
    expect(same.stderr).not.toContain('another scenario text');
    const changed = smallScenario.replace('spread: 0.20', 'spread: 0.21');
    const other = await tarry(['value', '-', '--json', '--plan', kept, ...few], changed);
    expect([other.code, JSON.parse(other.stdout).plan]).toEqual([0, JSON.parse(same.stdout).plan]);
    expect(other.stderr).toContain(`The plan in ${kept} comes from another scenario text`);
  });

  it('refuses a budget where the file fixes the counts, and a run directory that cannot be made', async () => {
    const budget = await tarry(['value', file, '--budget', '1s', ...few]);
    expect(budget.code).toBe(2);
    expect(budget.stderr).toContain('contradicts `--budget`');
    const { code, stderr } = await tarry(['value', file, '--run-dir', '/proc/foo', ...few]);
    expect(code).toBe(1);
    expect(stderr).toContain('run-directory-unwritable');
  });

  it('refuses a scenario with mistakes, with 1', async () => {
    const wrong = smallScenario.replace('at expiry: lapse', 'at expiry: laps');
    const { code, stdout, stderr } = await tarry(['value', '-', '--json', ...few], wrong);
    expect(code).toBe(1);
    expect(JSON.parse(stdout)).toMatchObject({ schemaVersion: 1, status: 'refused' });
    expect(stderr).toContain('standard input:');
  });

  it('ends with 5 under --strict exactly when there is advice', async () => {
    const { code, stdout } = await tarry(['value', file, '--json', '--strict', ...few]);
    expect(code).toBe(JSON.parse(stdout).advice.length > 0 ? 5 : 0);
    // 40 fit paths and 16 valuation paths are too few by any measure.
    const thin = smallScenario.replace('fit: 2000, outer: 512', 'fit: 40, outer: 16');
    const doubted = await tarry(['value', '-', '--strict', '--json', ...few], thin);
    expect(JSON.parse(doubted.stdout).advice.length).toBeGreaterThan(0);
    expect(doubted.code).toBe(5);
    expect((await tarry(['value', '-', ...few], thin)).code).toBe(0);
  });

  it('outlives a reader that leaves early', async () => {
    const running = startTarry(['value', file, ...few]);
    running.closeOutput();
    const { code, stderr } = await running.ended;
    expect([code, stderr]).toEqual([0, '']);
  });
});

describe('stopping', () => {
  // Minutes of work, so that the signal surely comes in the middle of it.
  const long = smallScenario.replace('fit: 2000, outer: 512, inner: 8', 'fit: 2000, outer: 20000000, inner: 64');

  it.each(['SIGINT', 'SIGTERM'] as const)('delivers on %s what is finished, with 3', async (name) => {
    const running = startTarry(['value', '-', '--json', ...few], long);
    await new Promise((resolve) => setTimeout(resolve, 3000));
    running.signal(name);
    const { code, stdout, stderr } = await running.ended;
    expect(code).toBe(3);
    expect(JSON.parse(stdout)).toMatchObject({ schemaVersion: 1, status: 'stopped' });
    expect(stderr).toContain('Stopping: what is finished will be delivered.');
    expect(stderr).not.toMatch(/^\s+at /m);
  });
});
