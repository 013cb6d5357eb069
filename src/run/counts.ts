import { blockLanes } from '../program/program.js';
import type { Programs } from '../rule/programs.js';
import type { Method } from '../scenario/model.js';
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
