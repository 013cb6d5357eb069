import { type NestedSums, type NestedWork, runNestedPaths } from '../bounds/nested-paths.js';
import { buildNestedPrograms, type NestedPrograms, nestedProgramList } from '../bounds/nested-programs.js';
import { type OuterWork, runOuterPaths } from '../bounds/outer-paths.js';
import { buildOuterPrograms, type OuterPrograms, outerProgramList } from '../bounds/outer-programs.js';
import type { OuterSums } from '../bounds/outer-sums.js';
import type { Moments } from '../numeric/moments.js';
import type { InterpreterMaker } from '../program/interpreter.js';
import { createPlainInterpreter } from '../program/plain-interpreter.js';
import { wasmInterpreters } from '../program/wasm-interpreter.js';
import type { CompiledKernels } from '../program/wasm-module.js';
import type { SweepKind } from '../rule/backward-induction.js';
import { Block } from '../rule/block.js';
import { restoreSegment, simulateFit } from '../rule/fit-paths.js';
import type { BlockRange, FitStore } from '../rule/fit-store.js';
import { type SweepSums, sweepDirection, sweepResiduals, sweepValues } from '../rule/fit-sweeps.js';
import { NotFinite, type NotFinitePlace } from '../rule/not-finite.js';
import type { Programs } from '../rule/programs.js';
import type { Rule } from '../rule/rule.js';

/** What every worker of a run holds: plain data, the large arrays on shared memory. */
export interface JobContext {
  readonly programs: Programs;
  readonly seed: string;
  /** The fast interpreter's compiled kernels; null runs the plain interpreter. */
  readonly kernels: CompiledKernels | null;
  readonly rule: Rule;
  readonly store: FitStore;
}

/** One parcel of work: small plain data; its result depends on it and on the context alone. */
export type Job =
  | { readonly kind: 'simulate'; readonly range: BlockRange }
  | { readonly kind: 'restore'; readonly segment: number; readonly range: BlockRange }
  | { readonly kind: 'sweep'; readonly sweep: SweepKind; readonly date: number; readonly range: BlockRange }
  | { readonly kind: 'outer'; readonly work: OuterWork; readonly range: BlockRange }
  | { readonly kind: 'nested'; readonly work: NestedWork; readonly range: BlockRange };

/** Which result belongs to which job. */
export type ResultOf<J extends Job> = J extends { kind: 'simulate' }
  ? Moments[][]
  : J extends { kind: 'restore' }
    ? number
    : J extends { kind: 'sweep' }
      ? SweepSums
      : J extends { kind: 'outer' }
        ? OuterSums
        : NestedSums;

/** A job's result, or where a path left the finite numbers: data, so that it crosses threads whole. */
export type JobReply =
  | { readonly ok: true; readonly result: ResultOf<Job> }
  | { readonly ok: false; readonly notFinite: NotFinitePlace };

/** A block with the programs of all stages on it. */
interface Bench {
  readonly block: Block;
  readonly outer: OuterPrograms;
  readonly nested: NestedPrograms;
}

/** Makes fast interpreters from compiled kernels, plain ones from none. */
export function interpreterMaker(kernels: CompiledKernels | null): InterpreterMaker {
  return kernels === null ? createPlainInterpreter : wasmInterpreters(kernels);
}

/** Makes the function that does any job of a run; the same in a thread and in the calling one. */
export function createJobRunner(
  context: JobContext,
  makeInterpreter = interpreterMaker(context.kernels),
): (job: Job) => JobReply {
  const { programs, seed } = context;
  const outer = buildOuterPrograms(programs);
  const nested = buildNestedPrograms(programs);
  const block = new Block(programs, seed, makeInterpreter, [...outerProgramList(outer), ...nestedProgramList(nested)]);
  return (job) => {
    try {
      return { ok: true, result: doJob({ block, outer, nested }, context, job) };
    } catch (problem) {
      if (problem instanceof NotFinite) return { ok: false, notFinite: problem.place };
      throw problem;
    }
  };
}

const sweeps = { values: sweepValues, residuals: sweepResiduals, direction: sweepDirection };

function doJob({ block, outer, nested }: Bench, { store, rule }: JobContext, job: Job): ResultOf<Job> {
  switch (job.kind) {
    case 'simulate':
      return simulateFit(block, store, job.range);
    case 'restore':
      return restoreSegment(block, store, job.segment, job.range);
    case 'sweep':
      return sweeps[job.sweep](block, store, rule, job.date, job.range);
    case 'outer':
      return runOuterPaths(block, outer, rule, job.work, job.range);
    case 'nested':
      return runNestedPaths(block, nested, rule, job.work, job.range);
  }
}
