import type { Interpreter, InterpreterMaker, LoadedProgram, Room } from './interpreter.js';
import { operations } from './operations.js';
import { columnStride, instructionWidth, type Program } from './program.js';
import { uniformCodeOf } from './uniform-code.js';
import { type CompiledKernels, instantiate, type KernelMemory } from './wasm-module.js';

const columnBytes = columnStride * 8;
const pageBytes = 65_536;
const cacheLineBytes = 64;

/** Lanes that the kernels' loops take at a time: they may write that many beyond the last, still inside the column. */
const lanesAtOnce = 8;

/** Columns that sums over tiles of columns may read beyond the last; what they find there does not matter. */
const slackColumnCount = 4;

/** Columns that the kernels use for themselves: uniforms, or scalars that an instruction wants as columns. */
const spareColumnCount = 3;

/** Integers of one instruction: code, target, three operands as addresses, and which of them are scalars. */
const wasmWidth = 6;

interface WasmProgram extends LoadedProgram {
  readonly computeUniforms: () => void;
  readonly codeStart: number;
  readonly codeEnd: number;
}

/** Operands of each operation, by its code. */
const arities: readonly number[] = Object.values(operations).map(({ arity }) => arity);

/** Makes the fast interpreters: the kernels of `kernels/`, compiled to WebAssembly with vectors of two doubles. */
export function wasmInterpreters(compiled: CompiledKernels): InterpreterMaker {
  return (room) => createWasmInterpreter(compiled, room);
}

/**
 * One interpreter with a memory of its own: kernels' data, spare columns, numbers on their way in or out, the workspace,
 * then scalars and code of the programs.
 */
function createWasmInterpreter(compiled: CompiledKernels, room: Room): Interpreter {
  const { kernels, memory } = instantiate(compiled);
  const spare = upTo(cacheLineBytes, kernels.dataEnd.value);
  const numbersStart = spare + spareColumnCount * columnBytes;
  const columnsStart = upTo(cacheLineBytes, numbersStart + room.numberCount * 8);
  const programsStart = columnsStart + room.columnCount * columnBytes;
  const end = room.programs.reduce((total, program) => total + programBytes(program), programsStart);
  grow(memory, end + slackColumnCount * columnBytes);
  const numbers = new Float64Array(memory.buffer, numbersStart, room.numberCount);
  const halfKeys = new Int32Array(memory.buffer, numbersStart, room.numberCount * 2);
  const columns = new Float64Array(memory.buffer, columnsStart, room.columnCount * columnStride);
  const addressOf = (column: number) => columnsStart + column * columnBytes;
  const lengthOf = (lanes: number) => upTo(lanesAtOnce, lanes) * 8;
  const needRoomFor = (count: number) => {
    if (count > room.numberCount) throw new Error(`the room holds ${room.numberCount} numbers, ${count} are needed`);
  };
  const accumulate = (sums: Float64Array) => {
    for (let i = 0; i < sums.length; i++) sums[i] = sums[i]! + numbers[i]!;
  };
  let programEnd = programsStart;
  return {
    columns,

    programs: room.programs.map((program) => {
      const start = programEnd;
      programEnd += programBytes(program);
      return prepare(program, memory, start, columnsStart);
    }),

    run(loaded, lanes) {
      const { computeUniforms, codeStart, codeEnd } = loaded as WasmProgram;
      computeUniforms();
      kernels.runInstructions(codeStart, codeEnd, spare, lengthOf(lanes));
    },

    copy(fromColumn, toColumn, count) {
      columns.copyWithin(toColumn * columnStride, fromColumn * columnStride, (fromColumn + count) * columnStride);
    },

    drawNormals(keys, block, date, replicate, firstColumn, lanes) {
      halfKeys.set(keys);
      const to = addressOf(firstColumn);
      kernels.drawNormals(numbersStart, keys.length / 2, block, date, replicate, spare, to, lengthOf(lanes));
    },

    drawUniforms(keys, block, date, replicate, firstColumn, lanes) {
      halfKeys.set(keys);
      const to = addressOf(firstColumn);
      kernels.drawUniformColumns(numbersStart, keys.length / 2, block, date, replicate, to, lengthOf(lanes));
    },

    latticeNormals(firstShift, offsets, firstColumn, lanes) {
      numbers.set(offsets);
      const [shifts, to] = [addressOf(firstShift), addressOf(firstColumn)];
      kernels.latticeNormals(shifts, numbersStart, offsets.length, spare, to, lengthOf(lanes));
    },

    combine(firstColumn, count, coefficients, offset, firstTarget, targetCount, lanes) {
      numbers.set(coefficients.subarray(offset, offset + count * targetCount));
      const [from, to] = [addressOf(firstColumn), addressOf(firstTarget)];
      kernels.combine(from, count, numbersStart, to, targetCount, lengthOf(lanes));
    },

    addProducts(firstLeft, firstRight, count, sign, target, lanes) {
      const [left, right, to] = [addressOf(firstLeft), addressOf(firstRight), addressOf(target)];
      kernels.addProducts(left, right, count, sign < 0 ? 1 : 0, to, lengthOf(lanes));
    },

    accumulateGram(firstColumn, count, lanes, sums) {
      needRoomFor(sums.length);
      const from = addressOf(firstColumn);
      kernels.sumProducts(from, count, from, count, 1, lanes, numbersStart);
      accumulate(sums);
    },

    accumulateProducts(firstColumn, count, firstResponse, responseCount, lanes, sums) {
      needRoomFor(sums.length);
      const [from, responses] = [addressOf(firstColumn), addressOf(firstResponse)];
      kernels.sumProducts(from, count, responses, responseCount, 0, lanes, numbersStart);
      accumulate(sums);
    },

    sum: (column, lanes) => kernels.sumColumn(addressOf(column), lanes),

    moments(column, lanes) {
      const mean = kernels.sumColumn(addressOf(column), lanes) / lanes;
      return { count: lanes, mean, squares: kernels.sumSquares(addressOf(column), lanes, mean) };
    },

    areBetween: (firstColumn, count, lowest, lanes) =>
      kernels.areBetween(addressOf(firstColumn), count, lowest, lanes) !== 0,
  };
}

function upTo(multiple: number, count: number): number {
  return Math.ceil(count / multiple) * multiple;
}

function grow(memory: KernelMemory, bytes: number): void {
  const missing = bytes - memory.buffer.byteLength;
  if (missing > 0) memory.grow(Math.ceil(missing / pageBytes));
}

function programBytes(program: Program): number {
  const instructionCount = program.laneCode.length / instructionWidth;
  return upTo(8, program.scalars.length * 8 + instructionCount * wasmWidth * 4);
}

/** Writes scalars and code of a program, the scalars first, from an address on. */
function prepare(program: Program, memory: KernelMemory, start: number, columnsStart: number): WasmProgram {
  const scalars = new Float64Array(memory.buffer, start, program.scalars.length);
  scalars.set(program.scalars);
  const codeStart = start + scalars.byteLength;
  const instructionCount = program.laneCode.length / instructionWidth;
  const code = new Uint32Array(memory.buffer, codeStart, instructionCount * wasmWidth);
  for (let i = 0; i < instructionCount; i++) {
    const [operation, target, ...operands] = program.laneCode.subarray(
      i * instructionWidth,
      (i + 1) * instructionWidth,
    );
    const addresses = operands.map((operand) =>
      operand >= 0 ? columnsStart + operand * columnBytes : start + (-1 - operand) * 8,
    );
    const isScalar = operands
      .slice(0, arities[operation!])
      .reduce((bits, operand, position) => bits | (operand < 0 ? 1 << position : 0), 0);
    code.set([operation!, columnsStart + target! * columnBytes, ...addresses, isScalar], i * wasmWidth);
  }
  return {
    name: program.name,
    uniforms: scalars.subarray(0, program.uniformInputCount),
    computeUniforms: uniformCodeOf(program, scalars),
    codeStart,
    codeEnd: codeStart + code.byteLength,
  };
}
