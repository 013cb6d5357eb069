import { expect, test } from 'vitest';
import { chooseKeeping } from '#built/rule/choose-keeping.js';
import {
  checkpointBefore,
  checkpointSlotOf,
  keepAllPaths,
  type PathKeeping,
  pathStepCount,
  segmentCount,
  segmentEnd,
  segmentOf,
  segmentStart,
  slotCount,
  slotOf,
  workFactor,
} from '#built/rule/path-keeping.js';

/** Dates in memory and steps of one path, counted segment by segment and without the formulas. */
function counted(dateCount: number, segmentDates: number, checkpointEvery: number) {
  const segments: { start: number; end: number }[] = [];
  for (let end = dateCount - 1; end > 0; end -= segmentDates)
    segments.unshift({ start: Math.max(0, end - segmentDates), end });
  const restored = segments.slice(0, -1);
  let from = 0;
  let checkpoints = 0;
  let steps = dateCount;
  restored.forEach(({ start, end }, index) => {
    if (index > 0 && index % checkpointEvery === 0) {
      from = start;
      checkpoints += 1;
    }
    steps += end - from;
  });
  return { slots: Math.min(dateCount, segmentDates + 1) + checkpoints, steps };
}

const dateCounts = Array.from({ length: 60 }, (_, index) => index + 1);

test('slots and steps of every keeping are as counted one by one', () => {
  for (const dateCount of dateCounts) {
    for (let segmentDates = 1; segmentDates <= dateCount; segmentDates++) {
      for (let checkpointEvery = 1; checkpointEvery <= dateCount; checkpointEvery++) {
        const keeping = { dateCount, segmentDates, checkpointEvery };
        const { slots, steps } = counted(dateCount, segmentDates, checkpointEvery);
        if (slotCount(keeping) !== slots || pathStepCount(keeping) !== steps)
          expect({ keeping, slots: slotCount(keeping), steps: pathStepCount(keeping) }).toEqual({
            keeping,
            slots,
            steps,
          });
      }
    }
  }
});

test('the chosen keeping needs as few steps as the best of all, for every budget', () => {
  for (const dateCount of dateCounts) {
    const all = [];
    for (let segmentDates = 1; segmentDates <= dateCount; segmentDates++)
      for (let checkpointEvery = 1; checkpointEvery <= dateCount; checkpointEvery++)
        all.push(counted(dateCount, segmentDates, checkpointEvery));
    for (let budget = 0; budget <= dateCount + 2; budget++) {
      const fitting = all.filter(({ slots }) => slots <= budget);
      const chosen = chooseKeeping(dateCount, budget);
      if (fitting.length === 0) {
        expect(chosen).toBeNull();
        continue;
      }
      const least = Math.min(...fitting.map(({ steps }) => steps));
      expect([pathStepCount(chosen!), slotCount(chosen!) <= budget]).toEqual([least, true]);
    }
  }
});

test('with enough memory every path is simulated once; with two slots for each root of the dates about twice', () => {
  expect(chooseKeeping(365, 365)).toEqual(keepAllPaths(365));
  expect(workFactor(keepAllPaths(365))).toBe(1);
  const twice = chooseKeeping(365, Math.ceil(2 * Math.sqrt(365)))!;
  expect(workFactor(twice)).toBeGreaterThan(1.8);
  expect(workFactor(twice)).toBeLessThan(2);
  expect(workFactor(chooseKeeping(365, 2)!)).toBeCloseTo((365 + (363 * 364) / 2) / 365, 12);
  for (const budget of [1, 0, -1, Number.NaN]) expect(chooseKeeping(365, budget)).toBeNull();
});

/** Walks backward as the fit does; says which date stands in each slot. */
function walk(keeping: PathKeeping): void {
  const { dateCount } = keeping;
  const slots = new Map<number, number>();
  const checkpoints = new Set([0]);
  const lastSegment = segmentCount(keeping) - 1;
  for (let date = 1; date <= dateCount; date++) {
    if (date > segmentStart(keeping, lastSegment)) slots.set(slotOf(keeping, date), date);
    const slot = checkpointSlotOf(keeping, date);
    if (slot === null) continue;
    checkpoints.add(date);
    slots.set(slot, -date);
  }
  let inMemory = lastSegment;
  for (let date = dateCount - 1; date >= 0; date--) {
    const segment = segmentOf(keeping, date);
    if (segment !== inMemory) {
      expect(segment).toBe(inMemory - 1);
      expect(checkpoints).toContain(checkpointBefore(keeping, segment));
      for (let stored = segmentStart(keeping, segment) + 1; stored <= segmentEnd(keeping, segment); stored++)
        slots.set(slotOf(keeping, stored), stored);
      inMemory = segment;
    }
    expect(slots.get(slotOf(keeping, date + 1))).toBe(date + 1);
    if (date > 0) expect(slots.get(slotOf(keeping, date))).toBe(date);
  }
  expect(inMemory).toBe(0);
  expect(slots.size).toBe(slotCount(keeping));
  for (const checkpoint of checkpoints)
    if (checkpoint > 0) expect(slots.get(checkpointSlotOf(keeping, checkpoint)!)).toBe(-checkpoint);
}

test('going backward, a date and the next are always in memory, and no slot is beyond the count', () => {
  for (const dateCount of [1, 2, 3, 7, 13, 19]) {
    for (let segmentDates = 1; segmentDates <= dateCount; segmentDates++) {
      // A segment of all dates but one keeps all paths too, without a slot to spare.
      for (const checkpointEvery of [1, 2, 3, dateCount]) walk({ dateCount, segmentDates, checkpointEvery });
    }
  }
});
