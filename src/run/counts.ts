import { mistake } from '../messages/build.js';
import type { Message } from '../messages/message.js';
import type { Forecast, Plan } from '../result/record.js';
import type { Programs } from '../rule/programs.js';
import type { Method } from '../scenario/model.js';
import { defaultFitPathCount } from './fit-size.js';
import type { ForecastCounts } from './forecast.js';

const defaultNestedOuterPathCount = 1024;
/** Inner paths of the nested bound are chosen so that its steps stay near this count, within limits. */
const nestedStepAim = 12_000_000;

/** Counts that the method fixes or leaves to a fixed default; those of the pilot stay null. */
export function countsBeforePilot(programs: Programs, method: Method): ForecastCounts {
  const dateCount = programs.times.length - 1;
  const isNested = method.upper === 'andersen-broadie';
  const nestedOuterPathCount = isNested ? (method.nestedOuterPathCount ?? defaultNestedOuterPathCount) : 0;
  const perInnerPath = nestedOuterPathCount * ((dateCount * (dateCount + 1)) / 2);
  const affordable = Math.floor(nestedStepAim / Math.max(1, perInnerPath));
  return {
    fitPathCount: method.fitPathCount ?? defaultFitPathCount(programs),
    outerPathCount: method.outerPathCount,
    innerPointCount: method.innerPointCount,
    nestedOuterPathCount,
    nestedInnerPathCount: isNested ? (method.nestedInnerPathCount ?? Math.max(16, Math.min(128, affordable))) : 0,
  };
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
    const gigabytes = (bytes: number) => `${(bytes / 1e9).toPrecision(3)} GB`;
    messages.push(
      mistake('memory-beyond-machine', {
        what: `The run needs about ${gigabytes(peakMemoryBytes)} of memory; the machine has ${gigabytes(machineMemoryBytes)}.`,
        why: 'The paths of the fit are kept in memory; with less, the machine would stall or stop the run.',
        mend: 'Lower `counts: { fit: … }` under method, or state fewer decision dates.',
        evidence: { peakMemoryBytes, machineMemoryBytes },
      }),
    );
  }
  return messages;
}

/** Mistakes of a plan that was handed in to be replayed: counts that no run can have had. */
export function judgePlan(plan: Plan): Message[] {
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
