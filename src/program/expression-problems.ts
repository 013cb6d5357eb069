import type { MistakeCode } from '../messages/codes.js';
import { figure } from '../messages/figures.js';
import { nearest } from '../messages/nearest.js';
import { listed, quoted } from '../messages/printable.js';
import type { Expression, Span } from './expression.js';
import { foreignFunctions, functionShapes, functionUses } from './functions.js';
import type { ExpressionProblem } from './scan-expression.js';
import type { Scope, ScopeSymbol } from './scope.js';

type Words = Pick<ExpressionProblem, 'what' | 'why' | 'mend'>;

function problem(
  code: MistakeCode,
  span: Span,
  words: Words,
  evidence: Record<string, unknown> = {},
): ExpressionProblem {
  return { code, span, ...words, evidence };
}

const kindWords: Readonly<Record<ScopeSymbol['kind'], string>> = {
  constant: 'a constant',
  driver: 'a single driver',
  family: 'a family of drivers',
  clock: 'the clock',
  number: 'the position of a member in its family',
};

const answers: ReadonlySet<string> = new Set(['yes', 'no', 'true', 'false']);

/** The near names at the end of a remedy, if there are any. */
function nearWords(near: readonly string[]): string {
  return near.length === 0 ? '' : ` Near ${near.length === 1 ? 'name' : 'names'}: ${listed(near, 'and')}.`;
}

/** A name that is not in the scope. */
export function unknownName(name: string, span: Span, scope: Scope): ExpressionProblem {
  const why = 'An expression knows only what the scenario states; nothing is guessed or taken from elsewhere.';
  if (functionShapes.has(name)) {
    const mend = `It is a function: write ${functionUses.get(name)}.`;
    return problem('unknown-name', span, { what: `${quoted(name)} has no arguments here.`, why, mend }, { name });
  }
  if (answers.has(name)) {
    const words = {
      what: `${quoted(name)} stands in a formula; a number is meant here.`,
      why: 'Yes and no answer keys such as `today`; they have no amount.',
      mend: 'Write a number; a condition is a comparison, as x > 0.',
    };
    return problem('unknown-name', span, words, { name });
  }
  const usable = [...scope.symbols].filter(([, { kind }]) => scope.allowed.has(kind)).map(([known]) => known);
  const near = nearest(name, usable);
  const words = {
    what: `${quoted(name)} is not a name of this scenario.`,
    why,
    mend: `State it under \`constants\` or \`drivers\`, or correct the name.${nearWords(near)}`,
  };
  return problem('unknown-name', span, words, { name, near });
}

/** A call of something that is no function. */
export function unknownFunction(call: Expression & { kind: 'call' }, scope: Scope): ExpressionProblem {
  const name = call.function;
  const symbol = scope.symbols.get(name);
  const near = nearest(name, functionShapes.keys());
  const known = `The functions are ${[...functionShapes.keys()].join(' ')}.`;
  const what = `${quoted(name)} is not a function of the language.`;
  const why = 'An expression can call only the functions of a closed list.';
  const foreign = foreignFunctions.get(name.toLowerCase());
  if (symbol === undefined) {
    const mend = foreign === undefined ? `${known}${nearWords(near)}` : foreign;
    return problem('unknown-function', call.nameSpan, { what, why, mend }, { name, near });
  }
  const mend =
    symbol.kind === 'family'
      ? `It is a family: write a member with square brackets, as ${name}[1].`
      : `It is ${kindWords[symbol.kind]}: write a product with \`*\`.`;
  return problem('unknown-function', call.nameSpan, { what, why, mend }, { name, near: [] });
}

/** A name that exists, where its value is not known. */
export function notUsableHere(name: string, symbol: ScopeSymbol, span: Span, scope: Scope): ExpressionProblem {
  const words = {
    what: `${quoted(name)} is ${kindWords[symbol.kind]} and cannot be used in ${scope.subject}.`,
    why: `${capital(scope.subject)} may use only ${scope.allowedWords}: what it is must be known there.`,
    mend: 'Use a constant, or move this part of the formula to where the name is known.',
  };
  return problem('name-not-usable-here', span, words, { name, kind: symbol.kind });
}

/** A driver that nobody sees, in a payoff or a rule. */
export function unobserved(name: string, span: Span, scope: Scope): ExpressionProblem {
  const words = {
    what: `${quoted(name)} is not observed and cannot be used in ${scope.subject}.`,
    why: 'Whoever decides does not see it, so no payment and no rule can depend on it.',
    mend: `Use a driver that is observed, or state \`observed: yes\` for ${quoted(name)} if it is seen.`,
  };
  return problem('unobserved-driver', span, words, { name });
}

/** A family where one number is meant. */
export function bareFamily(name: string, span: Span): ExpressionProblem {
  const words = {
    what: `${quoted(name)} is a family of drivers where one number is meant.`,
    why: 'A family has several values at once; it must be said which one counts, or how they become one.',
    mend: `Write largest(${name}), smallest(${name}), sum(${name}), mean(${name}), product(${name}) or a member as ${name}[2].`,
  };
  return problem('bare-family', span, words, { name });
}

/** Square brackets behind something that is no family. */
export function indexOfNoFamily(name: string, symbol: ScopeSymbol, span: Span): ExpressionProblem {
  const words = {
    what: `${quoted(name)} is ${kindWords[symbol.kind]}; it has no members.`,
    why: 'Only a driver with a `count` is a family with members.',
    mend: `Write ${quoted(name)} alone, or give the driver a \`count\`.`,
  };
  return problem('not-a-family', span, words, { name });
}

/** A family function without a family. */
export function familyExpected(call: Expression & { kind: 'call' }, argument: Expression): ExpressionProblem {
  const mend =
    call.arguments.length > 1 || call.function === 'largest' || call.function === 'smallest'
      ? 'Write the name of a family first; the larger and smaller of single numbers are max(a, b) and min(a, b).'
      : 'Write the bare name of a driver that has a `count`.';
  const words = {
    what: `The first argument of ${quoted(call.function)} is not a family.`,
    why: 'This function works on all members of a family at once and takes its bare name.',
    mend,
  };
  return problem('not-a-family', argument.span, words, { function: call.function });
}

/** A position that moves with a driver or the clock. */
export function indexNotConstant(position: Expression, family: string): ExpressionProblem {
  const words = {
    what: `This position in the family ${quoted(family)} moves with a driver or with the clock.`,
    why: 'Which member or rank is meant must be known before any path is drawn.',
    mend: 'Use a whole number or a constant, and choose between members with if(condition, one, other).',
  };
  return problem('index-not-constant', position.span, words, { family });
}

/** A position that the family does not have. */
export function indexOutOfRange(position: Expression, family: string, count: number, value: number): ExpressionProblem {
  const words = {
    what: `The family ${quoted(family)} has no position ${figure(value)}.`,
    why: `It has ${count} ${count === 1 ? 'member' : 'members'}, and positions are whole numbers from 1 to ${count}.`,
    mend: `Write a whole number from 1 to ${count}.`,
  };
  return problem('index-out-of-range', position.span, words, { family, count, value: String(value) });
}

/** A function with too few or too many arguments. */
export function wrongArgumentCount(call: Expression & { kind: 'call' }): ExpressionProblem {
  const count = call.arguments.length;
  const words = {
    what: `${quoted(call.function)} is called with ${count === 0 ? 'no arguments' : count === 1 ? 'one argument' : `${count} arguments`}.`,
    why: 'Without the right number of arguments it is not known what is meant.',
    mend: `Write ${functionUses.get(call.function)}.`,
  };
  return problem('wrong-argument-count', call.span, words, { function: call.function, count });
}

/** A condition where a number is meant. */
export function numberExpected(part: Expression): ExpressionProblem {
  const words = {
    what: 'A condition stands where a number is meant.',
    why: 'A comparison is true or false and has no amount.',
    mend: 'Turn it into a number with if(condition, 1, 0) or the two amounts that you mean.',
  };
  return problem('number-expected', part.span, words);
}

/** A number where a condition is meant. */
export function conditionExpected(part: Expression): ExpressionProblem {
  const words = {
    what: 'A number stands where a condition is meant.',
    why: 'A number is neither true nor false; no rule says which numbers would count as true.',
    mend: 'Compare it with something, as x > 0.',
  };
  return problem('condition-expected', part.span, words);
}

/** Comparisons strung together. */
export function chainedComparison(part: Expression): ExpressionProblem {
  const words = {
    what: 'Comparisons are strung together here.',
    why: 'The first comparison gives true or false, which cannot be compared with a number.',
    mend: 'Write a < b and b < c.',
  };
  return problem('chained-comparison', part.span, words);
}

/** A number beyond the largest double. */
export function numberTooLarge(span: Span): ExpressionProblem {
  const words = {
    what: 'This number is larger than the largest that can be computed with.',
    why: 'It would be taken as infinite, and so would everything computed from it.',
    mend: 'Write a number below 1.7e308, or use a larger unit.',
  };
  return problem('not-finite-value', span, words);
}

function capital(text: string): string {
  return text.charAt(0).toUpperCase() + text.slice(1);
}
