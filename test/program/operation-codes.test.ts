import { readFileSync } from 'node:fs';
import { expect, test } from 'vitest';
import { operations } from '#built/program/operations.js';

/** Names of the kernels' list of operation codes, in its order. */
function kernelCodes(text: string): string[] {
  const [, body] = /enum Code \{([^}]*)\}/.exec(text)!;
  return body!
    .split(',')
    .map((name) => name.trim())
    .filter((name) => name !== '');
}

const source = readFileSync(new URL('../../src/program/kernels/instructions.ts', import.meta.url), 'utf8');
const byCode = Object.entries(operations)
  .sort(([, a], [, b]) => a.code - b.code)
  .map(([name]) => name);

test('operations are numbered from 0 without gaps', () => {
  expect(Object.values(operations).map(({ code }) => code)).toEqual(byCode.map((_, code) => code));
});

test('the kernels number the operations as the table does', () => {
  expect(kernelCodes(source)).toEqual(byCode);
});

test('control: two codes that change places are seen', () => {
  expect(kernelCodes(source.replace('  less,\n  lessOrEqual,', '  lessOrEqual,\n  less,'))).not.toEqual(byCode);
});
