import { createHash } from 'node:crypto';
import { readFileSync } from 'node:fs';
import { availableParallelism, totalmem } from 'node:os';
import { type CompiledKernels, compileKernels } from '../program/wasm-module.js';
import type { Executor } from './executor.js';
import { createInProcessExecutor } from './in-process.js';
import { createJobRunner, type JobContext } from './jobs.js';
import { createThreadExecutor } from './threads.js';

/** What a run takes from the machine it is on. */
export interface Machine {
  /** @unit milliseconds, from any origin */
  now(): number;
  readonly coreCount: number;
  /** Memory this process may use: the machine's, or less where a container is kept smaller. @unit bytes */
  readonly memoryBytes: number;
  readonly versions: { readonly tarry: string; readonly node: string };
  hashOf(text: string): string;
  /** The compiled kernels of the fast interpreter; null for the plain one. */
  kernels(interpreter: 'wasm' | 'plain' | undefined): CompiledKernels | null;
  /** Threads, or the calling thread for a count of 0. */
  openExecutor(context: JobContext, workerCount: number): Executor;
}

/** The machine under this process. */
export function thisMachine(): Machine {
  const constrained = process.constrainedMemory();
  return {
    now: () => performance.now(),
    coreCount: availableParallelism(),
    memoryBytes: constrained > 0 ? Math.min(constrained, totalmem()) : totalmem(),
    versions: { tarry: programVersion(), node: process.versions.node },
    hashOf: (text) => createHash('sha256').update(text).digest('hex'),
    kernels: (interpreter = 'wasm') => (interpreter === 'wasm' ? loadKernels() : null),
    openExecutor: (context, workerCount) =>
      workerCount === 0
        ? createInProcessExecutor(createJobRunner(context))
        : createThreadExecutor(context, workerCount),
  };
}

let loaded: CompiledKernels | undefined;

/** Reads and compiles the kernels beside the built programs, once for a process. */
export function loadKernels(): CompiledKernels {
  loaded ??= compileKernels(readFileSync(new URL('../program/kernels.wasm', import.meta.url)));
  return loaded;
}

/** The version of this program, from its package.json. */
export function programVersion(): string {
  const text = readFileSync(new URL('../../package.json', import.meta.url), 'utf8');
  return (JSON.parse(text) as { version: string }).version;
}
