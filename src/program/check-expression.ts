import { evaluateConstant } from './evaluate.js';
import type { Expression, Span } from './expression.js';
import * as problems from './expression-problems.js';
import { type FunctionShape, functionShapes } from './functions.js';
import type { ExpressionProblem } from './scan-expression.js';
import type { Scope, ScopeSymbol } from './scope.js';
import { usedSymbols } from './used-symbols.js';

export { usedSymbols } from './used-symbols.js';

/** What an expression gives: a number, or the outcome of a comparison. */
export type ExpressionType = 'number' | 'condition';

const mostProblems = 20;
const comparisons = new Set(['<', '<=', '>', '>=', '==', '!=']);

/**
 * Checks names, types and arguments of an expression against a closed scope; gives every problem (at most 20) in the
 * order of the text.
 *
 * @example checkExpression(tree, scope, 'number') // [] when nothing is wrong
 */
export function checkExpression(
  tree: Expression,
  scope: Scope,
  wanted: ExpressionType = 'number',
): ExpressionProblem[] {
  const check = new Check(scope);
  check.expect(tree, wanted);
  return check.found.sort((a, b) => a.span.start - b.span.start);
}

class Check {
  readonly found: ExpressionProblem[] = [];

  constructor(private readonly scope: Scope) {}

  /** Checks a part and that it gives what its place wants; a part with a problem of its own raises no second one. */
  expect(part: Expression, wanted: ExpressionType): void {
    const type = this.typeOf(part);
    if (type === null || type === wanted) return;
    this.add(wanted === 'number' ? problems.numberExpected(part) : problems.conditionExpected(part));
  }

  /** The type of a part, or null if it cannot be told after a problem. */
  private typeOf(part: Expression): ExpressionType | null {
    switch (part.kind) {
      case 'number':
        if (Number.isFinite(part.value)) return 'number';
        return this.add(problems.numberTooLarge(part.span));
      case 'name':
        return this.typeOfName(part);
      case 'member':
        return this.typeOfMember(part);
      case 'unary':
        this.expect(part.operand, part.operator === '-' ? 'number' : 'condition');
        return part.operator === '-' ? 'number' : 'condition';
      case 'binary':
        return this.typeOfBinary(part);
      case 'call':
        return this.typeOfCall(part);
    }
  }

  private typeOfName({ name, span }: Expression & { kind: 'name' }): ExpressionType | null {
    const symbol = this.lookUp(name, span);
    if (symbol === null) return null;
    if (symbol.kind === 'family') return this.add(problems.bareFamily(name, span));
    return 'number';
  }

  private typeOfMember({ family, index, span }: Expression & { kind: 'member' }): ExpressionType | null {
    const symbol = this.lookUp(family, { start: span.start, end: span.start + family.length });
    if (symbol === null) return null;
    if (symbol.kind !== 'family') return this.add(problems.indexOfNoFamily(family, symbol, span));
    this.checkPosition(index, family, symbol);
    return 'number';
  }

  private typeOfBinary(part: Expression & { kind: 'binary' }): ExpressionType | null {
    const { operator, left, right } = part;
    if (operator === 'and' || operator === 'or') {
      this.expect(left, 'condition');
      this.expect(right, 'condition');
      return 'condition';
    }
    if (!comparisons.has(operator)) {
      this.expect(left, 'number');
      this.expect(right, 'number');
      return 'number';
    }
    if (isChained(left)) {
      this.typeOf(left);
      this.expect(right, 'number');
      return this.add(problems.chainedComparison(part));
    }
    this.expect(left, 'number');
    this.expect(right, 'number');
    return 'condition';
  }

  private typeOfCall(call: Expression & { kind: 'call' }): ExpressionType | null {
    const shape = functionShapes.get(call.function);
    if (shape === undefined) {
      this.add(problems.unknownFunction(call, this.scope));
      for (const part of call.arguments) if (part.kind !== 'name' || !this.isFamily(part.name)) this.typeOf(part);
      return null;
    }
    if (!countFits(shape, call.arguments.length)) this.add(problems.wrongArgumentCount(call));
    else if (shape.kind === 'family') this.checkFamilyCall(call);
    else {
      for (const [k, part] of call.arguments.entries()) {
        this.expect(part, shape.kind === 'choice' && k === 0 ? 'condition' : 'number');
      }
    }
    return 'number';
  }

  private checkFamilyCall(call: Expression & { kind: 'call' }): void {
    const [first, rank] = call.arguments;
    if (first?.kind !== 'name') {
      this.add(problems.familyExpected(call, first!));
      return;
    }
    const symbol = this.lookUp(first.name, first.span);
    if (symbol === null) return;
    if (symbol.kind !== 'family') this.add(problems.familyExpected(call, first));
    else if (rank !== undefined) this.checkPosition(rank, first.name, symbol);
  }

  /** A rank or index must be a whole number within the family, for every value that `number` takes. */
  private checkPosition(position: Expression, family: string, { count }: ScopeSymbol & { kind: 'family' }): void {
    const before = this.found.length;
    this.expect(position, 'number');
    if (this.found.length > before) return;
    const used = usedSymbols(position, this.scope);
    if (used.drivers.size > 0 || used.usesClock) {
      this.add(problems.indexNotConstant(position, family));
      return;
    }
    if (count === null || [...used.constants].some((name) => this.scope.valueOf(name) === null)) return;
    const last = used.usesNumber ? this.scope.memberCount : 1;
    for (let number = 1; number <= last; number += 1) {
      const value = evaluateConstant(position, (name) => (name === 'number' ? number : this.scope.valueOf(name)!));
      if (Number.isInteger(value) && value >= 1 && value <= count) continue;
      this.add(problems.indexOutOfRange(position, family, count, value));
      return;
    }
  }

  /** What a name stands for, or null after a problem. */
  private lookUp(name: string, span: Span): ScopeSymbol | null {
    if (this.scope.unclear?.has(name)) return null;
    const symbol = this.scope.symbols.get(name);
    if (symbol === undefined) return this.add(problems.unknownName(name, span, this.scope));
    if (!this.scope.allowed.has(symbol.kind)) return this.add(problems.notUsableHere(name, symbol, span, this.scope));
    if (this.scope.observedOnly && 'observed' in symbol && !symbol.observed) {
      return this.add(problems.unobserved(name, span, this.scope));
    }
    return symbol;
  }

  private isFamily(name: string): boolean {
    return this.scope.symbols.get(name)?.kind === 'family';
  }

  private add(problem: ExpressionProblem): null {
    if (this.found.length < mostProblems) this.found.push(problem);
    return null;
  }
}

/** A comparison on the left without brackets around it; with them it is a condition where a number is meant. */
function isChained(left: Expression): boolean {
  return left.kind === 'binary' && comparisons.has(left.operator) && left.left.span.start === left.span.start;
}

function countFits(shape: FunctionShape, count: number): boolean {
  if (shape.kind === 'choice') return count === 3;
  if (shape.kind === 'numbers') return count >= shape.least && count <= shape.most;
  return count === 1 || (shape.ranked && count === 2);
}
