import type { BinaryOperator, Expression } from './expression.js';
import type { Graph, Node } from './graph.js';
import type { Operation } from './operations.js';
import { sortFalling } from './sorting.js';

/** What the names of a checked expression stand for in a graph. */
export interface Meanings {
  /** A constant, a single driver, the clock `t` or a member's `number`; an unknown name is a defect of the check. */
  value(name: string): Node;
  /** The members of a family, in order. */
  family(name: string): readonly Node[];
}

const largestIntegerPower = 64;

const binaryOperations: Partial<Record<BinaryOperator, Operation>> = {
  '+': 'add',
  '-': 'subtract',
  '*': 'multiply',
  '/': 'divide',
  '<': 'less',
  '<=': 'lessOrEqual',
  '==': 'equal',
  and: 'multiply',
};

const unaryFunctions: Readonly<Record<string, Operation>> = {
  abs: 'absolute',
  exp: 'exponential',
  log: 'logarithm',
  sqrt: 'squareRoot',
  floor: 'floor',
  normalcdf: 'normalCumulative',
};

/** Writes an expression that passed its check into a graph and returns the node of its value. */
export function lower(expression: Expression, graph: Graph, meanings: Meanings): Node {
  const recurse = (part: Expression) => lower(part, graph, meanings);
  switch (expression.kind) {
    case 'number':
      return graph.constant(expression.value);
    case 'name':
      return meanings.value(expression.name);
    case 'member':
      return meanings.family(expression.family)[constantInteger(graph, recurse(expression.index)) - 1]!;
    case 'unary':
      return expression.operator === '-'
        ? graph.apply('negate', recurse(expression.operand))
        : not(graph, recurse(expression.operand));
    case 'binary':
      return lowerBinary(expression.operator, recurse(expression.left), recurse(expression.right), graph);
    case 'call':
      return lowerCall(expression, graph, meanings, recurse);
  }
}

function lowerBinary(operator: BinaryOperator, left: Node, right: Node, graph: Graph): Node {
  const operation = binaryOperations[operator];
  if (operation !== undefined) return graph.apply(operation, left, right);
  if (operator === '>') return graph.apply('less', right, left);
  if (operator === '>=') return graph.apply('lessOrEqual', right, left);
  if (operator === '!=') return not(graph, graph.apply('equal', left, right));
  if (operator === 'or') return graph.subtract(graph.add(left, right), graph.multiply(left, right));
  return lowerPower(graph, left, right);
}

/** Conditions are 1 or 0, so the logical words are sums and products. */
function not(graph: Graph, condition: Node): Node {
  return graph.subtract(graph.constant(1), condition);
}

/** Whole exponents by repeated multiplication, ½ by the square root, all others through the logarithm. */
function lowerPower(graph: Graph, base: Node, exponent: Node): Node {
  const value = graph.constantValue(exponent);
  if (value === null) return graph.apply('power', base, exponent);
  if (value === 0.5) return graph.apply('squareRoot', base);
  if (!Number.isInteger(value) || Math.abs(value) > largestIntegerPower) return graph.apply('power', base, exponent);
  const whole = wholePower(graph, base, Math.abs(value));
  return value < 0 ? graph.apply('divide', graph.constant(1), whole) : whole;
}

/** Base to a whole power from 0 up, by binary powering. */
export function wholePower(graph: Graph, base: Node, exponent: number): Node {
  if (exponent === 0) return graph.constant(1);
  if (exponent === 1) return base;
  const half = wholePower(graph, base, Math.floor(exponent / 2));
  const square = graph.multiply(half, half);
  return exponent % 2 === 1 ? graph.multiply(square, base) : square;
}

function lowerCall(
  call: Expression & { kind: 'call' },
  graph: Graph,
  meanings: Meanings,
  recurse: (part: Expression) => Node,
): Node {
  const [first, second] = call.arguments;
  const unary = Object.hasOwn(unaryFunctions, call.function) ? unaryFunctions[call.function] : undefined;
  if (unary !== undefined) return graph.apply(unary, recurse(first!));
  if (call.function === 'if') return graph.apply('select', ...call.arguments.map(recurse));
  if (call.function === 'min' || call.function === 'max') {
    const operation = call.function === 'min' ? 'minimum' : 'maximum';
    return call.arguments.map(recurse).reduce((a, b) => graph.apply(operation, a, b));
  }
  const members = meanings.family((first as Expression & { kind: 'name' }).name);
  const rank = () => (second === undefined ? 1 : constantInteger(graph, recurse(second)));
  switch (call.function) {
    case 'largest':
      return sortFalling(graph, members)[rank() - 1]!;
    case 'smallest':
      return sortFalling(graph, members)[members.length - rank()]!;
    case 'sum':
      return graph.sum(members);
    case 'mean':
      return graph.apply('divide', graph.sum(members), graph.constant(members.length));
    case 'product':
      return graph.product(members);
    default:
      throw new Error(`the function ${call.function} passed the check but has no meaning`);
  }
}

function constantInteger(graph: Graph, node: Node): number {
  const value = graph.constantValue(node);
  if (value === null || !Number.isInteger(value))
    throw new Error('a rank or index passed the check but is no whole constant');
  return value;
}
