import type { Expression } from '../program/expression.js';

/** What is certain of an amount's sign; neither when nothing is. */
export interface ProvedSign {
  readonly neverNegative: boolean;
  readonly neverPositive: boolean;
}

/** What is known of the names in an expression: the values of constants, and which drivers stay positive. */
export interface KnownSigns {
  readonly constants: ReadonlyMap<string, number>;
  readonly positiveDrivers: ReadonlySet<string>;
}

const unknown: ProvedSign = { neverNegative: false, neverPositive: false };
const notNegative: ProvedSign = { neverNegative: true, neverPositive: false };
const signOf = (value: number): ProvedSign => ({ neverNegative: value >= 0, neverPositive: value <= 0 });
const turned = ({ neverNegative, neverPositive }: ProvedSign): ProvedSign => ({
  neverNegative: neverPositive,
  neverPositive: neverNegative,
});
const both = (a: ProvedSign, b: ProvedSign): ProvedSign => ({
  neverNegative: a.neverNegative && b.neverNegative,
  neverPositive: a.neverPositive && b.neverPositive,
});

/** Functions whose value is never below 0, whatever they are asked. */
const neverBelowZero = new Set(['abs', 'exp', 'sqrt', 'normalcdf']);

/**
 * The sign that an expression has for every value of the drivers, as far as its form proves it.
 *
 * Saying nothing is always safe: only what is certain may stand in for a regressed value. The clock counts as never
 * negative.
 */
export function provedSign(tree: Expression, known: KnownSigns): ProvedSign {
  const recurse = (part: Expression) => provedSign(part, known);
  switch (tree.kind) {
    case 'number':
      return signOf(tree.value);
    case 'name':
      return signOfName(tree.name, known);
    case 'member':
      return signOfName(tree.family, known);
    case 'unary':
      return tree.operator === '-' ? turned(recurse(tree.operand)) : notNegative;
    case 'binary':
      return signOfBinary(tree, recurse);
    case 'call':
      return signOfCall(tree, recurse);
  }
}

function signOfName(name: string, { constants, positiveDrivers }: KnownSigns): ProvedSign {
  const value = constants.get(name);
  if (value !== undefined) return signOf(value);
  return name === 't' || positiveDrivers.has(name) ? notNegative : unknown;
}

function signOfBinary(
  { operator, left, right }: Expression & { kind: 'binary' },
  recurse: (part: Expression) => ProvedSign,
): ProvedSign {
  const [a, b] = [recurse(left), recurse(right)];
  switch (operator) {
    case '+':
      return both(a, b);
    case '-':
      return both(a, turned(b));
    case '*':
    case '/':
      return {
        neverNegative: (a.neverNegative && b.neverNegative) || (a.neverPositive && b.neverPositive),
        neverPositive: (a.neverNegative && b.neverPositive) || (a.neverPositive && b.neverNegative),
      };
    case '^':
      return a.neverNegative ? notNegative : unknown;
    default:
      return notNegative;
  }
}

function signOfCall(
  { function: name, arguments: parts }: Expression & { kind: 'call' },
  recurse: (part: Expression) => ProvedSign,
): ProvedSign {
  if (neverBelowZero.has(name)) return notNegative;
  const signs = (name === 'if' ? parts.slice(1) : parts).map(recurse);
  const all = signs.reduce(both);
  switch (name) {
    case 'max':
      return { ...all, neverNegative: signs.some(({ neverNegative }) => neverNegative) };
    case 'min':
      return { ...all, neverPositive: signs.some(({ neverPositive }) => neverPositive) };
    case 'if':
    case 'floor':
      return all;
    case 'largest':
    case 'smallest':
    case 'sum':
    case 'mean':
      return signs[0]!;
    case 'product':
      return signs[0]!.neverNegative ? notNegative : unknown;
    default:
      return unknown;
  }
}
