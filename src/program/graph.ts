import { commutative, type Operation, operations } from './operations.js';
import { applyScalar } from './scalar.js';

/** A value in a graph; numbers rise in the order of computation. */
export type Node = number;

/**
 * How often a value changes: never, once for each step of a block, or from lane to lane.
 *
 * Everything that does not differ between lanes is computed once and not 512 times.
 */
export type Level = 'constant' | 'uniform' | 'lane';

type Entry =
  | { readonly kind: 'constant'; readonly level: 'constant'; readonly value: number }
  | { readonly kind: 'uniform'; readonly level: 'uniform'; readonly index: number }
  | { readonly kind: 'column'; readonly level: 'lane'; readonly column: number }
  | {
      readonly kind: 'operation';
      readonly level: Level;
      readonly operation: Operation;
      readonly operands: readonly Node[];
    };

const levelRank = { constant: 0, uniform: 1, lane: 2 } as const;

/**
 * A graph of arithmetic in which equal sub-expressions are one node and constants are folded as they appear.
 *
 * Laws, clauses and bases write into it; `compile` turns what is reachable from the outputs into a program, so a
 * builder may create more than is used at no cost.
 */
export class Graph {
  readonly entries: Entry[] = [];
  readonly #known = new Map<string, Node>();

  constant(value: number): Node {
    return this.#intern(Object.is(value, -0) ? 'k-0' : `k${value}`, { kind: 'constant', level: 'constant', value });
  }

  /** A number that is the same for all lanes of a block but may change from step to step; handed in at each run. */
  uniform(index: number): Node {
    return this.#intern(`u${index}`, { kind: 'uniform', level: 'uniform', index });
  }

  /** A column of the workspace that is filled before the program runs. */
  column(column: number): Node {
    return this.#intern(`c${column}`, { kind: 'column', level: 'lane', column });
  }

  apply(operation: Operation, ...operands: Node[]): Node {
    if (operands.length !== operations[operation].arity)
      throw new Error(`${operation} takes ${operations[operation].arity} operands`);
    const inputs = operands.map((node) => this.entries[node]!);
    if (inputs.every((entry) => entry.kind === 'constant')) {
      const [a = 0, b = 0, c = 0] = inputs.map((entry) => (entry as { value: number }).value);
      return this.constant(applyScalar(operation, a, b, c));
    }
    const simpler = this.#simplify(operation, operands);
    if (simpler !== null) return simpler;
    if (commutative.has(operation)) operands.sort((a, b) => a - b);
    const level = inputs.reduce<Level>(
      (top, entry) => (levelRank[entry.level] > levelRank[top] ? entry.level : top),
      'constant',
    );
    return this.#intern(`${operation} ${operands.join(' ')}`, { kind: 'operation', level, operation, operands });
  }

  add(a: Node, b: Node): Node {
    return this.apply('add', a, b);
  }

  subtract(a: Node, b: Node): Node {
    return this.apply('subtract', a, b);
  }

  multiply(a: Node, b: Node): Node {
    return this.apply('multiply', a, b);
  }

  /** Sum from left to right; the empty sum is the constant 0. */
  sum(nodes: readonly Node[]): Node {
    return nodes.length === 0 ? this.constant(0) : nodes.reduce((total, node) => this.add(total, node));
  }

  /** Product from left to right; the empty product is the constant 1. */
  product(nodes: readonly Node[]): Node {
    return nodes.length === 0 ? this.constant(1) : nodes.reduce((total, node) => this.multiply(total, node));
  }

  level(node: Node): Level {
    return this.entries[node]!.level;
  }

  /** The number behind a node that does not depend on any input, otherwise null. */
  constantValue(node: Node): number | null {
    const entry = this.entries[node]!;
    return entry.kind === 'constant' ? entry.value : null;
  }

  /** Neutral elements only: nothing that could hide a value that is not finite. */
  #simplify(operation: Operation, [a, b, c]: Node[]): Node | null {
    const left = this.constantValue(a!);
    const right = b === undefined ? null : this.constantValue(b);
    if (operation === 'add') return right === 0 ? a! : left === 0 ? b! : null;
    if (operation === 'subtract') return right === 0 ? a! : null;
    if (operation === 'multiply') return right === 1 ? a! : left === 1 ? b! : null;
    if (operation === 'divide') return right === 1 ? a! : null;
    if (operation === 'minimum' || operation === 'maximum') return a === b ? a! : null;
    if (operation === 'select' && left !== null && !Number.isNaN(left)) return left !== 0 ? b! : c!;
    return null;
  }

  #intern(key: string, entry: Entry): Node {
    const known = this.#known.get(key);
    if (known !== undefined) return known;
    this.entries.push(entry);
    this.#known.set(key, this.entries.length - 1);
    return this.entries.length - 1;
  }
}
