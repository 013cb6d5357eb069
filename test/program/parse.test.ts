import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import type { Expression } from '#built/program/expression.js';
import { parseExpression } from '#built/program/parse.js';
import { printed, printedBriefly, shape } from './expression-text.js';

function treeOf(text: string): Expression {
  const parsed = parseExpression(text);
  if ('problem' in parsed) throw new Error(`${text}: ${parsed.problem.what}`);
  return parsed.tree;
}

function problemOf(text: string) {
  const parsed = parseExpression(text);
  if ('tree' in parsed) throw new Error(`${text} was read`);
  return parsed.problem;
}

test.each([
  ['1 + 2 * 3', '1 + (2 * 3)'],
  ['1 - 2 - 3', '(1 - 2) - 3'],
  ['8 / 4 / 2', '(8 / 4) / 2'],
  ['2 ^ 3 ^ 2', '2 ^ (3 ^ 2)'],
  ['-x^2', '-(x ^ 2)'],
  ['(-x)^2', '(-x) ^ 2'],
  ['2^-x', '2 ^ (-x)'],
  ['2^-x^2', '2 ^ (-(x ^ 2))'],
  ['a * -b', 'a * (-b)'],
  ['--a', '-(-a)'],
  ['-a * b', '(-a) * b'],
  ['a < b + 1', 'a < (b + 1)'],
  ['a < b and c >= d or not e == f', '((a < b) and (c >= d)) or (not (e == f))'],
  ['not a < b and c < d', '(not (a < b)) and (c < d)'],
  ['not not a < b', 'not (not (a < b))'],
  ['a or b and c', 'a or (b and c)'],
  ['a < b < c', '(a < b) < c'],
  ['max(0, largest(lot, 2) - lot[3])', 'max(0, largest(lot, 2) - lot[3])'],
  ['max (a,b)', 'max(a, b)'],
  ['lot [ n + 1 ]', 'lot[n + 1]'],
  ['notable + order + android', '(notable + order) + android'],
  ['1e-3 + .5 + 1.5E+2 + 0010', '((0.001 + 0.5) + 150) + 10'],
  [' \n\ta\r\n+ b ', 'a + b'],
  ['f()', 'f()'],
])('%s is %s', (text, expected) => {
  expect(printed(treeOf(text))).toBe(expected);
});

test('every part knows its place', () => {
  const text = ' max(0, (a + b) * lot[2]) ';
  const tree = treeOf(text) as Expression & { kind: 'call' };
  const at = ({ start, end }: { start: number; end: number }) => text.slice(start, end);
  expect(at(tree.span)).toBe('max(0, (a + b) * lot[2])');
  expect(at(tree.nameSpan)).toBe('max');
  const product = tree.arguments[1] as Expression & { kind: 'binary' };
  expect([product, product.left, product.right].map(({ span }) => at(span))).toEqual([
    '(a + b) * lot[2]',
    '(a + b)',
    'lot[2]',
  ]);
});

const names = fc.constantFrom('a', 'b', 'lot', 'x1', '_y', 'iffy', 'constructor', '__proto__');
const number = fc.double({ min: 0, noNaN: true, noDefaultInfinity: true });
const tree: fc.Arbitrary<Expression> = fc.letrec<{ tree: Expression }>((tie) => ({
  tree: fc.oneof(
    { depthSize: 'medium', withCrossShrink: true },
    fc.record({ kind: fc.constant('number'), value: number }),
    fc.record({ kind: fc.constant('name'), name: names }),
    fc.record({ kind: fc.constant('member'), family: names, index: tie('tree') }),
    fc.record({ kind: fc.constant('unary'), operator: fc.constantFrom('-', 'not'), operand: tie('tree') }),
    fc.record({
      kind: fc.constant('binary'),
      operator: fc.constantFrom('+', '-', '*', '/', '^', '<', '<=', '>', '>=', '==', '!=', 'and', 'or'),
      left: tie('tree'),
      right: tie('tree'),
    }),
    fc.record({ kind: fc.constant('call'), function: names, arguments: fc.array(tie('tree'), { maxLength: 3 }) }),
  ) as fc.Arbitrary<Expression>,
})).tree;

test.each([
  ['all', printed],
  ['as few as possible', printedBriefly],
])('a tree that is printed with %s brackets and read again is the same tree', (_name, print) => {
  fc.assert(
    fc.property(tree, (original) => {
      const parsed = parseExpression(print(original));
      if ('problem' in parsed) expect(['expression-too-deep', 'expression-too-long']).toContain(parsed.problem.code);
      else expect(shape(parsed.tree)).toEqual(shape(original));
    }),
    { numRuns: 1500, seed: 11 },
  );
});

test('any text gives a tree or one problem inside it', () => {
  const piece = fc.constantFrom(
    ...'()[],+-*/^<>=! .1e'.split(''),
    'not ',
    ' and ',
    ' or ',
    'a',
    'max(',
    'lot[',
    '2',
    'é',
    '=',
    '%',
    '"',
    '\n',
  );
  fc.assert(
    fc.property(
      fc.oneof(
        fc.array(piece, { maxLength: 30 }).map((list) => list.join('')),
        fc.string({ unit: 'binary' }),
      ),
      (text) => {
        const parsed = parseExpression(text);
        if ('tree' in parsed) return;
        const { span, what, why, mend } = parsed.problem;
        expect(span.start).toBeGreaterThanOrEqual(0);
        expect(span.end).toBeGreaterThan(span.start);
        expect(span.start).toBeLessThanOrEqual(text.length);
        for (const words of [what, why, mend]) expect(words.length).toBeGreaterThan(5);
      },
    ),
    { numRuns: 3000, seed: 13 },
  );
});

test.each([
  ['', 0, 'empty'],
  ['   ', 0, 'empty'],
  ['1 +', 2, 'ends'],
  ['max(1, )', 7, 'number, a name'],
  ['(1 + 2', 0, 'missing'],
  ['1 + 2)', 5, 'away'],
  ['(1 + 2]', 6, 'reverse order'],
  ['lot[1)', 5, 'reverse order'],
  ['2x', 1, '2 * x'],
  ['a b', 2, '`*`'],
  ['(a)(b)', 3, '`*`'],
  ['1.2.3', 3, '1.5'],
  ['1e', 0, '1e-3'],
  ['1e * 2', 0, 'exponent of the number `1e` is missing'],
  ['2 + 1.5e-', 4, 'exponent'],
  ['1_000', 0, 'no underscores in numbers: 1000'],
  ['2 * 1_000_000.5', 4, 'no underscores in numbers: 1000000.5'],
  ['0x10 * 2', 0, 'decimal: 16'],
  ['2 * 0o17', 4, 'decimal: 15'],
  ['2 ** 3', 3, '`^`'],
  ['a = b', 2, '`==`'],
  ['a && b', 2, '`and`'],
  ['a || b', 2, '`or`'],
  ['!a', 0, '`not`'],
  ['20%', 2, '0.2'],
  ['0,05', 1, 'decimal'],
  ['a, b', 1, 'comma'],
  ['a ? b : c', 2, 'if('],
  ['a − b', 2, '`-`'],
  ['a ≤ b', 2, '`<=`'],
  ['"a"', 0, 'quotes'],
  ['1 + not a', 4, '(not'],
  ['and', 0, 'condition before'],
  ['a + + b', 4, 'number, a name'],
  ['* a', 0, 'number, a name'],
  ['größe', 2, 'away'],
  ['a.b', 1, 'holds no dots'],
  ['process.exit()', 7, 'no others exist'],
  ['2 * a.5', 5, 'holds no dots'],
  ['max[0, 1]', 3, 'max( … )'],
  ['lot[1, 2]', 5, 'one position'],
  ['a +\u00A0b', 3, 'no-break space (U+00A0)'],
  ['a\u2003+ b', 1, 'U+2003'],
  ['\u00A0', 0, 'no-break space'],
  ['a; b', 1, 'commas'],
  ['process["exit"]', 8, 'quotes'],
])('%j: the problem is at %i and says how to mend it', (text, start, mend) => {
  const problem = problemOf(text);
  expect(problem.code).toBe('expression-syntax');
  expect(problem.span.start).toBe(start);
  expect(`${problem.what} ${problem.mend}`).toContain(mend);
});

describe('limits', () => {
  test.each([
    ['a hundred brackets', `${'('.repeat(100)}1${')'.repeat(100)}`],
    ['a hundred signs', `${'-'.repeat(100)}1`],
    ['a hundred powers', `1${'^1'.repeat(100)}`],
    ['a sum of nine hundred', `1${'+1'.repeat(900)}`],
    ['ten thousand characters', `max(${'1,'.repeat(4997)}1)`],
    ['many signs side by side', `1${' + -1'.repeat(500)}`],
    ['many brackets side by side', `(1)${'+(1)'.repeat(500)}`],
  ])('%s are read', (_name, text) => {
    expect(parseExpression(text)).toHaveProperty('tree');
  });

  test.each([
    ['brackets', `${'('.repeat(101)}1${')'.repeat(101)}`],
    ['square brackets', `${'a['.repeat(101)}1${']'.repeat(101)}`],
    ['calls', `${'f('.repeat(101)}1${')'.repeat(101)}`],
    ['signs', `${'-'.repeat(101)}1`],
    ['signs behind an operator', `1*${'-'.repeat(101)}1`],
    ['not', `${'not '.repeat(101)}a`],
    ['powers', `1${'^1'.repeat(101)}`],
    ['powers of brackets', `(1)${'^(1)'.repeat(101)}`],
    ['powers of signs', `1${'^-1'.repeat(51)}`],
    ['all mixed', `${'-(not f(2^'.repeat(26)}1`],
    ['a long sum', `1${'+1'.repeat(1000)}`],
  ])('%s beyond the limit are refused', (_name, text) => {
    expect(problemOf(text).code).toBe('expression-too-deep');
  });

  test('more than ten thousand characters are refused', () => {
    expect(problemOf(`1${' '.repeat(10_000)}`).code).toBe('expression-too-long');
  });

  test.each([
    ['(', 10_000],
    ['-', 10_000],
    ['f(', 5000],
    ['1^', 5000],
    ['a[', 5000],
    ['not ', 2500],
    ['((1)+', 2000],
    ['1<', 5000],
    ['if(', 3333],
    [')', 10_000],
    ['1,', 5000],
    ['a ', 5000],
  ])('ten thousand characters of %j end at once', (piece, count) => {
    const begin = performance.now();
    parseExpression(piece.repeat(count));
    parseExpression(`${piece.repeat(30)}1${')'.repeat(30)}`);
    expect(performance.now() - begin).toBeLessThan(500);
  });
});
