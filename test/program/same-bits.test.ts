/**
 * The fast interpreter against the plain one, bit for bit, on whole programs. Not-a-number equals not-a-number, 0 and -0
 * differ.
 */
import fc from 'fast-check';
import { expect, test } from 'vitest';
import { compile } from '#built/program/compile.js';
import { Graph } from '#built/program/graph.js';
import { type Operation, operations } from '#built/program/operations.js';
import { blockLanes, columnStride, instructionWidth, type Program } from '#built/program/program.js';
import { interpreterKinds } from './interpreters.js';
import { firstDifference, specialValues, TestNumbers } from './special-numbers.js';

const names = Object.keys(operations) as Operation[];

/**
 * Runs programs one after the other on the same columns with both interpreters; the lanes in use, column by column, and
 * the whole of the columns that are no program's target.
 */
function runBoth(
  programs: readonly Program[],
  columnCount: number,
  lanes: number,
  numbers: TestNumbers,
  next = () => numbers.mixed(),
) {
  const start = numbers.fill(new Float64Array(columnCount * columnStride), next);
  const uniforms = programs.map(({ uniformInputCount }) => numbers.fill(new Float64Array(uniformInputCount), next));
  const targets = new Set(programs.flatMap(targetsOf));
  return interpreterKinds.map(([, makeInterpreter]) => {
    const interpreter = makeInterpreter({ columnCount, programs, numberCount: 0 });
    interpreter.columns.set(start);
    interpreter.programs.forEach((loaded, i) => {
      loaded.uniforms.set(uniforms[i]!);
      interpreter.run(loaded, lanes);
    });
    return Array.from({ length: columnCount }, (_, column) =>
      interpreter.columns.subarray(
        column * columnStride,
        column * columnStride + (targets.has(column) ? lanes : columnStride),
      ),
    );
  }) as [Float64Array[], Float64Array[]];
}

function targetsOf({ laneCode }: Program): number[] {
  return [...laneCode].filter((_, i) => i % instructionWidth === 1);
}

function differenceOf([plain, fast]: readonly [Float64Array[], Float64Array[]]): string | null {
  for (const [column, values] of plain.entries()) {
    const difference = firstDifference(values, fast[column]!);
    if (difference !== null) return `column ${column}, lane ${difference}`;
  }
  return null;
}

const lanesArbitrary = fc.oneof(fc.integer({ min: 1, max: blockLanes }), fc.constantFrom(1, 2, 7, 8, 9, 511, 512));

const columnCount = 7;
const uniformCount = 3;

const stepArbitrary = fc.record({
  operation: fc.constantFrom(...names),
  target: fc.nat(columnCount - 1),
  // Columns and scalars in any position, whether the operation reads it or not.
  operands: fc.tuple(
    ...Array.from({ length: 3 }, () => fc.oneof(fc.nat(columnCount - 1), fc.integer({ min: -100, max: -1 }))),
  ),
});
type Step = typeof stepArbitrary extends fc.Arbitrary<infer T> ? T : never;

const programArbitrary = fc
  .record({
    constants: fc.array(fc.oneof(fc.constantFrom(...specialValues), fc.double()), { maxLength: 4 }),
    uniformSteps: fc.array(stepArbitrary, { maxLength: 4 }),
    laneSteps: fc.array(stepArbitrary, { minLength: 1, maxLength: 20 }),
  })
  .map(({ constants, uniformSteps, laneSteps }): Program => {
    const known = uniformCount + constants.length;
    const scalarCount = known + uniformSteps.length;
    const scalarOf = (operand: number, count: number) => Math.abs(operand) % count;
    return {
      name: 'random',
      scalars: Float64Array.from({ length: scalarCount }, (_, i) => constants[i - uniformCount] ?? 0),
      uniformInputCount: uniformCount,
      uniformCode: Int32Array.from(
        uniformSteps.flatMap(({ operation, operands }: Step, i) => [
          operations[operation].code,
          known + i,
          ...operands.map((operand) => scalarOf(operand, known + i)),
        ]),
      ),
      laneCode: Int32Array.from(
        laneSteps.flatMap(({ operation, target, operands }: Step) => [
          operations[operation].code,
          target,
          ...operands.map((operand) => (operand >= 0 ? operand : -1 - scalarOf(operand, scalarCount))),
        ]),
      ),
      columnCount,
    };
  });

test('random programs written by hand, two in one room: scalars in any place, targets over operands, any lane count', () => {
  fc.assert(
    fc.property(programArbitrary, programArbitrary, lanesArbitrary, fc.integer(), (first, second, lanes, seed) => {
      const both = runBoth([first, second], columnCount, lanes, new TestNumbers(seed));
      expect(differenceOf(both)).toBeNull();
    }),
    { numRuns: 1500, seed: 20261202 },
  );
});

test('random programs as the compiler writes them, outputs over inputs included', () => {
  const recipe = fc.array(fc.tuple(fc.constantFrom(...names), fc.nat(), fc.nat(), fc.nat()), {
    minLength: 1,
    maxLength: 40,
  });
  fc.assert(
    fc.property(recipe, lanesArbitrary, fc.integer(), (steps, lanes, seed) => {
      const graph = new Graph();
      const pool = [
        ...[0, 1, 2].map((column) => graph.column(column)),
        ...[0, 1, 2].map((index) => graph.uniform(index)),
        ...[0.7, 0, -0, 1, Number.POSITIVE_INFINITY].map((value) => graph.constant(value)),
      ];
      for (const [operation, ...choices] of steps) {
        const operands = choices.slice(0, operations[operation].arity).map((choice) => pool[choice % pool.length]!);
        pool.push(graph.apply(operation, ...operands));
      }
      const outputs = pool.slice(-6).map((node, column) => ({ node, column }));
      const program = compile(graph, outputs, 3, 8);
      expect(differenceOf(runBoth([program], program.columnCount, lanes, new TestNumbers(seed)))).toBeNull();
    }),
    { numRuns: 500, seed: 20261203 },
  );
});

/** One instruction for every choice of column or scalar in each operand, from columns 0 … 2 to those after. */
function everyShape(operation: Operation): Program {
  const { code, arity } = operations[operation];
  const shapes = Array.from({ length: 2 ** arity }, (_, bits) => bits);
  const operand = (bits: number, position: number) => ((bits >> position) & 1 ? -1 - position : position);
  return {
    name: operation,
    scalars: new Float64Array(3),
    uniformInputCount: 3,
    uniformCode: new Int32Array(0),
    laneCode: Int32Array.from(
      shapes.flatMap((bits) => [code, 3 + bits, ...[0, 1, 2].map((position) => operand(bits, position))]),
    ),
    columnCount: 3 + shapes.length,
  };
}

test.each(names)(
  '%s on tens of thousands of values, special and random, columns and scalars in every place',
  (name) => {
    const program = everyShape(name);
    const numbers = new TestNumbers(operations[name].code);
    // The second is for whole vectors that take the common case of a logarithm or a power.
    for (const next of [() => numbers.mixed(), () => Math.abs(numbers.ordinary())]) {
      for (let round = 0; round < 40; round++) {
        const both = runBoth([program], program.columnCount, blockLanes, numbers, next);
        expect(differenceOf(both)).toBeNull();
      }
    }
  },
);

test.each(names.filter((name) => operations[name].arity > 1))('%s on every pair of special values', (name) => {
  const pairs = specialValues.flatMap((a) => specialValues.map((b) => [a, b] as const));
  const program = everyShape(name);
  const [plain, fast] = interpreterKinds.map(([, makeInterpreter]) =>
    makeInterpreter({ columnCount: program.columnCount, programs: [program], numberCount: 0 }),
  );
  for (let first = 0; first < pairs.length; first += blockLanes) {
    const chunk = pairs.slice(first, first + blockLanes);
    for (const interpreter of [plain!, fast!]) {
      chunk.forEach(([a, b], lane) => {
        interpreter.columns[lane] = a;
        interpreter.columns[columnStride + lane] = b;
        interpreter.columns[2 * columnStride + lane] = -a;
      });
      interpreter.run(interpreter.programs[0]!, chunk.length);
    }
    const target = (columns: Float64Array) => columns.subarray(3 * columnStride, 3 * columnStride + chunk.length);
    expect(firstDifference(target(plain!.columns), target(fast!.columns))).toBeNull();
  }
});

test('control: one last bit, a lost sign of zero or a vanished not-a-number is seen', () => {
  const [plain, fast] = runBoth([everyShape('exponential')], 5, 100, new TestNumbers(1));
  expect(differenceOf([plain, fast])).toBeNull();
  fast[3]!.set([1, 0, 3], 40);
  plain[3]!.set([1, 0, 3], 40);
  expect(differenceOf([plain, fast])).toBeNull();
  for (const [lane, value] of [
    [40, 1 + 2 ** -52],
    [41, -0],
    [42, Number.NaN],
  ] as const) {
    const held = fast[3]![lane]!;
    fast[3]![lane] = value;
    expect(differenceOf([plain, fast])).toMatch(`column 3, lane at ${lane}`);
    fast[3]![lane] = held;
  }
});
