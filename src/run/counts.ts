import { mistake } from '../messages/build.js';
import { memory } from '../messages/figures.js';
import type { Message } from '../messages/message.js';
import { blockLanes } from '../program/program.js';
import type { Forecast, Plan } from '../result/record.js';
import type { Programs } from '../rule/programs.js';
import type { Method, UpperMethod } from '../scenario/model.js';
import { defaultFitPathCount } from './fit-size.js';
import type { ForecastCounts } from './forecast.js';

const defaultNestedOuterPathCount = 1024;
const fewestNestedInnerPaths = 4;
const mostNestedInnerPaths = 128;
/** Steps of all inner paths of the nested bound when nobody set a budget, unless its limits say otherwise. */
const nestedStepAim = 12_000_000;

/** Counts that the method fixes or leaves to a fixed default; those of the pilot stay null. */
export function countsBeforePilot(programs: Programs, method: Method, nestedSteps = nestedStepAim): ForecastCounts {
  return {
    fitPathCount: method.fitPathCount ?? defaultFitPathCount(programs),
    outerPathCount: method.outerPathCount,
    innerPointCount: method.innerPointCount,
    ...(method.upper === 'andersen-broadie'
      ? nestedCounts(programs, method, nestedSteps)
      : { nestedOuterPathCount: 0, nestedInnerPathCount: 0 }),
  };
}

/** As many inner paths as the steps allow; outer paths are given up only when the fewest inner paths cost too much. */
function nestedCounts(programs: Programs, method: Method, steps: number) {
  const dateCount = programs.times.length - 1;
  const stepsOfInnerPath = (dateCount * (dateCount + 1)) / 2;
  const affordablePaths = Math.floor(steps / (stepsOfInnerPath * fewestNestedInnerPaths));
  const fewestOuterPaths = Math.max(blockLanes, Math.min(defaultNestedOuterPathCount, affordablePaths));
  const nestedOuterPathCount = method.nestedOuterPathCount ?? fewestOuterPaths;
  const affordable = Math.floor(steps / (stepsOfInnerPath * nestedOuterPathCount));
  const inner = Math.max(fewestNestedInnerPaths, Math.min(mostNestedInnerPaths, affordable));
  return { nestedOuterPathCount, nestedInnerPathCount: method.nestedInnerPathCount ?? inner };
}

/** Mistakes that show only once the counts meet the machine and the basis. */
export function judgeCounts(programs: Programs, counts: ForecastCounts, forecast: Forecast): Message[] {
  const messages: Message[] = [];
  const columnCount = programs.columns.length;
  if (counts.fitPathCount < columnCount) {
    messages.push(
      mistake('fewer-paths-than-columns', {
        what: `The fit has ${counts.fitPathCount} paths for ${columnCount} columns.`,
        why: 'A regression with fewer paths than columns fits anything and tells nothing.',
        mend: `Set \`counts: { fit: … }\` under method to at least ${100 * columnCount}, or leave it out.`,
        evidence: { fitPathCount: counts.fitPathCount, columnCount },
      }),
    );
  }
  const { peakMemoryBytes, machineMemoryBytes } = forecast;
  if (machineMemoryBytes !== null && peakMemoryBytes > machineMemoryBytes) {
    messages.push(
      mistake('memory-beyond-machine', {
        what: `The run needs about ${memory(peakMemoryBytes)} of memory; the machine has ${memory(machineMemoryBytes)}.`,
        why: 'The paths of the fit are kept in memory; with less, the machine would stall or stop the run.',
        mend: 'Lower `counts: { fit: … }` under method, or state fewer decision dates or drivers.',
        evidence: { peakMemoryBytes, machineMemoryBytes },
      }),
    );
  }
  return messages;
}

const upperMethods: readonly UpperMethod[] = ['one-step', 'andersen-broadie', 'regressed'];

/** Mistakes of a plan that was handed in to be replayed: counts that no run can have had. */
export function judgePlan(plan: Plan): Message[] {
  if (!upperMethods.includes(plan.upper)) {
    return [
      mistake('plan-does-not-fit', {
        what: `The plan's upper bound is ${JSON.stringify(plan.upper)}; it must be ${upperMethods.join(', ')}.`,
        why: 'A plan replays an earlier run of this program; no run can have had this one.',
        mend: 'Take the `plan` of a record as it is, or leave the plan out.',
        evidence: { upper: plan.upper },
      }),
    ];
  }
  const isNested = plan.upper === 'andersen-broadie';
  const least: Record<string, number> = {
    fitPathCount: 1,
    outerPathCount: 2,
    innerPointCount: 1,
    nestedOuterPathCount: isNested ? 2 : 0,
    nestedInnerPathCount: isNested ? 1 : 0,
  };
  const wrong = Object.entries(least).filter(([name, fewest]) => {
    const count = plan[name as keyof Plan] as number;
    return !(Number.isSafeInteger(count) && count >= fewest);
  });
  return wrong.map(([name, fewest]) =>
    mistake('plan-does-not-fit', {
      what: `The plan's ${name} is ${String(plan[name as keyof Plan])}; it must be a whole number from ${fewest} up.`,
      why: 'A plan replays the counts of an earlier run of this program; no run can have had this one.',
      mend: 'Take the `plan` of a record as it is, or leave the plan out.',
      evidence: { name, fewest },
    }),
  );
}
