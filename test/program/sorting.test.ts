import { describe, expect, test } from 'vitest';
import { compile } from '#built/program/compile.js';
import { Graph } from '#built/program/graph.js';
import { blockLanes, columnStride } from '#built/program/program.js';
import { sortCompanions, sortFalling, sortingNetwork } from '#built/program/sorting.js';
import { interpreterKinds, plainKeys } from './interpreters.js';

// The zero-one principle (Knuth, The Art of Computer Programming 3, theorem 5.3.4Z): enough to sort zeros and ones.
test.each(Array.from({ length: 12 }, (_, i) => i + 1))(
  'the network for %i values sorts every row of zeros and ones',
  (count) => {
    const network = sortingNetwork(count);
    for (let bits = 0; bits < 2 ** count; bits++) {
      const values = Array.from({ length: count }, (_, i) => (bits >> i) & 1);
      for (const [high, low] of network)
        if (values[high]! < values[low]!) [values[high], values[low]] = [values[low]!, values[high]!];
      expect(values).toEqual([...values].sort((a, b) => b - a));
    }
  },
);

describe.each(interpreterKinds)('%s interpreter', (_, makeInterpreter) => {
  test('companions go where their keys go', () => {
    const graph = new Graph();
    const count = 7;
    const keys = Array.from({ length: count }, (_, i) => graph.column(i));
    const companions = Array.from({ length: count }, (_, i) => graph.column(count + i));
    const nodes = [...sortFalling(graph, keys), ...sortCompanions(graph, keys, companions)];
    const program = compile(
      graph,
      nodes.map((node, i) => ({ node, column: 2 * count + i })),
      0,
      4 * count,
    );
    const interpreter = makeInterpreter({
      columnCount: program.columnCount,
      programs: [program],
      numberCount: 4 * count,
    });
    interpreter.drawNormals(plainKeys(2 * count, 3), 0, 0, 0, 0, blockLanes);
    interpreter.run(interpreter.programs[0]!, blockLanes);
    const at = (column: number, lane: number) => interpreter.columns[column * columnStride + lane]!;
    for (let lane = 0; lane < blockLanes; lane++) {
      const order = keys.map((_, i) => i).sort((a, b) => at(b, lane) - at(a, lane));
      order.forEach((member, rank) => {
        expect(at(2 * count + rank, lane)).toBe(at(member, lane));
        expect(at(3 * count + rank, lane)).toBe(at(count + member, lane));
      });
    }
  });
});

test('asking for the largest alone compiles one comparison less than there are values', () => {
  const graph = new Graph();
  const keys = Array.from({ length: 50 }, (_, i) => graph.column(i));
  const program = compile(graph, [{ node: sortFalling(graph, keys)[0]!, column: 60 }], 0, 70);
  expect(program.laneCode.length / 5).toBe(49);
});
