import type { Expression } from './expression.js';

/** What the built parser throws: `location.start.offset` is the farthest place that it could make sense of. */
declare class GrammarError extends Error {
  readonly location: { readonly start: { readonly offset: number } };
}

export { GrammarError as SyntaxError };

/** The parser that is built from `grammar.peggy`. */
export function parse(text: string): Expression;
