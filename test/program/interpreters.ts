import type { InterpreterMaker } from '#built/program/interpreter.js';
import { createPlainInterpreter } from '#built/program/plain-interpreter.js';
import { wasmInterpreters } from '#built/program/wasm-interpreter.js';
import { loadKernels } from '#built/workers/machine.js';

/** Makes interpreters of the fast kind. */
export const createWasmInterpreter: InterpreterMaker = wasmInterpreters(loadKernels());

/** Both kinds by name, for `describe.each`. */
export const interpreterKinds: [string, InterpreterMaker][] = [
  ['plain', createPlainInterpreter],
  ['wasm', createWasmInterpreter],
];

/** Keys with low halves 0, 1, 2 … and one high half. */
export function plainKeys(count: number, high: number): Int32Array {
  return Int32Array.from({ length: 2 * count }, (_, i) => (i % 2 === 0 ? i / 2 : high));
}
