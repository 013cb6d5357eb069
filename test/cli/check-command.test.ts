import { describe, expect, it } from 'vitest';
import { tarry } from './run-tarry.js';
import { smallScenario } from './small-scenario.js';

describe('tarry check', () => {
  it('shows every setting with its origin, and the forecast', async () => {
    const { code, stdout, stderr } = await tarry(['check', '-', '--with', 'spread=0.25'], smallScenario);
    expect([code, stderr]).toEqual([0, '']);
    expect(stdout.split('\n')[0]).toBe('Right to sell the better of two fields');
    expect(stdout).toMatch(/max\(0, largest\(field\) - 100\) +line 21$/m);
    expect(stdout).toMatch(/spread +0\.25\b.* command line$/m);
    expect(stdout).toMatch(/ default$/m);
    expect(stdout).toMatch(/memory at the peak +about [\d.]+ (KB|MB|GB) of the machine's/);
  });

  it('prints one document and nothing else with --json', async () => {
    const { code, stdout } = await tarry(['check', '-', '--json', '--seed', 'owl'], smallScenario);
    expect(code).toBe(0);
    const document = JSON.parse(stdout);
    expect(document).toMatchObject({
      schemaVersion: 1,
      status: 'checked',
      scenario: { path: 'standard input', title: 'Right to sell the better of two fields', money: 'crowns' },
    });
    expect(document.forecast.peakMemoryBytes).toBeGreaterThan(0);
    expect(document.settings).toContainEqual({ name: 'seed', value: 'owl', origin: { kind: 'command line' } });
  });

  it('refuses mistakes with 1, all of them at their lines', async () => {
    const wrong = smallScenario.replace('volatility: spread', 'volatilty: spread').replace('at expiry', 'at expry');
    const { code, stdout, stderr } = await tarry(['check', '-'], wrong);
    expect([code, stdout]).toEqual([1, '']);
    expect(stderr).toContain('standard input:16:5');
    expect(stderr).toContain('standard input:22:3');
    const asked = await tarry(['check', '-', '--json'], wrong);
    const document = JSON.parse(asked.stdout);
    expect([asked.code, document.schemaVersion, document.status]).toEqual([1, 1, 'refused']);
    expect(document.messages.length).toBeGreaterThanOrEqual(2);
  });

  it('refuses a constant that the scenario does not have, as a mistake of the call', async () => {
    const { code, stderr } = await tarry(['check', '-', '--with', 'spred=0.25'], smallScenario);
    expect(code).toBe(2);
    expect(stderr).toContain('spread');
  });

  it.each([
    ['--with', 'nope=1'],
    ['--with', 'spread=1/0'],
    ['--with', 'spread=('],
    ['--seed', ''],
    ['--width', '1%'],
  ])('ends with 2 for %s %s, which the scenario cannot follow', async (...option) => {
    const { code, stdout } = await tarry(['check', '-', '--json', ...option], smallScenario);
    expect(code).toBe(2);
    expect(JSON.parse(stdout).messages.length).toBeGreaterThan(0);
  });

  it('ends with 1 where the file has mistakes too', async () => {
    const wrong = smallScenario.replace('rate - upkeep', 'rate - upkep');
    expect((await tarry(['check', '-', '--with', 'nope=1'], wrong)).code).toBe(1);
  });

  it('lays out thousands of settings at once', async () => {
    const many = Array.from({ length: 1990 }, (_, k) => `  c${k}: ${k}\n`).join('');
    const begin = performance.now();
    const { code, stdout } = await tarry(
      ['check', '-'],
      smallScenario.replace('  rate: 0.05\n', `  rate: 0.05\n${many}`),
    );
    expect([code, stdout.includes('constants.c1989')]).toEqual([0, true]);
    // Two seconds on an idle machine; the tests run beside others.
    expect(performance.now() - begin).toBeLessThan(6000);
  });
});
