import { buildNestedPrograms, type NestedPrograms, nestedProgramList } from '#built/bounds/nested-programs.js';
import { type OuterPurpose, runOuterPaths } from '#built/bounds/outer-paths.js';
import { buildOuterPrograms, outerProgramList } from '#built/bounds/outer-programs.js';
import { mergeOuterSums, noOuterSums, type OuterSums } from '#built/bounds/outer-sums.js';
import { createPlainInterpreter } from '#built/program/plain-interpreter.js';
import { wasmInterpreters } from '#built/program/wasm-interpreter.js';
import type { CompiledKernels } from '#built/program/wasm-module.js';
import { fitRule, type StepFit } from '#built/rule/backward-induction.js';
import { Block } from '#built/rule/block.js';
import { buildPrograms, type Programs } from '#built/rule/programs.js';
import type { Rule } from '#built/rule/rule.js';
import { openContext } from '#built/run/fit-size.js';
import { readScenario } from '#built/scenario/read.js';
import { createJobRunner, type Job, type JobContext, type JobReply } from '#built/workers/jobs.js';
import { loadKernels } from '#built/workers/machine.js';

/** A fitted rule with all that is needed to run stages on it, in the calling thread. */
export interface Fitted {
  readonly programs: Programs;
  readonly context: JobContext;
  readonly rule: Rule;
  readonly fits: readonly StepFit[];
  /** A block with the programs of all stages. */
  readonly block: Block;
  readonly nested: NestedPrograms;
  readonly run: (job: Job) => JobReply;
  outer(purpose: OuterPurpose, pathCount: number, innerPointCount: number): OuterSums;
}

export function programsOf(text: string): { programs: Programs; seed: string } {
  const { scenario, messages } = readScenario(text, {});
  if (scenario === null) throw new Error(JSON.stringify(messages, null, 1));
  return { programs: buildPrograms(scenario.model), seed: scenario.model.seed };
}

/** @param kernels null runs the plain interpreter */
export async function fitted(
  text: string,
  pathCount: number,
  kernels: CompiledKernels | null = loadKernels(),
): Promise<Fitted> {
  const { programs, seed } = programsOf(text);
  const context = openContext(programs, seed, pathCount, kernels);
  const run = createJobRunner(context);
  const range = { firstBlock: 0, blockCount: Math.ceil(pathCount / 512) };
  const result = (job: Job): never => {
    const reply = run(job);
    if (!reply.ok) throw new Error(JSON.stringify(reply.notFinite));
    return reply.result as never;
  };
  const fits = await fitRule(programs, context.rule, context.store.direction, {
    simulate: async () => [result({ kind: 'simulate', range })],
    sweep: async (sweep, date) => [result({ kind: 'sweep', sweep, date, range })],
  });
  const outer = buildOuterPrograms(programs);
  const nested = buildNestedPrograms(programs);
  const block = new Block(programs, seed, kernels === null ? createPlainInterpreter : wasmInterpreters(kernels), [
    ...outerProgramList(outer),
    ...nestedProgramList(nested),
  ]);
  return {
    programs,
    context,
    rule: context.rule,
    fits,
    block,
    nested,
    run,
    outer: (purpose, pathCount, innerPointCount) =>
      mergeOuterSums(
        noOuterSums(programs.times.length),
        runOuterPaths(
          block,
          outer,
          context.rule,
          { purpose, round: 1, pathCount, innerPointCount },
          { firstBlock: 0, blockCount: Math.ceil(pathCount / 512) },
        ),
      ),
  };
}
