/**
 * The edge to WebAssembly, with the few types of it that are used: the language's own type files come with a whole
 * browser.
 */

/** The compiled kernels; a plain value to everyone but this file, and one that can be sent to worker threads. */
export type CompiledKernels = object;

/** The memory that kernels work in. */
export interface KernelMemory {
  readonly buffer: ArrayBuffer;
  grow(pageCount: number): number;
}

/** The functions of `kernels/kernels.ts`; addresses and lengths in bytes, booleans as 0 and 1. */
export interface Kernels {
  readonly dataEnd: { readonly value: number };
  runInstructions(code: number, codeEnd: number, spare: number, length: number): void;
  drawNormals(
    keys: number,
    count: number,
    block: number,
    date: number,
    replicate: number,
    spare: number,
    to: number,
    length: number,
  ): void;
  drawUniformColumns(
    keys: number,
    count: number,
    block: number,
    date: number,
    replicate: number,
    to: number,
    length: number,
  ): void;
  latticeNormals(shifts: number, offsets: number, count: number, spare: number, to: number, length: number): void;
  combine(
    columns: number,
    count: number,
    coefficients: number,
    targets: number,
    targetCount: number,
    length: number,
  ): void;
  addProducts(left: number, right: number, count: number, isNegative: number, target: number, length: number): void;
  sumProducts(
    columns: number,
    count: number,
    responses: number,
    responseCount: number,
    triangle: number,
    lanes: number,
    to: number,
  ): void;
  sumColumn(column: number, lanes: number): number;
  sumSquares(column: number, lanes: number, center: number): number;
  areBetween(columns: number, count: number, lowest: number, lanes: number): number;
}

interface Engine {
  readonly Module: new (bytes: Uint8Array) => CompiledKernels;
  readonly Memory: new (size: { initial: number }) => KernelMemory;
  readonly Instance: new (module: CompiledKernels, imports: object) => { readonly exports: object };
}

const engine = (globalThis as unknown as { WebAssembly: Engine }).WebAssembly;

/** Compiles the kernels from the bytes of their module. */
export function compileKernels(bytes: Uint8Array): CompiledKernels {
  return new engine.Module(bytes);
}

/** Makes a fresh instance with a memory of its own. */
export function instantiate(compiled: CompiledKernels): { kernels: Kernels; memory: KernelMemory } {
  const memory = new engine.Memory({ initial: 1 });
  const { exports } = new engine.Instance(compiled, { env: { memory } });
  return { kernels: exports as Kernels, memory };
}
