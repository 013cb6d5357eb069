import { quoted } from '../messages/printable.js';
import { checkExpression, type ExpressionType, usedSymbols } from '../program/check-expression.js';
import { evaluateConstant } from '../program/evaluate.js';
import type { Expression, PlacedExpression } from '../program/expression.js';
import { parseExpression, partsOf } from '../program/parse.js';
import type { ExpressionProblem } from '../program/scan-expression.js';
import type { Scope } from '../program/scope.js';
import { constantScope, type Reading } from './reading.js';
import type { TextSpan } from './source-text.js';
import { notFinite } from './structure.js';
import type { ScalarNode, TreeNode } from './tree.js';

/**
 * Reads the expression in a single value: parses it and checks it against a scope.
 *
 * @fails adds every problem at its own place where the text stands in the file as written, else at the value's start
 */
export function readExpression(
  node: TreeNode | undefined,
  scope: Scope,
  reading: Reading,
  wanted: ExpressionType = 'number',
): PlacedExpression | null {
  if (node?.kind !== 'scalar' || reading.findings.isFull) return null;
  const placed = parseAt(node, reading);
  if (placed === null) return null;
  const problems = checkExpression(placed.tree, scope, wanted);
  for (const problem of problems) addProblem(problem, node, reading);
  return problems.length === 0 ? placed : null;
}

/** Parses the expression in a single value; its names are not looked up. */
export function parseAt(node: ScalarNode, reading: Reading): PlacedExpression | null {
  const start = node.textStart ?? node.span.start;
  const [line, column] = [reading.source.lineOf(start), reading.source.columnOf(start)];
  if (/^[-+]?0[xo]/i.test(node.text) && typeof node.value === 'number') return notDecimal(node, reading);
  // A number of YAML is taken as it is, so that every decimal way to write one (+5, 5.) is understood.
  if (typeof node.value === 'number') {
    if (!Number.isFinite(node.value)) return noNumber('This value', node, reading);
    return { text: node.text, tree: numberTree(node.value, node.text.length), line, column };
  }
  const parsed = parseExpression(node.text);
  if ('tree' in parsed) return { text: node.text, tree: parsed.tree, line, column };
  addProblem(cutByComma(parsed.problem, node, reading), node, reading);
  return null;
}

/** An expression that nobody wrote, such as the default of a law's key. */
export function defaultExpression(value: number): PlacedExpression {
  const text = String(value);
  return { text, tree: numberTree(value, text.length), line: null, column: null };
}

function numberTree(value: number, length: number): Expression {
  return { kind: 'number', value, span: { start: 0, end: length } };
}

/** Adds a problem of an expression at its place in the file. */
export function addProblem(problem: ExpressionProblem, node: ScalarNode, reading: Reading): void {
  const { span, ...rest } = problem;
  reading.findings.add({ ...rest, at: spanIn(node, span) });
}

/** Where a piece of an expression stands in the file; the whole value if its text does not stand there as written. */
export function spanIn(node: ScalarNode, span: TextSpan): TextSpan {
  const { textStart } = node;
  return textStart === null ? node.span : { start: textStart + span.start, end: textStart + span.end };
}

/** In brackets of YAML a comma ends the value, which cuts a call like largest(lot, 2) in two. */
function cutByComma(problem: ExpressionProblem, node: ScalarNode, reading: Reading): ExpressionProblem {
  const { text } = reading.source;
  const isPlain = node.textStart === node.span.start;
  const touchesComma = text[node.span.end] === ',' || text.slice(0, node.span.start).trimEnd().endsWith(',');
  if (problem.code !== 'expression-syntax' || !isPlain || !touchesComma) return problem;
  return {
    ...problem,
    mend: `${problem.mend} Inside [ ] and { } a comma ends the value: put a formula with commas in quotes.`,
  };
}

/** An expression of constants with its value. */
export interface ConstantNumber {
  readonly expression: PlacedExpression;
  readonly value: number;
}

/**
 * Reads an expression of constants and computes it; null after a mistake, here or in a constant that it uses.
 *
 * @fails also adds `not-finite-value`
 */
export function readNumber(node: TreeNode | undefined, name: string, reading: Reading): ConstantNumber | null {
  const expression = readExpression(node, constantScope(reading, name), reading);
  if (expression === null || node?.kind !== 'scalar') return null;
  const value = computed(expression.tree, reading);
  if (value === null) return null;
  if (!Number.isFinite(value)) return noNumber(capital(name), node, reading);
  return { expression, value };
}

function noNumber(name: string, node: ScalarNode, reading: Reading): null {
  notFinite(name, node.span, reading.findings);
  return null;
}

function notDecimal(node: ScalarNode, reading: Reading): null {
  reading.findings.add({
    code: 'wrong-type',
    at: node.span,
    what: `${quoted(node.text)} is not a decimal number.`,
    why: 'A number that one reader takes as sixteen and another as ten has no place in a contract.',
    mend: `Write decimal: ${Number(node.value)}, if that is what is meant.`,
    evidence: { text: node.text.slice(0, 100) },
  });
  return null;
}

/** The value of a checked expression of constants and `number`; null while a constant in it has no value. */
export function computed(tree: Expression, reading: Reading, number = 1): number | null {
  if (isUnclear(tree, reading)) return null;
  for (const name of usedSymbols(tree, reading).constants) if (!reading.constantValues.has(name)) return null;
  return evaluateConstant(tree, (name) => (name === 'number' ? number : reading.constantValues.get(name)!));
}

function isUnclear(tree: Expression, reading: Reading): boolean {
  if (tree.kind === 'name') return reading.unclear.has(tree.name);
  return reading.unclear.size > 0 && partsOf(tree).some((part) => isUnclear(part, reading));
}

/** A sentence's first letter, unless it is a quoted name. */
export function capital(text: string): string {
  return text.charAt(0).toUpperCase() + text.slice(1);
}

/** How a setting is echoed: the formula, and its value where that is not the same text. */
export function echo({ text }: PlacedExpression, value: number | null): string {
  const shown = text.replace(/\s+/g, ' ').trim();
  return value === null || Number(shown) === value ? shown : `${shown} = ${value}`;
}
