import { bracketOf } from '#built/bounds/bracket.js';
import { runOuterPaths } from '#built/bounds/outer-paths.js';
import { buildOuterPrograms, type OuterPrograms, outerProgramList } from '#built/bounds/outer-programs.js';
import type { OuterSums } from '#built/bounds/outer-sums.js';
import { estimateOf, standardErrorsIn95 } from '#built/numeric/estimate.js';
import { wasmInterpreters } from '#built/program/wasm-interpreter.js';
import { Block } from '#built/rule/block.js';
import { loadKernels } from '#built/workers/machine.js';
import type { Fitted } from '../fitted.js';
import type { Interval } from './misses.js';

/** How many independent samples are made of one fitted rule, and how large each is. */
export interface Samples {
  readonly sampleCount: number;
  readonly blocksEach: number;
  readonly innerPointCount: number;
}

/** Spoils what a block does to outer paths, so that a check can be seen to notice. */
export type Spoil = (block: Block, outer: OuterPrograms, samples: Samples) => void;

/** A block of its own for the outer paths of a fitted rule. */
export function openOuterBlock({ programs, context }: Fitted): { block: Block; outer: OuterPrograms } {
  const outer = buildOuterPrograms(programs);
  const block = new Block(programs, context.seed, wasmInterpreters(loadKernels()), outerProgramList(outer));
  return { block, outer };
}

/** The sums of independent sets of outer paths, each on blocks of its own, all with one fitted rule. */
export function sumsOfBlocks(whole: Fitted, samples: Samples, spoil: Spoil = () => {}): OuterSums[] {
  const { sampleCount, blocksEach, innerPointCount } = samples;
  const { block, outer } = openOuterBlock(whole);
  spoil(block, outer, samples);
  const work = { purpose: 'outer', round: 1, pathCount: sampleCount * blocksEach * 512, innerPointCount } as const;
  return Array.from({ length: sampleCount }, (_, sample) =>
    runOuterPaths(block, outer, whole.rule, work, { firstBlock: sample * blocksEach, blockCount: blocksEach }),
  );
}

/** The 95% bracket that a run would print from such sums. */
export function bracketOfSums({ lower, upper }: OuterSums): Interval {
  return bracketOf(estimateOf(lower), estimateOf(upper), standardErrorsIn95);
}
