import { expect, test } from 'vitest';
import { check, value } from '#built/index.js';
import type { RunRecord } from '#built/result/record.js';
import { chooseKeeping } from '#built/rule/choose-keeping.js';
import { checkpointSlotOf, type PathKeeping, segmentCount, slotCount, workFactor } from '#built/rule/path-keeping.js';
import { openContext } from '#built/run/fit-size.js';
import { runFit } from '#built/run/fit-stage.js';
import type { Executor } from '#built/workers/executor.js';
import { createInProcessExecutor } from '#built/workers/in-process.js';
import { createJobRunner, type JobContext } from '#built/workers/jobs.js';
import { loadKernels } from '#built/workers/machine.js';
import { programsOf } from '../fitted.js';
import { recordOf } from '../run-value.js';
import { lots } from '../scenario-texts.js';

const pathCount = 4200;
const blockCount = Math.ceil(pathCount / 512);
const method = [`counts: { fit: ${pathCount}, outer: 512, inner: 4 }`];
const textOf = (dateCount: number) => lots({ dates: `{ count: ${dateCount}, last: 3 }`, method });
/** Two drivers, columns of 520 numbers. */
const slotBytes = blockCount * 2 * 520 * 8;

function essence({ timing, paths, ...rest }: RunRecord): string {
  return JSON.stringify(rest);
}

test.each([
  {
    dateCount: 13,
    runs: [
      { slots: 2, workers: 0 },
      { slots: 2, workers: 1 },
      { slots: 2, workers: 2 },
      { slots: 5, workers: 1 },
      { slots: 12, workers: 2 },
    ],
  },
  {
    dateCount: 31,
    runs: [
      { slots: 2, workers: 2 },
      { slots: 11, workers: 0 },
    ],
  },
])(
  '$dateCount dates: few of them in memory give the same record as all, with any workers',
  async ({ dateCount, runs }) => {
    const all = await recordOf(textOf(dateCount));
    expect(all.paths).toEqual({
      kept: 'all',
      segmentDates: dateCount,
      checkpointCount: 0,
      workFactor: 1,
      bytes: dateCount * slotBytes,
    });
    for (const { slots, workers } of runs) {
      const few = await recordOf(textOf(dateCount), { fitMemoryBytes: slots * slotBytes, workers });
      expect(few.paths.kept).toBe('segments');
      expect(few.paths.bytes).toBeLessThanOrEqual(slots * slotBytes);
      expect(few.paths.workFactor).toBeGreaterThan(1);
      expect(essence(few)).toBe(essence(all));
    }
  },
);

interface FitRun {
  readonly continuation: readonly number[];
  readonly integrands: readonly number[];
  readonly restoredSteps: number;
}

/** Fits in the calling thread; `tamper` may change the store before the first segment is restored. */
async function fitWith(
  dateCount: number,
  keeping: PathKeeping,
  tamper?: (context: JobContext) => void,
): Promise<FitRun> {
  const { programs, seed } = programsOf(textOf(dateCount));
  const context = openContext(programs, seed, pathCount, loadKernels(), keeping);
  const inner = createInProcessExecutor(createJobRunner(context));
  let restoredSteps = 0;
  let isTampered = false;
  const executor: Executor = {
    ...inner,
    async run(job) {
      if (job.kind !== 'restore') return inner.run(job);
      if (!isTampered) tamper?.(context);
      isTampered = true;
      const reply = await inner.run(job);
      if (reply.ok) restoredSteps += reply.result as number;
      return reply;
    },
  };
  await runFit(executor, programs, context.rule, context.store, undefined, () => {});
  return { continuation: [...context.rule.continuation], integrands: [...context.rule.integrands], restoredSteps };
}

test('the work factor is what is counted while paths are restored', async () => {
  for (const [dateCount, slots] of [
    [13, 2],
    [13, 6],
    [31, 9],
  ] as const) {
    const keeping = chooseKeeping(dateCount, slots)!;
    const { restoredSteps } = await fitWith(dateCount, keeping);
    expect((pathCount * dateCount + restoredSteps) / (pathCount * dateCount)).toBeCloseTo(workFactor(keeping), 12);
  }
});

test('control: a segment that is restored from the wrong checkpoint changes the rule', async () => {
  const keeping: PathKeeping = { dateCount: 13, segmentDates: 2, checkpointEvery: 2 };
  const dates = Array.from({ length: 13 }, (_, index) => index + 1);
  const checkpoints = dates.flatMap((date) => checkpointSlotOf(keeping, date) ?? []);
  expect(checkpoints).toHaveLength(2);
  const right = await fitWith(13, keeping);
  const wrong = await fitWith(13, keeping, ({ store }) => {
    const length = store.paths.length / (blockCount * slotCount(keeping));
    const [early, late] = [checkpoints[0]!, checkpoints.at(-1)!];
    for (let block = 0; block < blockCount; block++) {
      const at = (slot: number) => (block * slotCount(keeping) + slot) * length;
      store.paths.copyWithin(at(late), at(early), at(early) + length);
    }
  });
  expect(wrong.restoredSteps).toBe(right.restoredSteps);
  expect(wrong.continuation).not.toEqual(right.continuation);
  const whole = await fitWith(13, chooseKeeping(13, 13)!);
  expect(whole.restoredSteps).toBe(0);
  expect([whole.continuation, whole.integrands]).toEqual([right.continuation, right.integrands]);
});

test('restoring a segment twice, as after the death of a thread, leaves the same paths', async () => {
  const { programs, seed } = programsOf(textOf(13));
  const context = openContext(programs, seed, pathCount, loadKernels(), chooseKeeping(13, 6)!);
  const executor = createInProcessExecutor(createJobRunner(context));
  const range = { firstBlock: 0, blockCount };
  await executor.run({ kind: 'simulate', range });
  const job = { kind: 'restore', segment: segmentCount(context.store.keeping) - 2, range } as const;
  await executor.run(job);
  const once = context.store.paths.slice();
  await executor.run(job);
  expect(Buffer.from(context.store.paths.buffer).equals(Buffer.from(once.buffer))).toBe(true);
});

test('memory for not even two dates is refused with the least that works, and that works', async () => {
  const outcome = await value(textOf(13), { workers: 0, fitMemoryBytes: 2 * slotBytes - 1 });
  if (outcome.kind !== 'refused') throw new Error(outcome.kind);
  expect(outcome.messages).toHaveLength(1);
  const [message] = outcome.messages;
  expect(message).toMatchObject({ code: 'fit-memory-too-small', evidence: { leastBytes: 2 * slotBytes } });
  const [, least, fit] = /--fit-memory ([\d.]+)KB` or more, or `counts: \{ fit: (\d+) \}`/.exec(message!.mend)!;
  const enough = await recordOf(textOf(13), { fitMemoryBytes: Number(least) * 1000 });
  expect(enough.paths.segmentDates).toBe(1);
  const fewer = textOf(13).replace(`fit: ${pathCount}`, `fit: ${fit}`);
  expect((await recordOf(fewer, { fitMemoryBytes: 2 * slotBytes - 1 })).paths.kept).toBe('segments');
});

test('the forecast counts the bytes of the paths in memory, padding and all, and the steps that are made again', async () => {
  const forecastWith = async (fitMemoryBytes: number) => {
    const outcome = await check(textOf(13), { fitMemoryBytes });
    if (outcome.kind !== 'checked') throw new Error(JSON.stringify(outcome));
    return outcome.forecast;
  };
  const all = await forecastWith(1e9);
  const few = await forecastWith(2 * slotBytes);
  expect([all.paths.bytes, few.paths.bytes]).toEqual([13 * slotBytes, 2 * slotBytes]);
  expect(all.peakMemoryBytes - few.peakMemoryBytes).toBeCloseTo(11 * slotBytes, 3);
  // One date at a time from today on: 1 + 2 + … + 11 steps more.
  expect(few.work.fit - all.work.fit).toBeCloseTo(pathCount * 66, 3);
});
