import { median } from 'simple-statistics';
import type { Programs } from '../rule/programs.js';
import type { Environment } from '../run/environment.js';
import { type Measured, measureOnce, withPasses } from './passes.js';
import { lotsPrograms } from './problems.js';
import { rounded } from './rounded.js';

/** What one path costs as a problem grows, with the automatic basis and its martingale. */
export interface GrowthLine {
  readonly drivers: number;
  readonly dates: number;
  /** One path of the fit, all sweeps; and one path of the forward valuation without inner points. */
  readonly microsecondsFit: number;
  readonly microsecondsForward: number;
  /** Cost over the first line's, divided by the growth of drivers or dates: 1 where the cost is proportional. */
  readonly fitAgainstLinear: number;
  readonly forwardAgainstLinear: number;
}

const baseCase = { drivers: 5, dates: 9 };
const driverCases = [50, 500].map((drivers) => ({ ...baseCase, drivers }));
const dateCases = [36, 144].map((dates) => ({ ...baseCase, dates }));
const roundCount = 3;
const smallPathCount = 4096;
const largePathCount = 3 * smallPathCount;

/** Measures how the cost of a path grows with drivers and with dates. */
export async function measureGrowth(environment: Environment): Promise<GrowthLine[]> {
  const lines: GrowthLine[] = [];
  for (const { drivers, dates } of [baseCase, ...driverCases, ...dateCases]) {
    const cost = await costOfPath(lotsPrograms(drivers, dates), environment);
    const base = lines[0];
    const growth = (drivers / baseCase.drivers) * (dates / baseCase.dates);
    lines.push({
      drivers,
      dates,
      microsecondsFit: rounded(cost.fit, 2),
      microsecondsForward: rounded(cost.forward, 2),
      fitAgainstLinear: rounded(cost.fit / ((base?.microsecondsFit ?? cost.fit) * growth), 2),
      forwardAgainstLinear: rounded(cost.forward / ((base?.microsecondsForward ?? cost.forward) * growth), 2),
    });
  }
  return lines;
}

/**
 * Microseconds of one path, from the difference of a large and a small run: what does not depend on the paths, as
 * solving the normal equations, falls out.
 */
async function costOfPath(programs: Programs, environment: Environment): Promise<{ fit: number; forward: number }> {
  const measured = async (pathCount: number): Promise<Measured[]> =>
    withPasses(programs, pathCount, [0], environment, async ([passes]) => {
      await measureOnce(passes!);
      const rounds: Measured[] = [];
      for (let round = 0; round < roundCount; round++) rounds.push(await measureOnce(passes!));
      return rounds;
    });
  const [small, large] = [await measured(smallPathCount), await measured(largePathCount)];
  const perPath = (secondsOf: (measured: Measured) => number) =>
    ((median(large.map(secondsOf)) - median(small.map(secondsOf))) * 1e6) / (largePathCount - smallPathCount);
  return { fit: perPath(({ fitSeconds }) => fitSeconds), forward: perPath(({ forwardSeconds }) => forwardSeconds) };
}
