import { expect, test } from 'vitest';
import type { ValueOptions } from '#built/run/options.js';
import type { Job, JobReply } from '#built/workers/jobs.js';
import { createThreadExecutor } from '#built/workers/threads.js';
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
    work: { purpose: 'outer', pathCount: 512, innerPointCount: 96 },
    range: { firstBlock: 0, blockCount: 1 },
  };
  const expected = run(job);
  const executor = createThreadExecutor(context, 2);
  try {
    const replies: Promise<JobReply>[] = [executor.run(job), executor.run(job), executor.run(job)];
    await new Promise((resolve) => setTimeout(resolve, 150));
    const dying = executor.pool.threads.map((thread) => thread.terminate());
    expect(dying).toHaveLength(2);
    await Promise.all(dying);
    for (const reply of await Promise.all(replies)) expect(reply).toEqual(expected);
  } finally {
    await executor.close();
  }
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
