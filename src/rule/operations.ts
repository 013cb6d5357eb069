import { instructionWidth, type Program } from '../program/program.js';
import { sweepsPerDate } from './backward-induction.js';
import type { Programs } from './programs.js';

/** A normal draw in operations of programs: about as long as so many of them. */
const drawOperations = 16;

/**
 * Operations that move one path by one date and value it: counted, so that what they decide is the same on every machine.
 *
 * @unit operations of one lane; very roughly half a nanosecond each
 */
export function stepOperations(programs: Programs): number {
  return evaluationOperations(programs) + programs.columns.length;
}

/**
 * Operations of a fit.
 *
 * @param workFactor how often the average step of a path is simulated
 */
export function fitOperations(programs: Programs, pathCount: number, workFactor: number): number {
  const { columns, drivers, integrandColumnCount, polynomialNames, step, times } = programs;
  const columnCount = columns.length;
  const simulation = workFactor * (drivers.length * drawOperations + operationsOf(step));
  const integrands = 2 * integrandColumnCount * polynomialNames.length;
  const sweep = evaluationOperations(programs) + 2 * columnCount + integrands;
  const gram = (columnCount * columnCount) / 4;
  return pathCount * (times.length - 1) * (simulation + sweepsPerDate(programs) * sweep + gram);
}

function evaluationOperations({ drivers, step, evaluate, polynomials, polynomialNames }: Programs): number {
  const programs = operationsOf(step) + operationsOf(evaluate) + operationsOf(polynomials);
  return programs + drivers.length * drawOperations + polynomialNames.length;
}

function operationsOf({ laneCode }: Program): number {
  return laneCode.length / instructionWidth;
}
