import type { Graph, Node } from './graph.js';
import { operations } from './operations.js';
import type { Program } from './program.js';

/** Asks for a value of the graph in a column of the workspace. */
export interface Output {
  readonly node: Node;
  readonly column: number;
}

/**
 * Turns what the outputs need of a graph into a program.
 *
 * Values are computed in the order of the graph; a scratch column is used again as soon as its last reader has run, so
 * that a block stays in cache. An output over one of the program's own inputs is written once
 * nobody reads that input any more.
 *
 * @param uniformInputCount how many uniform inputs the caller hands in at each run
 * @param scratchColumn the first column of the workspace that the program may use for itself
 * @param name what the program computes, for profiles
 */
export function compile(
  graph: Graph,
  outputs: readonly Output[],
  uniformInputCount: number,
  scratchColumn: number,
  name = 'program',
): Program {
  const entries = graph.entries;
  const readerCount = new Map<Node, number>();
  const visit = (node: Node) => {
    const pending = [node];
    while (pending.length > 0) {
      const current = pending.pop()!;
      const count = readerCount.get(current);
      readerCount.set(current, (count ?? 0) + 1);
      const entry = entries[current]!;
      if (count === undefined && entry.kind === 'operation') pending.push(...entry.operands);
    }
  };
  for (const output of outputs) visit(output.node);
  const needed = [...readerCount.keys()].sort((a, b) => a - b);

  const scalars: number[] = new Array(uniformInputCount).fill(0);
  const inputColumns = new Map<number, Node>();
  const operandOf = new Map<Node, number>();
  const uniformCode: number[] = [];
  const laneCode: number[] = [];
  const freeColumns: number[] = [];
  let columnCount = scratchColumn;

  const directColumn = new Map<Node, number>();
  for (const node of needed) {
    const entry = entries[node]!;
    if (entry.kind === 'column') {
      inputColumns.set(entry.column, node);
      columnCount = Math.max(columnCount, entry.column + 1);
    }
  }
  const outputColumns = new Set(outputs.map((output) => output.column));
  for (const { node, column } of outputs) {
    columnCount = Math.max(columnCount, column + 1);
    const entry = entries[node]!;
    if (entry.kind === 'operation' && entry.level === 'lane' && !directColumn.has(node)) directColumn.set(node, column);
  }

  const release = (node: Node) => {
    const left = readerCount.get(node)! - 1;
    readerCount.set(node, left);
    const operand = operandOf.get(node)!;
    if (left === 0 && operand >= scratchColumn && !outputColumns.has(operand)) freeColumns.push(operand);
  };

  /** Whether nobody will read what a column holds from outside. */
  const isUnread = (column: number): boolean => {
    const input = inputColumns.get(column);
    return input === undefined || readerCount.get(input) === 0;
  };

  for (const node of needed) {
    const entry = entries[node]!;
    switch (entry.kind) {
      case 'constant':
        operandOf.set(node, -1 - scalars.length);
        scalars.push(entry.value);
        break;
      case 'uniform':
        operandOf.set(node, -1 - entry.index);
        break;
      case 'column':
        operandOf.set(node, entry.column);
        break;
      case 'operation': {
        const operands = entry.operands.map((operand) => operandOf.get(operand)!);
        const [a = -1, b = -1, c = -1] = operands;
        const { code } = operations[entry.operation];
        if (entry.level === 'uniform') {
          uniformCode.push(code, scalars.length, -1 - a, -1 - b, -1 - c);
          operandOf.set(node, -1 - scalars.length);
          scalars.push(0);
        } else {
          entry.operands.forEach(release);
          const direct = directColumn.get(node);
          const target = direct !== undefined && isUnread(direct) ? direct : (freeColumns.pop() ?? columnCount++);
          laneCode.push(code, target, a, b, c);
          operandOf.set(node, target);
        }
      }
    }
  }
  const finalCopies: number[] = [];
  for (const { node, column } of outputs) {
    let operand = operandOf.get(node)!;
    if (operand === column) continue;
    if (outputColumns.has(operand) && inputColumns.has(operand)) {
      laneCode.push(operations.copy.code, columnCount, operand, -1, -1);
      operand = columnCount++;
    }
    finalCopies.push(operations.copy.code, column, operand, -1, -1);
  }
  laneCode.push(...finalCopies);
  return {
    name,
    scalars: Float64Array.from(scalars),
    uniformInputCount,
    uniformCode: Int32Array.from(uniformCode),
    laneCode: Int32Array.from(laneCode),
    columnCount,
  };
}
