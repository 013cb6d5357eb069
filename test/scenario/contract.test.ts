import { expect, test } from 'vitest';
import { readScenario } from '#built/scenario/read-scenario.js';
import { marked, mistakes, modelOf, scenarioText } from './scenario-texts.js';

const withContract = (rest: string) => scenarioText({ contract: `contract:\n  decision dates: [1]\n${rest}` });

test('expiry: lapse by default for a holder, forced, or an amount', () => {
  const atExpiry = (rest: string) => modelOf(withContract(`  payoff: fuel\n  discount: 0\n${rest}`)).contract.atExpiry;
  expect(atExpiry('')).toEqual({ kind: 'lapse' });
  expect(atExpiry('  at expiry: lapse')).toEqual({ kind: 'lapse' });
  expect(atExpiry('  at expiry: forced')).toEqual({ kind: 'forced' });
  expect(atExpiry('  at expiry: fuel - 2')).toMatchObject({ kind: 'pays', amount: { text: 'fuel - 2' } });
  expect(atExpiry('  at expiry: 5')).toMatchObject({ kind: 'pays', amount: { text: '5' } });
});

test('an issuer must say what is owed at expiry', () => {
  const { text, expected } = marked(
    withContract('  «decided by»: issuer\n  payoff: fuel\n  discount: 0'),
    'missing-key',
  );
  expect(mistakes(text)).toEqual(expected);
  expect(modelOf(`${text}  at expiry: lapse\n`).contract).toMatchObject({
    decidedBy: 'issuer',
    atExpiry: { kind: 'lapse' },
  });
});

test.each([
  ['  payoff: «lot» - 1\n  discount: 0', ['bare-family']],
  ['  payoff: max(0, «strik» - fuel)\n  discount: 0', ['unknown-name']],
  ['  payoff: «fuel > 3»\n  discount: 0', ['number-expected']],
  ['  payoff: if(«fuel», 1, 2)\n  discount: 0', ['condition-expected']],
  ['  payoff: lot[«fuel»]\n  discount: 0', ['index-not-constant']],
  ['  payoff: lot[«0»]\n  discount: 0', ['index-out-of-range']],
  ['  payoff: lot[«1.5»]\n  discount: 0', ['index-out-of-range']],
  ['  payoff: largest(lot, «4»)\n  discount: 0', ['index-out-of-range']],
  ['  payoff: largest(«fuel»)\n  discount: 0', ['not-a-family']],
  ['  payoff: if(«0 < t < 1», 1, 0)\n  discount: 0', ['chained-comparison']],
  ['  payoff: «number»\n  discount: 0', ['name-not-usable-here']],
  ['  payoff: fuel\n  discount: 0.01 * «t»', ['name-not-usable-here']],
  ['  payoff: fuel\n  discount: «fuel»', ['name-not-usable-here']],
  ['  payoff: fuel\n  discount: «1/0»', ['not-finite-value']],
  [
    '  payoff: «a» + «b» + «__proto__»\n  discount: «c»',
    ['unknown-name', 'unknown-name', 'unknown-name', 'unknown-name'],
  ],
  ['  payoff: fuel\n  at expiry: «process»\n  discount: 0', ['wrong-choice']],
  ['  payoff: fuel\n  at expiry: 2 * «process»\n  discount: 0', ['unknown-name']],
  ['  payoff: "max(0, «strik»)"\n  discount: 0', ['unknown-name']],
  ["  payoff: 'max(0, «strik»)'\n  discount: 0", ['unknown-name']],
])('%s', (contract, codes) => {
  const { text, expected } = marked(withContract(contract), ...codes);
  expect(mistakes(text)).toEqual(expected);
});

test.each([
  ['lapsed', 'Near name: `lapse`.'],
  ['no', 'Near name: `lapse`.'],
  ['forcd', 'Near name: `forced`.'],
  ['rat', 'Near name: `rate`.'],
  ['nothing at all', 'or an amount.'],
])('at expiry: %s offers the words of the language', (word, mend) => {
  const text = withContract(`  payoff: fuel\n  at expiry: ${word}\n  discount: 0`);
  const { messages } = readScenario(text);
  expect(messages.map(({ code }) => code)).toEqual(['wrong-choice']);
  expect(messages[0]!.mend).toContain('`lapse`');
  expect(messages[0]!.mend).toContain(mend);
});
