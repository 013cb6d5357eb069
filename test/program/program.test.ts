import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { compile, type Output } from '#built/program/compile.js';
import { Graph, type Node } from '#built/program/graph.js';
import type { InterpreterMaker } from '#built/program/interpreter.js';
import { type Operation, operations } from '#built/program/operations.js';
import { columnStride } from '#built/program/program.js';
import { applyScalar } from '#built/program/scalar.js';
import { interpreterKinds, plainKeys } from './interpreters.js';

const inputCount = 3;
const uniforms = [1.3, -0.4];
const scratch = 20;
const lanes = 37;
const names = Object.keys(operations) as Operation[];

/** A recipe for a random graph: operation and three choices of earlier values for each new one. */
const recipe = fc.array(fc.tuple(fc.constantFrom(...names), fc.nat(), fc.nat(), fc.nat()), {
  minLength: 1,
  maxLength: 40,
});

function build(graph: Graph, steps: readonly (readonly [Operation, number, number, number])[]): Node[] {
  const pool = [
    ...Array.from({ length: inputCount }, (_, i) => graph.column(i)),
    ...uniforms.map((_, i) => graph.uniform(i)),
    graph.constant(0.7),
    graph.constant(0),
    graph.constant(1),
  ];
  for (const [operation, ...choices] of steps) {
    const operands = choices.slice(0, operations[operation].arity).map((choice) => pool[choice % pool.length]!);
    pool.push(graph.apply(operation, ...operands));
  }
  return pool;
}

/** The value of a node by plain recursion: no compiler, no columns, no reuse. */
function evaluate(graph: Graph, node: Node, inputs: readonly number[]): number {
  const entry = graph.entries[node]!;
  if (entry.kind === 'constant') return entry.value;
  if (entry.kind === 'uniform') return uniforms[entry.index]!;
  if (entry.kind === 'column') return inputs[entry.column]!;
  const [a = 0, b = 0, c = 0] = entry.operands.map((operand) => evaluate(graph, operand, inputs));
  return applyScalar(entry.operation, a, b, c);
}

function run(
  makeInterpreter: InterpreterMaker,
  graph: Graph,
  outputs: readonly Output[],
): { before: Float64Array; after: Float64Array } {
  const program = compile(graph, outputs, uniforms.length, scratch);
  const interpreter = makeInterpreter({
    columnCount: program.columnCount,
    programs: [program],
    numberCount: 2 * inputCount,
  });
  const loaded = interpreter.programs[0]!;
  loaded.uniforms.set(uniforms);
  interpreter.drawNormals(plainKeys(inputCount, 7), 0, 0, 0, 0, lanes);
  const before = interpreter.columns.slice();
  interpreter.run(loaded, lanes);
  return { before, after: interpreter.columns };
}

describe.each(interpreterKinds)('%s interpreter', (_, makeInterpreter) => {
  test('a compiled program computes what its graph means, bit for bit, outputs over inputs included', () => {
    fc.assert(
      fc.property(recipe, (steps) => {
        const graph = new Graph();
        const outputs = build(graph, steps)
          .slice(-12)
          .map((node, i) => ({ node, column: i < 2 ? i : 5 + i }));
        const { before, after } = run(makeInterpreter, graph, outputs);
        for (let lane = 0; lane < lanes; lane += 9) {
          const inputs = Array.from({ length: inputCount }, (_, i) => before[i * columnStride + lane]!);
          for (const { node, column } of outputs) {
            expect(after[column * columnStride + lane]).toBe(evaluate(graph, node, inputs));
          }
        }
      }),
      { numRuns: 300, seed: 20261201 },
    );
  });

  test('two outputs may trade places with the inputs they read', () => {
    const graph = new Graph();
    const [a, b] = [graph.column(0), graph.column(1)];
    const { before, after } = run(makeInterpreter, graph, [
      { node: b, column: 0 },
      { node: a, column: 1 },
    ]);
    expect(after[3]).toBe(before[columnStride + 3]);
    expect(after[columnStride + 3]).toBe(before[3]);
  });
});

test('equal parts are computed once and constants beforehand', () => {
  const graph = new Graph();
  const x = graph.column(0);
  const square = graph.multiply(x, x);
  const again = graph.multiply(graph.column(0), x);
  expect(again).toBe(square);
  const folded = graph.add(graph.constant(2), graph.multiply(graph.constant(3), graph.constant(4)));
  expect(graph.constantValue(folded)).toBe(14);
  const node = graph.add(square, graph.multiply(graph.apply('exponential', graph.uniform(0)), again));
  const program = compile(graph, [{ node, column: 4 }], 1, scratch);
  expect(program.laneCode.length / 5).toBe(3);
  expect(program.uniformCode.length / 5).toBe(1);
});
