import { type Operation, operations } from './operations.js';
import { instructionWidth, type Program } from './program.js';
import { scalarFunctions } from './scalar.js';

const functionOfCode = (Object.keys(operations) as Operation[]).map((operation) => scalarFunctions[operation]);

/**
 * Makes the function that brings a program's scalars up to date: what depends on no lane, computed once for a run.
 *
 * Run after run often has the same inputs, as the inner points of one date do; then there is nothing to do.
 *
 * @param scalars the program's own, inputs first; results are written among them
 */
export function uniformCodeOf({ uniformCode, uniformInputCount }: Program, scalars: Float64Array): () => void {
  if (uniformCode.length === 0) return () => {};
  const inputs = new Float64Array(uniformInputCount).fill(Number.NaN);
  let isStale = true;
  return () => {
    for (let i = 0; i < uniformInputCount; i++) {
      if (!Object.is(inputs[i], scalars[i])) {
        inputs[i] = scalars[i]!;
        isStale = true;
      }
    }
    if (!isStale) return;
    for (let i = 0; i < uniformCode.length; i += instructionWidth) {
      scalars[uniformCode[i + 1]!] = functionOfCode[uniformCode[i]!]!(
        scalars[uniformCode[i + 2]!]!,
        scalars[uniformCode[i + 3]!]!,
        scalars[uniformCode[i + 4]!]!,
      );
    }
    isStale = false;
  };
}
