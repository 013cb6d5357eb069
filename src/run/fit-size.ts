import { blockLanes, columnStride } from '../program/program.js';
import type { CompiledKernels } from '../program/wasm-module.js';
import type { FitStore } from '../rule/fit-sweeps.js';
import type { Programs } from '../rule/programs.js';
import { emptyRule, sharedNumbers } from '../rule/rule.js';
import type { JobContext } from '../workers/jobs.js';

const pathsPerColumn = 800;
const smallestFitPathCount = 32_768;
const largestFitPathCount = 262_144;
const fitPathStep = 4096;

/** Paths of the fit when nobody says: in proportion to the columns, within limits, in whole parcels. */
export function defaultFitPathCount(programs: Programs): number {
  const wanted = Math.ceil((pathsPerColumn * programs.columns.length) / fitPathStep) * fitPathStep;
  return Math.min(largestFitPathCount, Math.max(smallestFitPathCount, wanted));
}

/** Bytes that the fit's paths and values take on shared memory. */
export function fitStoreBytes(programs: Programs, pathCount: number): number {
  const blockCount = Math.ceil(pathCount / blockLanes);
  const perBlock = (programs.times.length - 1) * programs.drivers.length * columnStride + blockLanes;
  return blockCount * perBlock * Float64Array.BYTES_PER_ELEMENT;
}

/** Opens the shared memory of a run. */
export function openContext(
  programs: Programs,
  seed: string,
  pathCount: number,
  kernels: CompiledKernels | null,
): JobContext {
  const blockCount = Math.ceil(pathCount / blockLanes);
  const store: FitStore = {
    pathCount,
    paths: sharedNumbers(blockCount * (programs.times.length - 1) * programs.drivers.length * columnStride),
    values: sharedNumbers(blockCount * blockLanes),
    direction: sharedNumbers(programs.columns.length + programs.polynomialNames.length * programs.integrandColumnCount),
  };
  return { programs, seed, kernels, rule: emptyRule(programs), store };
}
