import { mistake } from '../messages/build.js';
import { memory, memoryToGive } from '../messages/figures.js';
import type { Message } from '../messages/message.js';
import { blockLanes } from '../program/program.js';
import { fitPathsPerColumn } from '../result/advice.js';
import type { PathsFinding } from '../result/record.js';
import { chooseKeeping, leastSlotCount } from '../rule/choose-keeping.js';
import { slotLength } from '../rule/fit-store.js';
import { checkpointCount, type PathKeeping, segmentCount, slotCount, workFactor } from '../rule/path-keeping.js';
import type { Programs } from '../rule/programs.js';

/** Bytes for the fit's paths when nobody says. */
export const defaultFitMemoryBytes = 512e6;

/** How the paths of a fit are kept, or why they cannot be. */
export type KeepingOutcome =
  | { readonly kind: 'fits'; readonly keeping: PathKeeping }
  | { readonly kind: 'refused'; readonly messages: readonly Message[] };

/**
 * Decides before a run which of the fit's paths stay in memory.
 *
 * @param fitMemoryBytes what they may take; undefined for the default, or two dates if they need more
 * @fails refuses with `fit-memory-too-small` if not even two dates fit into what is given
 */
export function decideKeeping(
  programs: Programs,
  fitPathCount: number,
  fitMemoryBytes: number | undefined,
): KeepingOutcome {
  const dateCount = programs.times.length - 1;
  const least = leastSlotCount(dateCount) * slotBytes(programs, fitPathCount);
  const budget = fitMemoryBytes ?? Math.max(defaultFitMemoryBytes, least);
  const keeping = chooseKeeping(dateCount, Math.floor(budget / slotBytes(programs, fitPathCount)));
  if (keeping !== null) return { kind: 'fits', keeping };
  return { kind: 'refused', messages: [tooSmall(programs, fitPathCount, budget)] };
}

/** Bytes of the fit's paths in memory. */
export function pathBytes(programs: Programs, fitPathCount: number, keeping: PathKeeping): number {
  return slotCount(keeping) * slotBytes(programs, fitPathCount);
}

/** The keeping as record and forecast tell it. */
export function describeKeeping(programs: Programs, fitPathCount: number, keeping: PathKeeping): PathsFinding {
  return {
    kept: segmentCount(keeping) === 1 ? 'all' : 'segments',
    segmentDates: keeping.segmentDates,
    checkpointCount: checkpointCount(keeping),
    workFactor: workFactor(keeping),
    bytes: pathBytes(programs, fitPathCount, keeping),
  };
}

/** Bytes of the drivers of all paths at one date. */
function slotBytes(programs: Programs, fitPathCount: number): number {
  return slotLength(programs, fitPathCount) * Float64Array.BYTES_PER_ELEMENT;
}

function tooSmall(programs: Programs, fitPathCount: number, budget: number): Message {
  const slots = leastSlotCount(programs.times.length - 1);
  const leastBytes = slots * slotBytes(programs, fitPathCount);
  const bytesOfBlock = slots * slotBytes(programs, blockLanes);
  const mostPaths = Math.floor(budget / bytesOfBlock) * blockLanes;
  const lower =
    mostPaths >= fitPathsPerColumn * programs.columns.length
      ? `, or \`counts: { fit: ${mostPaths} }\` under method`
      : '';
  return mistake('fit-memory-too-small', {
    what: `The paths of the fit may take ${memory(budget)} of memory; ${memory(leastBytes)} is the least they need.`,
    why: `${slots === 1 ? 'One date' : 'Two dates'} of all ${fitPathCount.toLocaleString('en-US')} paths must be there at once, whatever is computed again.`,
    mend: `Write \`--fit-memory ${memoryToGive(leastBytes)}\` or more${lower}.`,
    evidence: {
      fitMemoryBytes: budget,
      leastBytes,
      fitPathCount,
      override: '--fit-memory',
    },
  });
}
