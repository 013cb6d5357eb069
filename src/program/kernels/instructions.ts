/** Runs straight-line programs over columns of lanes. */
import { exponentialColumn, logarithmColumn, normalCumulativeOf, powerOf } from './elementary';
import { columnBytes } from './workspace';

/** Operation codes, as in `../operations.ts`; a test holds the two lists together. */
export const enum Code {
  copy,
  add,
  subtract,
  multiply,
  divide,
  minimum,
  maximum,
  power,
  negate,
  absolute,
  squareRoot,
  exponential,
  logarithm,
  floor,
  normalCumulative,
  less,
  lessOrEqual,
  equal,
  select,
}

/** Integers of one instruction: code, target, three operands as addresses, and a bit for each operand that is a scalar. */
const instructionBytes: usize = 24;

/** Runs the instructions from `code` to `codeEnd` on `length` bytes of each column; three columns at `spare` are free. */
export function runInstructions(code: usize, codeEnd: usize, spare: usize, length: usize): void {
  for (; code < codeEnd; code += instructionBytes) {
    const to = <usize>load<u32>(code, 4);
    let a = <usize>load<u32>(code, 8);
    let b = <usize>load<u32>(code, 12);
    let c = <usize>load<u32>(code, 16);
    const end = to + length;
    let scalars = load<u32>(code, 20);
    const operation = load<u32>(code);
    if (scalars != 0) {
      if (scalars == 1 && runScalarColumn(operation, f64x2.splat(load<f64>(a)), b, to, end)) continue;
      if (scalars == 2 && runColumnScalar(operation, a, f64x2.splat(load<f64>(b)), to, end)) continue;
      if (scalars & 1) a = spread(a, spare, length);
      if (scalars & 2) b = spread(b, spare + columnBytes, length);
      if (scalars & 4) c = spread(c, spare + 2 * columnBytes, length);
    }
    runColumns(operation, a, b, c, to, end);
  }
}

/** Fills a column with a scalar; returns the column. */
function spread(scalar: usize, to: usize, length: usize): usize {
  const value = f64x2.splat(load<f64>(scalar));
  const end = to + length;
  for (let at = to; at < end; at += 16) v128.store(at, value);
  return to;
}

function runColumns(operation: u32, a: usize, b: usize, c: usize, to: usize, end: usize): void {
  switch (operation) {
    case Code.copy:
      memory.copy(to, a, end - to);
      break;
    case Code.add:
      loop(Code.add, a, b, to, end);
      break;
    case Code.subtract:
      loop(Code.subtract, a, b, to, end);
      break;
    case Code.multiply:
      loop(Code.multiply, a, b, to, end);
      break;
    case Code.divide:
      loop(Code.divide, a, b, to, end);
      break;
    case Code.minimum:
      loop(Code.minimum, a, b, to, end);
      break;
    case Code.maximum:
      loop(Code.maximum, a, b, to, end);
      break;
    case Code.power:
      for (; to < end; to += 16, a += 16, b += 16) v128.store(to, powerOf(v128.load(a), v128.load(b)));
      break;
    case Code.negate:
      loop(Code.negate, a, a, to, end);
      break;
    case Code.absolute:
      loop(Code.absolute, a, a, to, end);
      break;
    case Code.squareRoot:
      loop(Code.squareRoot, a, a, to, end);
      break;
    case Code.exponential:
      exponentialColumn(a, to, end);
      break;
    case Code.logarithm:
      logarithmColumn(a, to, end);
      break;
    case Code.floor:
      loop(Code.floor, a, a, to, end);
      break;
    case Code.normalCumulative:
      for (; to < end; to += 16, a += 16) v128.store(to, normalCumulativeOf(v128.load(a)));
      break;
    case Code.less:
      loop(Code.less, a, b, to, end);
      break;
    case Code.lessOrEqual:
      loop(Code.lessOrEqual, a, b, to, end);
      break;
    case Code.equal:
      loop(Code.equal, a, b, to, end);
      break;
    case Code.select:
      for (; to < end; to += 16, a += 16, b += 16, c += 16)
        v128.store(to, select(v128.load(a), v128.load(b), v128.load(c)));
      break;
    default:
      unreachable();
  }
}

/** The commonest operations on a column and a scalar; false if this is none of them. */
function runColumnScalar(operation: u32, a: usize, b: v128, to: usize, end: usize): bool {
  switch (operation) {
    case Code.add:
      loopWithRight(Code.add, a, b, to, end);
      return true;
    case Code.subtract:
      loopWithRight(Code.subtract, a, b, to, end);
      return true;
    case Code.multiply:
      loopWithRight(Code.multiply, a, b, to, end);
      return true;
    case Code.divide:
      loopWithRight(Code.divide, a, b, to, end);
      return true;
    case Code.minimum:
      loopWithRight(Code.minimum, a, b, to, end);
      return true;
    case Code.maximum:
      loopWithRight(Code.maximum, a, b, to, end);
      return true;
    default:
      return false;
  }
}

/** The same with the scalar on the left. */
function runScalarColumn(operation: u32, a: v128, b: usize, to: usize, end: usize): bool {
  switch (operation) {
    case Code.add:
      loopWithLeft(Code.add, a, b, to, end);
      return true;
    case Code.subtract:
      loopWithLeft(Code.subtract, a, b, to, end);
      return true;
    case Code.multiply:
      loopWithLeft(Code.multiply, a, b, to, end);
      return true;
    case Code.divide:
      loopWithLeft(Code.divide, a, b, to, end);
      return true;
    case Code.minimum:
      loopWithLeft(Code.minimum, a, b, to, end);
      return true;
    case Code.maximum:
      loopWithLeft(Code.maximum, a, b, to, end);
      return true;
    default:
      return false;
  }
}

// @ts-ignore: decorator
@inline
function loop(operation: Code, a: usize, b: usize, to: usize, end: usize): void {
  for (; to < end; to += 64, a += 64, b += 64) {
    v128.store(to, apply(operation, v128.load(a), v128.load(b)));
    v128.store(to, apply(operation, v128.load(a, 16), v128.load(b, 16)), 16);
    v128.store(to, apply(operation, v128.load(a, 32), v128.load(b, 32)), 32);
    v128.store(to, apply(operation, v128.load(a, 48), v128.load(b, 48)), 48);
  }
}

// @ts-ignore: decorator
@inline
function loopWithRight(operation: Code, a: usize, b: v128, to: usize, end: usize): void {
  for (; to < end; to += 64, a += 64) {
    v128.store(to, apply(operation, v128.load(a), b));
    v128.store(to, apply(operation, v128.load(a, 16), b), 16);
    v128.store(to, apply(operation, v128.load(a, 32), b), 32);
    v128.store(to, apply(operation, v128.load(a, 48), b), 48);
  }
}

// @ts-ignore: decorator
@inline
function loopWithLeft(operation: Code, a: v128, b: usize, to: usize, end: usize): void {
  for (; to < end; to += 64, b += 64) {
    v128.store(to, apply(operation, a, v128.load(b)));
    v128.store(to, apply(operation, a, v128.load(b, 16)), 16);
    v128.store(to, apply(operation, a, v128.load(b, 32)), 32);
    v128.store(to, apply(operation, a, v128.load(b, 48)), 48);
  }
}

/** One operation on two vectors; unary ones ignore the second. Not-a-number has all bits set where it is made here. */
// @ts-ignore: decorator
@inline
function apply(operation: Code, x: v128, y: v128): v128 {
  switch (operation) {
    case Code.add:
      return f64x2.add(x, y);
    case Code.subtract:
      return f64x2.sub(x, y);
    case Code.multiply:
      return f64x2.mul(x, y);
    case Code.divide:
      return f64x2.div(x, y);
    case Code.minimum:
      return v128.or(f64x2.pmin(x, y), f64x2.ne(y, y));
    case Code.maximum:
      return v128.or(f64x2.pmax(x, y), f64x2.ne(y, y));
    case Code.negate:
      return f64x2.neg(x);
    case Code.absolute:
      return f64x2.abs(x);
    case Code.squareRoot:
      return f64x2.sqrt(x);
    case Code.floor:
      return f64x2.floor(x);
    case Code.less:
      return condition(f64x2.lt(x, y), f64x2.ge(x, y));
    case Code.lessOrEqual:
      return condition(f64x2.le(x, y), f64x2.gt(x, y));
    case Code.equal:
      return v128.or(
        v128.and(f64x2.eq(x, y), f64x2.splat(1)),
        v128.or(f64x2.ne(x, x), f64x2.ne(y, y)),
      );
    default:
      return unreachable();
  }
}

/** 1 where true, 0 where false, not a number where neither. */
// @ts-ignore: decorator
@inline
function condition(isTrue: v128, isFalse: v128): v128 {
  return v128.or(v128.and(isTrue, f64x2.splat(1)), v128.not(v128.or(isTrue, isFalse)));
}

// @ts-ignore: decorator
@inline
function select(isTrue: v128, whenTrue: v128, otherwise: v128): v128 {
  const chosen = v128.bitselect(otherwise, whenTrue, f64x2.eq(isTrue, f64x2.splat(0)));
  return v128.or(chosen, f64x2.ne(isTrue, isTrue));
}
