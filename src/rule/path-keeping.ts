/**
 * Which of the fit's paths stay in memory; the rest is simulated again from checkpoints when a sweep needs it.
 *
 * The dates of the grid are cut into segments, counted back from the last date, which goes with the last segment
 * beyond its size; the first segment takes what is left. One segment at a time is in memory, with the first date of the
 * following one, so that a sweep always finds its date and the next. Before every `checkpointEvery`-th segment, from the
 * first on, the drivers are kept for good; before the first one stands today, which needs no memory.
 *
 * It changes no result: a path that is simulated again has the same draws and so the same bits.
 */
export interface PathKeeping {
  /** Dates of the grid after today. */
  readonly dateCount: number;
  /** Dates of a segment; `dateCount` where all paths stay in memory. */
  readonly segmentDates: number;
  /** Segments from one checkpoint to the next. */
  readonly checkpointEvery: number;
}

/** Keeps every path at every date. */
export function keepAllPaths(dateCount: number): PathKeeping {
  return { dateCount, segmentDates: dateCount, checkpointEvery: 1 };
}

export function segmentCount({ dateCount, segmentDates }: PathKeeping): number {
  return Math.max(1, Math.ceil((dateCount - 1) / segmentDates));
}

/** The segment that must be in memory for a sweep at a date; today is known, but the date after it is wanted. */
export function segmentOf(keeping: PathKeeping, date: number): number {
  const last = segmentCount(keeping) - 1;
  const fromEnd = Math.floor((keeping.dateCount - 1 - date) / keeping.segmentDates);
  return Math.min(last, Math.max(0, last - fromEnd));
}

/** The last date before a segment. */
export function segmentStart(keeping: PathKeeping, segment: number): number {
  const { dateCount, segmentDates } = keeping;
  return Math.max(0, dateCount - 1 - (segmentCount(keeping) - segment) * segmentDates);
}

/** The last date of a segment. */
export function segmentEnd(keeping: PathKeeping, segment: number): number {
  return segment === segmentCount(keeping) - 1 ? keeping.dateCount : segmentStart(keeping, segment + 1);
}

/** Dates whose drivers are kept for good. The last segment is in memory from the start and needs no checkpoint. */
export function checkpointCount(keeping: PathKeeping): number {
  return Math.max(0, Math.ceil((segmentCount(keeping) - 1) / keeping.checkpointEvery) - 1);
}

/** The date from which a segment is simulated again: the nearest checkpoint before it, or today. */
export function checkpointBefore(keeping: PathKeeping, segment: number): number {
  return segmentStart(keeping, segment - (segment % keeping.checkpointEvery));
}

/** Dates in memory at once, checkpoints included. */
export function slotCount(keeping: PathKeeping): number {
  return segmentSlotCount(keeping) + checkpointCount(keeping);
}

/**
 * Where a date of the segment in memory stands. Dates go round, so that the segment before overwrites all but the one
 * date that is still wanted with it.
 */
export function slotOf(keeping: PathKeeping, date: number): number {
  return (date - 1) % segmentSlotCount(keeping);
}

/** Where the checkpoint of a date stands; null for a date that has none. */
export function checkpointSlotOf(keeping: PathKeeping, date: number): number | null {
  for (let number = 1; number <= checkpointCount(keeping); number++) {
    if (segmentStart(keeping, number * keeping.checkpointEvery) === date) return segmentSlotCount(keeping) + number - 1;
  }
  return null;
}

/** Steps by which one path is simulated in all. */
export function pathStepCount(keeping: PathKeeping): number {
  let steps = keeping.dateCount;
  for (let segment = 0; segment < segmentCount(keeping) - 1; segment++)
    steps += segmentEnd(keeping, segment) - checkpointBefore(keeping, segment);
  return steps;
}

/** How often the average step of a path is simulated: 1 where all paths stay in memory. */
export function workFactor(keeping: PathKeeping): number {
  return pathStepCount(keeping) / keeping.dateCount;
}

/** The dates of one segment, and where there are several one date more. */
function segmentSlotCount({ dateCount, segmentDates }: PathKeeping): number {
  return Math.min(dateCount, segmentDates + 1);
}
