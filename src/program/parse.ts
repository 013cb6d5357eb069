import { explainSyntax } from './explain-syntax.js';
import type { Expression } from './expression.js';
import { SyntaxError as GrammarError, parse } from './grammar.js';
import { type ExpressionProblem, mostTreeDepth, scanExpression, tooDeep } from './scan-expression.js';

/** A tree, or the one problem that keeps the text from having a tree. */
export type ParsedExpression = { readonly tree: Expression } | { readonly problem: ExpressionProblem };

/**
 * Reads an expression by the rules of `grammar.peggy`; names are not looked up yet.
 *
 * Length and nesting are limited before the parser runs, so that no text can exhaust the stack or take more than linear
 * time; the depth of the tree is limited after it, for everybody who walks the tree by recursion.
 *
 * @fails gives `expression-syntax`, `expression-too-long` or `expression-too-deep` with its place in the text
 * @example parseExpression('max(0, 100 - price)')
 */
export function parseExpression(text: string): ParsedExpression {
  const scanned = scanExpression(text);
  if (scanned !== null) return { problem: scanned };
  try {
    const tree = parse(text);
    return depthOf(tree) > mostTreeDepth ? { problem: tooDeep(tree.span.start) } : { tree };
  } catch (error) {
    if (!(error instanceof GrammarError)) throw error;
    return { problem: explainSyntax(text, error.location.start.offset) };
  }
}

/** The parts of an expression that are expressions themselves, in the order they are written. */
export function partsOf(tree: Expression): readonly Expression[] {
  switch (tree.kind) {
    case 'number':
    case 'name':
      return [];
    case 'member':
      return [tree.index];
    case 'unary':
      return [tree.operand];
    case 'binary':
      return [tree.left, tree.right];
    case 'call':
      return tree.arguments;
  }
}

/** Level by level and not by recursion, because a sum of thousands of terms is a tree thousands deep. */
function depthOf(tree: Expression): number {
  let depth = 0;
  for (let level: Expression[] = [tree]; level.length > 0; level = level.flatMap(partsOf)) depth += 1;
  return depth;
}
