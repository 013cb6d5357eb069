import { mostRounds } from '../bounds/bracket.js';
import { mistake } from '../messages/build.js';
import { memory } from '../messages/figures.js';
import type { Message } from '../messages/message.js';
import type { Forecast, Plan } from '../result/record.js';
import type { Programs } from '../rule/programs.js';
import { upperMethods } from '../scenario/upper-methods.js';
import type { ForecastCounts } from './forecast.js';

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
        mend: 'Give the paths less with `--fit-memory 100MB`, lower `counts: { fit: … }` under method, or state fewer drivers.',
        evidence: { peakMemoryBytes, machineMemoryBytes },
      }),
    );
  }
  return messages;
}

/** Mistakes of a plan that was handed in to be replayed: what no run can have had. */
export function judgePlan(plan: Plan): Message[] {
  const { upper } = plan;
  if (!upperMethods.includes(upper)) {
    const what = `The plan's upper bound is ${JSON.stringify(upper)}; it must be ${upperMethods.join(', ')}.`;
    return [impossible(what, { upper })];
  }
  const isNested = upper === 'andersen-broadie';
  const without = Number.POSITIVE_INFINITY;
  const limits = [
    ['basisSize', 0, without],
    ['round', 1, mostRounds],
    ['fitPathCount', 1, without],
    ['outerPathCount', 2, without],
    ['innerPointCount', upper === 'one-step' ? 1 : 0, without],
    ['nestedOuterPathCount', isNested ? 2 : 0, without],
    ['nestedInnerPathCount', isNested ? 1 : 0, without],
  ] as const;
  return limits
    .filter(([name, least, most]) => !(Number.isSafeInteger(plan[name]) && plan[name] >= least && plan[name] <= most))
    .map(([name, least, most]) => {
      const range = most === without ? `from ${least} up` : `from ${least} to ${most}`;
      const what = `The plan's ${name} is ${String(plan[name])}; it must be a whole number ${range}.`;
      return impossible(what, { name, least });
    });
}

/** The mistake of a plan whose size of the basis the scenario does not have. */
export function judgeBasisSize({ basisSize }: Plan, { basisSizeCount }: Programs): Message[] {
  if (basisSize < basisSizeCount) return [];
  const sizes = basisSizeCount === 1 ? 'one size' : `${basisSizeCount} sizes`;
  const what = `The plan's basisSize is ${basisSize}; the basis of this scenario has ${sizes}, counted from 0.`;
  return [impossible(what, { basisSize, basisSizeCount })];
}

function impossible(what: string, evidence: Message['evidence']): Message {
  return mistake('plan-does-not-fit', {
    what,
    why: 'A plan replays the counts of an earlier run of this program; no run can have had this one.',
    mend: 'Take the `plan` of a record as it is, or leave the plan out.',
    evidence,
  });
}
