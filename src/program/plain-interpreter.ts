import { exp, log, normalCumulative, normalQuantile, power } from './elementary.js';
import type { Interpreter, LoadedProgram } from './interpreter.js';
import { type Operation, operations } from './operations.js';
import { blockLanes, instructionWidth, type Program } from './program.js';
import { applyScalar, equal, less, lessOrEqual, select } from './scalar.js';
import { drawUniforms, type StreamKey } from './stream.js';

const operationOfCode = Object.keys(operations) as Operation[];

interface PlainProgram extends LoadedProgram {
  readonly scalars: Float64Array;
  readonly uniformCode: Int32Array;
  /** Operands as offsets into the memory, each with the stride 1 (column) or 0 (scalar). */
  readonly laneCode: Int32Array;
  readonly scalarsOffset: number;
}

const plainWidth = 8;

/**
 * The readable interpreter: plain loops over the lanes of one column after the other.
 *
 * Scalars live in the same memory as the columns, so that one loop with a stride of 0 or 1 serves both.
 *
 * @param scalarCount room for the scalars of all programs that will be loaded
 */
export function createPlainInterpreter(columnCount: number, scalarCount: number): Interpreter {
  const columnsLength = columnCount * blockLanes;
  const memory = new Float64Array(columnsLength + scalarCount);
  let scalarsEnd = columnsLength;
  const interpreter = {
    columns: memory.subarray(0, columnsLength),

    load(program: Program): LoadedProgram {
      if (program.columnCount > columnCount)
        throw new Error(`the workspace has ${columnCount} columns, the program needs ${program.columnCount}`);
      const scalarsOffset = scalarsEnd;
      scalarsEnd += program.scalars.length;
      if (scalarsEnd > memory.length) throw new Error('the workspace has no room for the scalars of another program');
      memory.set(program.scalars, scalarsOffset);
      return prepare(program, memory, scalarsOffset);
    },

    run(loaded: LoadedProgram, lanes: number): void {
      runProgram(loaded as PlainProgram, memory, lanes);
    },

    copy(fromColumn: number, toColumn: number, count: number): void {
      memory.copyWithin(toColumn * blockLanes, fromColumn * blockLanes, (fromColumn + count) * blockLanes);
    },

    drawNormals(key: StreamKey, block: number, date: number, replicate: number, column: number, lanes: number): void {
      const start = column * blockLanes;
      drawUniforms(key, block, date, replicate, memory, start, lanes);
      for (let i = start; i < start + lanes; i++) memory[i] = normalQuantile(memory[i]!);
    },

    combine(
      firstColumn: number,
      count: number,
      coefficients: Float64Array,
      offset: number,
      target: number,
      lanes: number,
    ): void {
      const out = target * blockLanes;
      memory.fill(0, out, out + lanes);
      for (let k = 0; k < count; k++) {
        const from = (firstColumn + k) * blockLanes;
        const coefficient = coefficients[offset + k]!;
        if (coefficient === 0) continue;
        for (let lane = 0; lane < lanes; lane++)
          memory[out + lane] = memory[out + lane]! + coefficient * memory[from + lane]!;
      }
    },

    accumulateGram(firstColumn: number, count: number, lanes: number, target: Float64Array): void {
      let position = 0;
      for (let row = 0; row < count; row++) {
        for (let column = 0; column <= row; column++, position++) {
          target[position] =
            target[position]! +
            dot(memory, (firstColumn + row) * blockLanes, (firstColumn + column) * blockLanes, lanes);
        }
      }
    },

    accumulateProducts(
      firstColumn: number,
      count: number,
      firstResponse: number,
      responseCount: number,
      lanes: number,
      target: Float64Array,
    ): void {
      let position = 0;
      for (let response = 0; response < responseCount; response++) {
        for (let column = 0; column < count; column++, position++) {
          target[position] =
            target[position]! +
            dot(memory, (firstColumn + column) * blockLanes, (firstResponse + response) * blockLanes, lanes);
        }
      }
    },

    findNotFinite(firstColumn: number, count: number, lanes: number) {
      for (let column = firstColumn; column < firstColumn + count; column++) {
        const start = column * blockLanes;
        let sum = 0;
        for (let lane = 0; lane < lanes; lane++) sum += memory[start + lane]! * 0;
        if (sum !== 0) {
          for (let lane = 0; lane < lanes; lane++) if (!Number.isFinite(memory[start + lane]!)) return { column, lane };
        }
      }
      return null;
    },
  };
  return interpreter;
}

function prepare(program: Program, memory: Float64Array, scalarsOffset: number): PlainProgram {
  const scalars = memory.subarray(scalarsOffset, scalarsOffset + program.scalars.length);
  const instructionCount = program.laneCode.length / instructionWidth;
  const laneCode = new Int32Array(instructionCount * plainWidth);
  for (let i = 0; i < instructionCount; i++) {
    const [code, target, ...operands] = program.laneCode.subarray(i * instructionWidth, (i + 1) * instructionWidth);
    laneCode[i * plainWidth] = code!;
    laneCode[i * plainWidth + 1] = target! * blockLanes;
    operands.forEach((operand, position) => {
      laneCode[i * plainWidth + 2 + position] = operand >= 0 ? operand * blockLanes : scalarsOffset - 1 - operand;
      laneCode[i * plainWidth + 5 + position] = operand >= 0 ? 1 : 0;
    });
  }
  return {
    uniforms: scalars.subarray(0, program.uniformInputCount),
    scalars,
    uniformCode: program.uniformCode,
    laneCode,
    scalarsOffset,
  };
}

function runProgram(program: PlainProgram, m: Float64Array, lanes: number): void {
  const { scalars, uniformCode, laneCode } = program;
  for (let i = 0; i < uniformCode.length; i += instructionWidth) {
    scalars[uniformCode[i + 1]!] = applyScalar(
      operationOfCode[uniformCode[i]!]!,
      scalars[uniformCode[i + 2]!]!,
      scalars[uniformCode[i + 3]!]!,
      scalars[uniformCode[i + 4]!]!,
    );
  }
  for (let i = 0; i < laneCode.length; i += plainWidth) {
    const out = laneCode[i + 1]!;
    runInstruction(
      m,
      laneCode[i]!,
      out,
      laneCode[i + 2]!,
      laneCode[i + 3]!,
      laneCode[i + 4]!,
      laneCode[i + 5]!,
      laneCode[i + 6]!,
      laneCode[i + 7]!,
      lanes,
    );
  }
}

function runInstruction(
  m: Float64Array,
  code: number,
  out: number,
  a: number,
  b: number,
  c: number,
  aStride: number,
  bStride: number,
  cStride: number,
  lanes: number,
): void {
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
      for (let i = 0; i < lanes; i++) m[out + i] = Math.min(m[a + i * aStride]!, m[b + i * bStride]!);
      break;
    case operations.maximum.code:
      for (let i = 0; i < lanes; i++) m[out + i] = Math.max(m[a + i * aStride]!, m[b + i * bStride]!);
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

/** Sum of products of two columns in the fixed order of four running sums. */
function dot(m: Float64Array, a: number, b: number, lanes: number): number {
  let s0 = 0;
  let s1 = 0;
  let s2 = 0;
  let s3 = 0;
  const whole = lanes & ~3;
  for (let i = 0; i < whole; i += 4) {
    s0 += m[a + i]! * m[b + i]!;
    s1 += m[a + i + 1]! * m[b + i + 1]!;
    s2 += m[a + i + 2]! * m[b + i + 2]!;
    s3 += m[a + i + 3]! * m[b + i + 3]!;
  }
  if (whole < lanes) s0 += m[a + whole]! * m[b + whole]!;
  if (whole + 1 < lanes) s1 += m[a + whole + 1]! * m[b + whole + 1]!;
  if (whole + 2 < lanes) s2 += m[a + whole + 2]! * m[b + whole + 2]!;
  return s0 + s2 + (s1 + s3);
}
