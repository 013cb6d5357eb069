import { builtLaws } from './built-laws.js';
import type { LawParameter } from './parameters.js';

/** What the scenario language knows about a law, built or not. */
export interface LawEntry {
  readonly parameters: readonly LawParameter[];
  /** Keys whose values are more than one formula. */
  readonly otherKeys: readonly string[];
  readonly startRange: 'positive' | 'finite';
  readonly built: boolean;
}

const growth: LawParameter = {
  key: 'growth of mean',
  meaning: 'the growth rate of the mean',
  range: 'finite',
  default: null,
};
const drift: LawParameter = {
  key: 'drift',
  meaning: 'the change of the mean per clock unit',
  range: 'finite',
  default: 0,
};
const speed: LawParameter = { key: 'speed', meaning: 'the speed of reversion', range: 'not negative', default: null };
const level: LawParameter = { key: 'level', meaning: 'the level of reversion', range: 'finite', default: null };
const volatility: LawParameter = { key: 'volatility', meaning: 'the volatility', range: 'not negative', default: null };
const hurst: LawParameter = {
  key: 'Hurst exponent',
  meaning: 'the Hurst exponent',
  range: 'not negative',
  default: null,
};
const observedDriver: LawParameter = {
  key: 'of',
  meaning: 'the quantity that is remembered',
  range: 'finite',
  default: null,
};
const kept: LawParameter = {
  key: 'keep',
  meaning: 'how many values are remembered',
  range: 'not negative',
  default: null,
};

function notBuilt(startRange: LawEntry['startRange'], parameters: LawParameter[], otherKeys: string[] = []): LawEntry {
  return { parameters, otherKeys, startRange, built: false };
}

/**
 * Laws that the language names already, so that a scenario which uses them is understood and answered plainly. A law
 * leaves this list when it is built: its own file then says what it reads.
 */
const lawsToCome: readonly (readonly [string, LawEntry])[] = [
  ['mean-reverting', notBuilt('finite', [speed, level, volatility])],
  ['mean-reverting logarithm', notBuilt('positive', [speed, level, volatility])],
  ['square-root', notBuilt('positive', [speed, level, volatility])],
  ['stochastic variance', notBuilt('positive', [growth], ['variance'])],
  ['two-factor commodity', notBuilt('positive', [growth, volatility], ['convenience yield'])],
  ['fractional', notBuilt('finite', [hurst, drift, volatility])],
  ['finite chain', notBuilt('finite', [], ['states', 'transitions'])],
  ['own change', notBuilt('finite', [], ['change', 'scheme'])],
  ['own recursion', notBuilt('finite', [], ['next', 'shocks'])],
  ['running sum', notBuilt('finite', [observedDriver], ['sampled'])],
  ['running average', notBuilt('finite', [observedDriver], ['sampled'])],
  ['running maximum', notBuilt('finite', [observedDriver], ['sampled'])],
  ['running minimum', notBuilt('finite', [observedDriver], ['sampled'])],
  ['last values', notBuilt('finite', [observedDriver, kept], ['sampled'])],
  ['time since', notBuilt('finite', [], ['event', 'sampled'])],
];

/** Every law of the language by its name in the scenario. */
export const lawCatalogue: ReadonlyMap<string, LawEntry> = new Map<string, LawEntry>([
  ...[...builtLaws].map(([name, { parameters, startRange }]): [string, LawEntry] => [
    name,
    { parameters, otherKeys: [], startRange, built: true },
  ]),
  ...lawsToCome,
]);
