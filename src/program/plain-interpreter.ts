import type { Moments } from '../numeric/moments.js';
import { exp, log, normalCumulative, normalQuantile, power } from './elementary.js';
import type { Interpreter, LoadedProgram, Room } from './interpreter.js';
import { latticeUniform } from './lattice-uniform.js';
import { operations } from './operations.js';
import { columnStride, instructionWidth, type Program } from './program.js';
import { equal, less, lessOrEqual, maximum, minimum, select } from './scalar.js';
import { drawUniforms as drawStream } from './stream.js';
import { uniformCodeOf } from './uniform-code.js';

interface PlainProgram extends LoadedProgram {
  readonly computeUniforms: () => void;
  /** Operands as offsets into the memory, each with the stride 1 (column) or 0 (scalar). */
  readonly laneCode: Int32Array;
}

const plainWidth = 8;

/**
 * The readable interpreter, the reference for the other: plain loops over the lanes of one column after the other.
 *
 * Scalars live in the same memory as the columns, so that one loop with a stride of 0 or 1 serves both.
 */
export function createPlainInterpreter({ columnCount, programs }: Room): Interpreter {
  const columnsLength = columnCount * columnStride;
  const scalarCount = programs.reduce((total, program) => total + program.scalars.length, 0);
  const memory = new Float64Array(columnsLength + scalarCount);
  let scalarsEnd = columnsLength;
  const startOf = (column: number) => column * columnStride;
  return {
    columns: memory.subarray(0, columnsLength),

    programs: programs.map((program) => {
      const scalarsOffset = scalarsEnd;
      scalarsEnd += program.scalars.length;
      memory.set(program.scalars, scalarsOffset);
      return prepare(program, memory, scalarsOffset);
    }),

    run(loaded, lanes) {
      const { computeUniforms, laneCode } = loaded as PlainProgram;
      computeUniforms();
      for (let i = 0; i < laneCode.length; i += plainWidth) runInstruction(memory, laneCode.subarray(i), lanes);
    },

    copy(fromColumn, toColumn, count) {
      memory.copyWithin(startOf(toColumn), startOf(fromColumn), startOf(fromColumn + count));
    },

    drawUniforms(keys, block, date, replicate, firstColumn, lanes) {
      for (let i = 0; 2 * i < keys.length; i++) {
        const key = { low: keys[2 * i]!, high: keys[2 * i + 1]! };
        drawStream(key, block, date, replicate, memory, startOf(firstColumn + i), lanes);
      }
    },

    drawNormals(keys, block, date, replicate, firstColumn, lanes) {
      this.drawUniforms(keys, block, date, replicate, firstColumn, lanes);
      for (let i = 0; 2 * i < keys.length; i++) {
        const start = startOf(firstColumn + i);
        for (let at = start; at < start + lanes; at++) memory[at] = normalQuantile(memory[at]!);
      }
    },

    latticeNormals(firstShift, offsets, firstColumn, lanes) {
      offsets.forEach((offset, i) => {
        const shifts = startOf(firstShift + i);
        const out = startOf(firstColumn + i);
        for (let lane = 0; lane < lanes; lane++)
          memory[out + lane] = normalQuantile(latticeUniform(memory[shifts + lane]!, offset));
      });
    },

    combine(firstColumn, count, coefficients, offset, firstTarget, targetCount, lanes) {
      for (let target = 0; target < targetCount; target++) {
        const out = startOf(firstTarget + target);
        memory.fill(0, out, out + lanes);
        for (let k = 0; k < count; k++) {
          const from = startOf(firstColumn + k);
          const coefficient = coefficients[offset + target * count + k]!;
          for (let lane = 0; lane < lanes; lane++)
            memory[out + lane] = memory[out + lane]! + coefficient * memory[from + lane]!;
        }
      }
    },

    addProducts(firstLeft, firstRight, count, sign, target, lanes) {
      const out = startOf(target);
      for (let k = 0; k < count; k++) {
        const left = startOf(firstLeft + k);
        const right = startOf(firstRight + k);
        for (let lane = 0; lane < lanes; lane++)
          memory[out + lane] = memory[out + lane]! + sign * (memory[left + lane]! * memory[right + lane]!);
      }
    },

    accumulateGram(firstColumn, count, lanes, sums) {
      let position = 0;
      for (let row = 0; row < count; row++) {
        for (let column = 0; column <= row; column++, position++) {
          const sum = dot(memory, startOf(firstColumn + row), startOf(firstColumn + column), lanes);
          sums[position] = sums[position]! + sum;
        }
      }
    },

    accumulateProducts(firstColumn, count, firstResponse, responseCount, lanes, sums) {
      let position = 0;
      for (let response = 0; response < responseCount; response++) {
        for (let column = 0; column < count; column++, position++) {
          const sum = dot(memory, startOf(firstResponse + response), startOf(firstColumn + column), lanes);
          sums[position] = sums[position]! + sum;
        }
      }
    },

    sum: (column, lanes) => sumOf(memory, startOf(column), lanes, 0, false),

    moments(column, lanes): Moments {
      const mean = sumOf(memory, startOf(column), lanes, 0, false) / lanes;
      return { count: lanes, mean, squares: sumOf(memory, startOf(column), lanes, mean, true) };
    },

    areBetween(firstColumn, count, lowest, lanes) {
      for (let column = firstColumn; column < firstColumn + count; column++) {
        const start = startOf(column);
        for (let at = start; at < start + lanes; at++)
          if (!(memory[at]! > lowest && memory[at]! < Number.POSITIVE_INFINITY)) return false;
      }
      return true;
    },
  };
}

function prepare(program: Program, memory: Float64Array, scalarsOffset: number): PlainProgram {
  const scalars = memory.subarray(scalarsOffset, scalarsOffset + program.scalars.length);
  const instructionCount = program.laneCode.length / instructionWidth;
  const laneCode = new Int32Array(instructionCount * plainWidth);
  for (let i = 0; i < instructionCount; i++) {
    const [code, target, ...operands] = program.laneCode.subarray(i * instructionWidth, (i + 1) * instructionWidth);
    laneCode[i * plainWidth] = code!;
    laneCode[i * plainWidth + 1] = target! * columnStride;
    operands.forEach((operand, position) => {
      laneCode[i * plainWidth + 2 + position] = operand >= 0 ? operand * columnStride : scalarsOffset - 1 - operand;
      laneCode[i * plainWidth + 5 + position] = operand >= 0 ? 1 : 0;
    });
  }
  return {
    name: program.name,
    uniforms: scalars.subarray(0, program.uniformInputCount),
    computeUniforms: uniformCodeOf(program, scalars),
    laneCode,
  };
}

function runInstruction(m: Float64Array, instruction: Int32Array, lanes: number): void {
  const [code, out, a, b, c, aStride, bStride, cStride] = instruction as unknown as PlainInstruction;
  switch (code) {
    case operations.copy.code:
      for (let i = 0; i < lanes; i++) m[out + i] = m[a + i * aStride]!;
      break;
    case operations.add.code:
      for (let i = 0; i < lanes; i++) m[out + i] = m[a + i * aStride]! + m[b + i * bStride]!;
      break;
    case operations.subtract.code:
      for (let i = 0; i < lanes; i++) m[out + i] = m[a + i * aStride]! - m[b + i * bStride]!;
      break;
    case operations.multiply.code:
      for (let i = 0; i < lanes; i++) m[out + i] = m[a + i * aStride]! * m[b + i * bStride]!;
      break;
    case operations.divide.code:
      for (let i = 0; i < lanes; i++) m[out + i] = m[a + i * aStride]! / m[b + i * bStride]!;
      break;
    case operations.minimum.code:
      for (let i = 0; i < lanes; i++) m[out + i] = minimum(m[a + i * aStride]!, m[b + i * bStride]!);
      break;
    case operations.maximum.code:
      for (let i = 0; i < lanes; i++) m[out + i] = maximum(m[a + i * aStride]!, m[b + i * bStride]!);
      break;
    case operations.power.code:
      for (let i = 0; i < lanes; i++) m[out + i] = power(m[a + i * aStride]!, m[b + i * bStride]!);
      break;
    case operations.negate.code:
      for (let i = 0; i < lanes; i++) m[out + i] = -m[a + i * aStride]!;
      break;
    case operations.absolute.code:
      for (let i = 0; i < lanes; i++) m[out + i] = Math.abs(m[a + i * aStride]!);
      break;
    case operations.squareRoot.code:
      for (let i = 0; i < lanes; i++) m[out + i] = Math.sqrt(m[a + i * aStride]!);
      break;
    case operations.exponential.code:
      for (let i = 0; i < lanes; i++) m[out + i] = exp(m[a + i * aStride]!);
      break;
    case operations.logarithm.code:
      for (let i = 0; i < lanes; i++) m[out + i] = log(m[a + i * aStride]!);
      break;
    case operations.floor.code:
      for (let i = 0; i < lanes; i++) m[out + i] = Math.floor(m[a + i * aStride]!);
      break;
    case operations.normalCumulative.code:
      for (let i = 0; i < lanes; i++) m[out + i] = normalCumulative(m[a + i * aStride]!);
      break;
    case operations.less.code:
      for (let i = 0; i < lanes; i++) m[out + i] = less(m[a + i * aStride]!, m[b + i * bStride]!);
      break;
    case operations.lessOrEqual.code:
      for (let i = 0; i < lanes; i++) m[out + i] = lessOrEqual(m[a + i * aStride]!, m[b + i * bStride]!);
      break;
    case operations.equal.code:
      for (let i = 0; i < lanes; i++) m[out + i] = equal(m[a + i * aStride]!, m[b + i * bStride]!);
      break;
    case operations.select.code:
      for (let i = 0; i < lanes; i++) {
        m[out + i] = select(m[a + i * aStride]!, m[b + i * bStride]!, m[c + i * cStride]!);
      }
      break;
    default:
      throw new Error(`no instruction has code ${code}`);
  }
}

type PlainInstruction = [number, number, number, number, number, number, number, number];

/** Sum of products of two columns: of the even lanes plus of the odd lanes. */
function dot(m: Float64Array, a: number, b: number, lanes: number): number {
  let even = 0;
  let odd = 0;
  for (let i = 0; i < lanes; i += 2) even += m[a + i]! * m[b + i]!;
  for (let i = 1; i < lanes; i += 2) odd += m[a + i]! * m[b + i]!;
  return even + odd;
}

/** Sum of the distances from a center, or of their squares, in the same order. */
function sumOf(m: Float64Array, start: number, lanes: number, center: number, isSquared: boolean): number {
  const sums = [0, 0];
  for (let lane = 0; lane < lanes; lane++) {
    const distance = m[start + lane]! - center;
    sums[lane % 2]! += isSquared ? distance * distance : distance;
  }
  return sums[0]! + sums[1]!;
}
