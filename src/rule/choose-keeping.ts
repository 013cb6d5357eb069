import { keepAllPaths, type PathKeeping, pathStepCount, segmentCount, slotCount } from './path-keeping.js';

/** Fewest dates that must be in memory at once: the date of a sweep and the next one. */
export function leastSlotCount(dateCount: number): number {
  return Math.min(2, dateCount);
}

/**
 * The keeping that needs the fewest steps with so many dates in memory, and among those the least memory.
 *
 * For each size of a segment, what memory is left goes to checkpoints, as close together as it reaches: more of them
 * never cost steps. About √dates of both let every path be simulated twice.
 *
 * @returns null if even the smallest keeping has more dates in memory
 */
export function chooseKeeping(dateCount: number, mostSlots: number): PathKeeping | null {
  if (mostSlots >= dateCount) return keepAllPaths(dateCount);
  if (!(mostSlots >= leastSlotCount(dateCount))) return null;
  let best: { keeping: PathKeeping; steps: number } | null = null;
  for (let segmentDates = 1; segmentDates + 1 <= mostSlots; segmentDates++) {
    const keeping = densestCheckpoints(dateCount, segmentDates, mostSlots - segmentDates - 1);
    const steps = pathStepCount(keeping);
    const isBetter =
      best === null || steps < best.steps || (steps === best.steps && slotCount(keeping) < slotCount(best.keeping));
    if (isBetter) best = { keeping, steps };
  }
  return best?.keeping ?? null;
}

/** Spends at most so many checkpoints; the segment that is in memory from the start wants none. */
function densestCheckpoints(dateCount: number, segmentDates: number, mostCheckpoints: number): PathKeeping {
  const restored = segmentCount({ dateCount, segmentDates, checkpointEvery: 1 }) - 1;
  const checkpointEvery = Math.max(1, Math.ceil(restored / (Math.floor(mostCheckpoints) + 1)));
  return { dateCount, segmentDates, checkpointEvery };
}
