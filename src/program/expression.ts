/** Where a piece of an expression stands in its own text: offsets in characters, `end` exclusive. */
export interface Span {
  readonly start: number;
  readonly end: number;
}

/** Operators between two operands, as the scenario writes them. */
export type BinaryOperator = '+' | '-' | '*' | '/' | '^' | '<' | '<=' | '>' | '>=' | '==' | '!=' | 'and' | 'or';
/** Operators in front of one operand. */
export type UnaryOperator = '-' | 'not';

/** A parsed expression: a plain tree, before any name was looked up. */
export type Expression =
  | { readonly kind: 'number'; readonly value: number; readonly span: Span }
  | { readonly kind: 'name'; readonly name: string; readonly span: Span }
  /** `lot[2]`: a member of a family; the index is an expression of constants and `number`. */
  | { readonly kind: 'member'; readonly family: string; readonly index: Expression; readonly span: Span }
  | {
      readonly kind: 'unary';
      readonly operator: UnaryOperator;
      readonly operand: Expression;
      readonly span: Span;
    }
  | {
      readonly kind: 'binary';
      readonly operator: BinaryOperator;
      readonly left: Expression;
      readonly right: Expression;
      readonly span: Span;
    }
  /** `nameSpan` covers the function's name alone, so that a mistake in it is underlined exactly. */
  | {
      readonly kind: 'call';
      readonly function: string;
      readonly arguments: readonly Expression[];
      readonly nameSpan: Span;
      readonly span: Span;
    };

/** An expression with the text it was read from and the place where that text begins in the scenario. */
export interface PlacedExpression {
  readonly text: string;
  readonly tree: Expression;
  /** 1-based; null when the expression came from the command line or from a default. */
  readonly line: number | null;
  readonly column: number | null;
}
