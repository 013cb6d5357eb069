import { expect, test } from 'vitest';
import { messageCodes } from '#built/messages/codes.js';
import { fileCodeRows } from './file-code-rows.js';
import { numericalCodeRows } from './numerical-code-rows.js';
import { scenarioCodeRows } from './scenario-code-rows.js';

const rows = [...scenarioCodeRows, ...fileCodeRows, ...numericalCodeRows];

test.each(rows)('%s is provoked', async (code, provoke) => {
  const messages = await provoke();
  const found = messages.find((message) => message.code === code);
  expect(found, `found only ${messages.map((message) => message.code).join(', ')}`).toBeDefined();
  expect(found!.severity).toBe(messageCodes.get(code)!.severity);
  for (const words of [found!.what, found!.why, found!.mend]) expect(words).toMatch(/^\S.{10,}[.…]$/s);
});

test('every code of the catalogue has a row, and every row a code', () => {
  const provoked = new Set(rows.map(([code]) => code));
  expect([...messageCodes.keys()].filter((code) => !provoked.has(code))).toEqual([]);
  expect([...provoked].filter((code) => !messageCodes.has(code))).toEqual([]);
});

test('codes are kebab-case and titles are one line', () => {
  for (const [code, { title }] of messageCodes) {
    expect(code).toMatch(/^[a-z]+(-[a-z]+)*$/);
    expect(title).toMatch(/^[A-Z][^\n.]*$/);
  }
});
