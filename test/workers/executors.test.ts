import { expect, test } from 'vitest';
import type { ValueOptions } from '#built/run/options.js';
import { valueScenario } from '#built/run/value.js';
import type { Executor } from '#built/workers/executor.js';
import type { Job, JobContext, JobReply } from '#built/workers/jobs.js';
import { thisMachine } from '#built/workers/machine.js';
import { createThreadExecutor, type ThreadExecutor } from '#built/workers/threads.js';
import { fitted } from '../fitted.js';
import { recordOf } from '../run-value.js';
import { lots } from '../scenario-texts.js';

const scenario = lots({
  method: ['counts: { fit: 9000, outer: 1300, inner: 8 }', 'upper: { method: andersen-broadie, outer: 700, inner: 4 }'],
});

test('the calling thread, 1, 2 and 5 workers, and the plain interpreter give the same bytes', async () => {
  const essence = async (options: ValueOptions) => {
    const { lower, upper, uppers, bracket95, gap, dates } = await recordOf(scenario, options);
    return JSON.stringify({ lower, upper, uppers, bracket95, gap, dates });
  };
  const inProcess = await essence({ workers: 0 });
  for (const workers of [1, 2, 5]) expect(await essence({ workers })).toBe(inProcess);
  for (const workers of [0, 2]) expect(await essence({ workers, interpreter: 'plain' })).toBe(inProcess);
});

test('a thread that dies is replaced and its job done again, with the same result', async () => {
  const { context, run } = await fitted(lots(), 4096);
  const job: Job = {
    kind: 'outer',
    work: { purpose: 'outer', round: 1, pathCount: 512, innerPointCount: 1000 },
    range: { firstBlock: 0, blockCount: 1 },
  };
  const expected = run(job);
  const executor = createThreadExecutor(context, 2);
  try {
    const replies: Promise<JobReply>[] = [executor.run(job), executor.run(job), executor.run(job)];
    await new Promise((resolve) => setTimeout(resolve, 300));
    const dying = executor.pool.threads.map((thread) => thread.terminate());
    expect(dying).toHaveLength(2);
    await Promise.all(dying);
    for (const reply of await Promise.all(replies)) expect(reply).toEqual(expected);
    expect(executor.retryCount).toBeGreaterThanOrEqual(2);
  } finally {
    await executor.close();
  }
});

test('a whole run whose threads die in the fit and in the bounds gives the same bytes', async () => {
  const run = async (dyingJobs: readonly number[]) => {
    let executor: ThreadExecutor | undefined;
    const machine = thisMachine();
    const environment = {
      ...machine,
      openExecutor: (context: JobContext, workerCount: number): Executor => {
        const threads = createThreadExecutor(context, workerCount);
        executor = threads;
        let jobCount = 0;
        return {
          workerCount,
          close: threads.close,
          async run(job) {
            const reply = threads.run(job);
            if (dyingJobs.includes(++jobCount)) {
              await Promise.all(threads.pool.threads.map((thread) => thread.terminate()));
            }
            return reply;
          },
        };
      },
    };
    const outcome = await valueScenario(scenario, { workers: 2 }, environment);
    if (outcome.kind !== 'delivered') throw new Error(JSON.stringify(outcome));
    const { timing, ...figures } = outcome.record;
    return { bytes: JSON.stringify(figures), retryCount: executor!.retryCount, seconds: timing.totalSeconds };
  };
  const undisturbed = await run([]);
  expect(undisturbed.retryCount).toBe(0);
  const disturbed = await run([2, 7, 31, 60, 148]);
  expect(disturbed.retryCount).toBeGreaterThanOrEqual(3);
  expect(disturbed.bytes).toBe(undisturbed.bytes);
});

test('a defect inside a job is thrown, not tried again as if its thread had died', async () => {
  const { context } = await fitted(lots(), 1024);
  const executor = createThreadExecutor(context, 1);
  try {
    await expect(
      executor.run({ kind: 'sweep', sweep: 'none' as never, date: 0, range: { firstBlock: 0, blockCount: 1 } }),
    ).rejects.toThrow(/not a function/);
  } finally {
    await executor.close();
  }
});
