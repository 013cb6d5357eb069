import type { MistakeCode } from '../messages/codes.js';
import type { Span } from './expression.js';

/** What is wrong with an expression, placed in its own text. */
export interface ExpressionProblem {
  readonly code: MistakeCode;
  readonly span: Span;
  readonly what: string;
  readonly why: string;
  readonly mend: string;
  readonly evidence: Readonly<Record<string, unknown>>;
}

/** The longest expression that is read, in characters. */
export const mostCharacters = 10_000;

/** How deep brackets, signs, `not` and powers may stand in one another. */
export const mostNesting = 100;

const number = /(?:\d+(?:\.\d+)?|\.\d+)(?:[eE][-+]?\d+)?/y;
const word = /[A-Za-z_][A-Za-z0-9_]*/y;
const partner: ReadonlyMap<string, string> = new Map([
  [')', '('],
  [']', '['],
]);
const operatorCharacters = new Set(['+', '*', '/', '<', '>', '=', '!', ',']);

interface Level {
  readonly bracket: string;
  readonly offset: number;
  /** Signs, `not` and powers that wait for their operand: each is one more level of the tree. */
  chain: number;
}

/**
 * Finds, in one pass and before any parsing, what would make a recursive parser dig too deep, and brackets that have no
 * partner; null if there is nothing of the kind.
 *
 * @cost linear in the text
 */
export function scanExpression(text: string): ExpressionProblem | null {
  if (text.length > mostCharacters) return tooLong(text);
  const levels: Level[] = [{ bracket: '', offset: 0, chain: 0 }];
  let nesting = 0;
  let afterOperand = false;
  const setChain = (chain: number) => {
    const level = levels.at(-1)!;
    nesting += chain - level.chain;
    level.chain = chain;
  };
  for (let offset = 0; offset < text.length; ) {
    const token = tokenAt(text, offset);
    if (token === '(' || token === '[') {
      levels.push({ bracket: token, offset, chain: 0 });
      nesting += 1;
      afterOperand = false;
    } else if (token === ')' || token === ']') {
      const level = levels.at(-1)!;
      if (level.bracket !== partner.get(token)) return unopened(token, offset, level);
      levels.pop();
      nesting -= 1 + level.chain;
      afterOperand = true;
    } else if (token === '^' || token === 'not' || (token === '-' && !afterOperand)) {
      setChain(levels.at(-1)!.chain + 1);
      afterOperand = false;
    } else if (token === '-' || token === 'and' || token === 'or' || operatorCharacters.has(token)) {
      setChain(0);
      afterOperand = false;
    } else if (token.trim() !== '') {
      afterOperand = true;
    }
    if (nesting > mostNesting) return tooDeep(offset);
    offset += token.length;
  }
  return levels.length > 1 ? unclosed(levels.at(-1)!) : null;
}

/** The number, word or single character that begins at an offset of an expression. */
export function tokenAt(text: string, offset: number): string {
  for (const pattern of [number, word]) {
    pattern.lastIndex = offset;
    const found = pattern.exec(text);
    if (found !== null) return found[0];
  }
  return String.fromCodePoint(text.codePointAt(offset)!);
}

/** A tree deeper than this is refused after parsing, because whoever walks it later does so by recursion. */
export const mostTreeDepth = 1000;

/** The problem of an expression that nests deeper than {@link mostNesting} or {@link mostTreeDepth}. */
export function tooDeep(offset: number): ExpressionProblem {
  return {
    code: 'expression-too-deep',
    span: { start: offset, end: offset + 1 },
    what: `The expression nests deeper here than ${mostNesting} brackets, signs and powers, or strings together more than ${mostTreeDepth} operators.`,
    why: 'Expressions of this depth cannot be checked by a reader either, and could exhaust the memory of the program.',
    mend: 'Name a part of it as a constant, or use sum, mean, largest and the other functions of a family.',
    evidence: { mostNesting, mostTreeDepth },
  };
}

function tooLong(text: string): ExpressionProblem {
  return {
    code: 'expression-too-long',
    span: { start: 0, end: 1 },
    what: `The expression has ${text.length} characters; at most ${mostCharacters} are read.`,
    why: 'An expression of this length is no formula that somebody checks.',
    mend: 'Name parts of it as constants, or use sum, mean, largest and the other functions of a family.',
    evidence: { length: text.length, mostCharacters },
  };
}

function unopened(token: string, offset: number, level: Level): ExpressionProblem {
  const waiting = level.bracket === '' ? 'no bracket is open' : `the bracket that is open is \`${level.bracket}\``;
  return {
    code: 'expression-syntax',
    span: { start: offset, end: offset + 1 },
    what: `\`${token}\` closes a bracket here, but ${waiting}.`,
    why: 'Without pairs of brackets it is not known what belongs together.',
    mend:
      level.bracket === ''
        ? `Take this \`${token}\` away, or open its bracket.`
        : 'Close brackets in the reverse order of opening.',
    evidence: { found: token },
  };
}

function unclosed(level: Level): ExpressionProblem {
  return {
    code: 'expression-syntax',
    span: { start: level.offset, end: level.offset + 1 },
    what: `This \`${level.bracket}\` is never closed.`,
    why: 'Without pairs of brackets it is not known what belongs together.',
    mend: `Write the missing \`${level.bracket === '(' ? ')' : ']'}\`.`,
    evidence: { found: level.bracket },
  };
}
