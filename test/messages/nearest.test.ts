import { expect, test } from 'vitest';
import { nearest } from '#built/messages/nearest.js';

test.each([
  ['volatilty', ['drift', 'volatility', 'start'], ['volatility']],
  ['strik', ['strike', 'stroke', 'spread'], ['strike', 'stroke']],
  ['decision-dates', ['decision dates', 'discount'], ['decision dates']],
  ['growthOfMean', ['growth of mean'], ['growth of mean']],
  ['PAYOFF', ['payoff'], ['payoff']],
  ['constructor', ['rate', 'spread', 'cost'], []],
  ['x', ['y', 'z'], []],
  ['', ['a'], []],
  ['rate', ['rate'], []],
])('%s', (word, among, expected) => {
  expect(nearest(word, among)).toEqual(expected);
});

test('at most three names are offered, the nearest first', () => {
  expect(nearest('price', ['prices', 'pricey', 'prise', 'pride', 'prxce', 'prixx'])).toHaveLength(3);
  expect(nearest('volatility', ['volxtilxty', 'volatilitx'])).toEqual(['volatilitx', 'volxtilxty']);
});

test('a long word and a long list cost little', () => {
  const begin = performance.now();
  expect(nearest('a'.repeat(1e6), ['a'.repeat(1e6 - 1)])).toEqual([]);
  nearest(
    'abcdefgh',
    Array.from({ length: 1e5 }, (_, k) => `abcd${k}`),
  );
  expect(performance.now() - begin).toBeLessThan(1000);
});
