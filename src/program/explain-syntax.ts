import { quoted } from '../messages/printable.js';
import { foreignWhiteSpace } from '../messages/white-space.js';
import { functionShapes } from './functions.js';
import { type ExpressionProblem, tokenAt } from './scan-expression.js';

/** Signs of other languages and keyboards, and what stands for them here. */
const foreignSigns: ReadonlyMap<string, string> = new Map([
  ['\u2212', 'Write a minus as `-`.'],
  ['\u2013', 'Write a minus as `-`.'],
  ['×', 'Write multiplication as `*`.'],
  ['·', 'Write multiplication as `*`.'],
  ['÷', 'Write division as `/`.'],
  [':', 'Write division as `/`; a choice between two values is if(condition, one, other).'],
  ['≤', 'Write `<=`.'],
  ['≥', 'Write `>=`.'],
  ['≠', 'Write `!=`.'],
  ['√', 'Write sqrt( … ).'],
  ['²', 'Write `^2`.'],
  ['³', 'Write `^3`.'],
  ['%', 'Write a share as a number: 20% is 0.2.'],
  ['&', 'Write `and`.'],
  ['|', 'Write `or`; the size of a number is abs(x).'],
  ['!', 'Write `not` before a condition, or `!=` between two numbers.'],
  ['?', 'A choice between two values is if(condition, one, other).'],
  ['=', 'Write `==` to compare two numbers; a constant gets its value under `constants`.'],
  [';', 'An expression is one formula; arguments are parted by commas.'],
  ['{', 'Write brackets as `(` and `)`.'],
  ['}', 'Write brackets as `(` and `)`.'],
  ['"', 'There are no texts in expressions; write names without quotes.'],
  ["'", 'There are no texts in expressions; write names without quotes.'],
]);

const blank = /^[ \t\r\n]/;
const operand = /^[A-Za-z0-9_.]/;
const halfNumber = /(?<![A-Za-z0-9_.])(?:\d+(?:\.\d*)?|\.\d+)[eE][-+]?$/;
const numberMend = 'A number is written as 1, 1.5, .5 or 1e-3.';
const why = 'An expression is read by fixed rules and never guessed at.';

/** Says in words why the parser could not go on at an offset, which is the farthest place that made sense to it. */
export function explainSyntax(text: string, offset: number): ExpressionProblem {
  const before = text.slice(0, beginOf(text, offset, blank));
  const start = offset + /^[ \t\r\n]*/.exec(text.slice(offset))![0].length;
  if (/^[ \t\r\n]*$/.test(text))
    return problem(0, '', 'The expression is empty.', 'Write a formula, or take the key away.');
  const spelt = misspelt(text, before, start);
  if (spelt !== null) return spelt;
  if (start >= text.length) {
    const last = Math.max(0, before.length - 1);
    return problem(last, text[last]!, 'The expression ends where a value is still wanted.', 'Write what is missing.');
  }
  const token = tokenAt(text, start);
  const what = `${quoted(token)} cannot stand here.`;
  const wanted = wantsValue(before);
  if (token === ',') return unexpectedComma(text, before, start);
  if (token === '*' && before.endsWith('*')) return problem(start, token, what, 'Write a power as `^`.');
  if (token === 'not') return problem(start, token, what, 'Put `not` and its condition in brackets: (not …).');
  if (wanted && (token === 'and' || token === 'or')) {
    return problem(start, token, what, `Write a condition before \`${token}\`; it cannot be a name.`);
  }
  const sign = foreignSigns.get(token);
  if (sign !== undefined) return problem(start, token, what, sign);
  if (wanted) return problem(start, token, what, 'Write a number, a name, a function or a bracket in its place.');
  if (operand.test(token) || token === '(') return problem(start, token, what, missingOperator(before));
  return problem(start, token, what, 'Take it away, or write one of + - * / ^ < <= > >= == != and or in its place.');
}

/** Spaces that are none, numbers of other languages, and dots in names, where the parser stopped at them or in them. */
function misspelt(text: string, before: string, start: number): ExpressionProblem | null {
  const space = foreignWhiteSpace(text.slice(start, start + 1));
  if (space !== null) {
    const what = `${capital(space.name)} stands here, which is not read as a space.`;
    return problem(start, text[start]!, what, 'Write an ordinary space in its place, or none.');
  }
  const begin = beginOf(text, start, operand);
  const word = /^[A-Za-z0-9_.]*/.exec(text.slice(begin))![0];
  if (/^\d+(?:_+\d+)+(?:\.[\d_]+)?$/.test(word)) {
    const digits = word.replaceAll('_', '');
    return problem(begin, word, `${quoted(word)} is no number here.`, `Write no underscores in numbers: ${digits}.`);
  }
  if (/^0[xob][\dA-F]+$/i.test(word)) {
    const mend = `Write it in decimal: ${Number(word.toLowerCase())}.`;
    return problem(begin, word, `${quoted(word)} is not a decimal number.`, mend);
  }
  const half = halfNumber.exec(word === '' ? before : text.slice(0, begin + word.length));
  if (half !== null) {
    const number = half[0].replace(/[-+]$/, '');
    return problem(half.index, number, `The exponent of the number ${quoted(number)} is missing.`, numberMend);
  }
  const dotted = /^[A-Za-z_][A-Za-z0-9_]*(?=\.)/.exec(word);
  if (dotted !== null && begin + dotted[0].length <= start) {
    const mend = `Write a name without a dot. The functions are ${[...functionShapes.keys()].join(' ')}, and no others exist.`;
    return problem(begin + dotted[0].length, '.', 'A name holds no dots.', mend);
  }
  return null;
}

function unexpectedComma(text: string, before: string, start: number): ExpressionProblem {
  const bracket = openBracket(before);
  const nameEnd = bracket === null ? 0 : beginOf(text, bracket, blank);
  const name = text.slice(beginOf(text, nameEnd, operand), nameEnd);
  if (bracket !== null && text[bracket] === '[') {
    if (functionShapes.has(name)) {
      const mend = `Functions take ( ): write ${name}( … ).`;
      return problem(bracket, '[', 'The arguments of a function stand in square brackets here.', mend);
    }
    return problem(start, ',', '`,` cannot stand here.', 'Square brackets hold one position, as in lot[2].');
  }
  return problem(start, ',', '`,` cannot stand here.', commaMend(before));
}

/** Where the run of characters of one kind begins that ends at an offset. @cost linear, where a pattern with `$` is not */
function beginOf(text: string, end: number, kind: RegExp): number {
  let begin = end;
  while (begin > 0 && kind.test(text[begin - 1]!)) begin -= 1;
  return begin;
}

/** Where the innermost bracket that is still open begins. */
function openBracket(before: string): number | null {
  const open: number[] = [];
  for (let offset = 0; offset < before.length; offset += 1) {
    const character = before[offset]!;
    if (character === '(' || character === '[') open.push(offset);
    else if (character === ')' || character === ']') open.pop();
  }
  return open.at(-1) ?? null;
}

function capital(text: string): string {
  return text.charAt(0).toUpperCase() + text.slice(1);
}

function problem(start: number, token: string, what: string, mend: string): ExpressionProblem {
  return {
    code: 'expression-syntax',
    span: { start, end: start + Math.max(1, token.length) },
    what,
    why,
    mend,
    evidence: { found: token },
  };
}

/** Whether the text so far ends where a value must follow. */
function wantsValue(before: string): boolean {
  return before === '' || /[-+*/^<>=!,([]$/.test(before) || /(^|[^A-Za-z0-9_])(and|or|not)$/.test(before);
}

function commaMend(before: string): string {
  if (/(^|[^A-Za-z0-9_.])\d+$/.test(before))
    return 'Write a decimal with a point, as 0.05; commas part the arguments of a function.';
  return 'A comma parts the arguments of a function; there is no function open here, or an argument is missing.';
}

function missingOperator(before: string): string {
  if (/\d[eE]?$/.test(before)) return `Write a product with \`*\`, as 2 * x. ${numberMend}`;
  return 'An operator is missing before it; write a product with `*`.';
}
