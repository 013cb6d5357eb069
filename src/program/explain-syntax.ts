import { quoted } from '../messages/printable.js';
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

const operand = /^[A-Za-z0-9_.]/;
const halfNumber = /(^|[^A-Za-z0-9_])[0-9.]+[eE][-+]?$/;
const numberMend = 'A number is written as 1, 1.5, .5 or 1e-3.';
const why = 'An expression is read by fixed rules and never guessed at.';

/** Says in words why the parser could not go on at an offset, which is the farthest place that made sense to it. */
export function explainSyntax(text: string, offset: number): ExpressionProblem {
  const before = text.slice(0, offset).trimEnd();
  const start = offset + (text.slice(offset).length - text.slice(offset).trimStart().length);
  if (text.trim() === '') return problem(0, '', 'The expression is empty.', 'Write a formula, or take the key away.');
  if (start >= text.length && halfNumber.test(before)) {
    return problem(before.length - 1, text[before.length - 1]!, 'A number is cut short here.', numberMend);
  }
  if (start >= text.length) {
    const last = Math.max(0, before.length - 1);
    return problem(last, text[last]!, 'The expression ends where a value is still wanted.', 'Write what is missing.');
  }
  const token = tokenAt(text, start);
  const what = `${quoted(token)} cannot stand here.`;
  const wanted = wantsValue(before);
  if (token === ',') return problem(start, token, what, commaMend(before));
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
