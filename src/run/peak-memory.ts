import { blockLanes, columnStride, instructionWidth, type Program } from '../program/program.js';
import { largestNumberCount, type Programs, programList, workspaceColumnCount } from '../rule/programs.js';
import { fitParcels } from './fit-stage.js';
import type { ForecastCounts } from './forecast.js';

/** Resident before any work: the engine with this program's code, and each thread's own engine. Measured, see DEVELOPERS.md. */
const processBytes = 100e6;
const threadBytes = 25e6;

/** What one instruction of the programs leaves resident: graph and compiler in the process, a copy in each thread. */
const instructionBytes = 450;
const threadInstructionBytes = 50;

const numberBytes = Float64Array.BYTES_PER_ELEMENT;

/**
 * Memory resident at the peak of a run, all threads together.
 *
 * A workspace counts only for threads that find a parcel to work on: what is never touched is never resident.
 *
 * @param pathBytes what the fit's paths take. @unit bytes
 */
export function peakMemoryBytes(
  programs: Programs,
  counts: ForecastCounts,
  pathBytes: number,
  workerCount: number,
): number {
  const dateCount = programs.times.length - 1;
  const columnCount = programs.columns.length;
  const parcelCount = fitParcels(counts.fitPathCount).length;
  const busyCount = Math.min(Math.max(1, workerCount), mostParcels(counts, parcelCount));
  const numberCount = largestNumberCount(programs);
  const workspace = workspaceColumnCount(programs) * columnStride + numberCount;
  const rule = (dateCount + 1) * columnCount * (1 + programs.polynomialNames.length);
  const instructionCount = programList(programs).reduce((total, program) => total + sizeOf(program), 0);
  return (
    processBytes +
    workerCount * threadBytes +
    instructionCount * (instructionBytes + workerCount * threadInstructionBytes) +
    pathBytes +
    (2 * counts.fitPathCount + parcelCount * numberCount + rule + busyCount * workspace) * numberBytes
  );
}

/** The peak of a run that holds what one rule needs while it fits another, from the peaks of each alone. */
export function peakMemoryOfTwo(peaks: readonly number[]): number {
  const [most = 0, second] = [...peaks].sort((a, b) => b - a);
  return second === undefined ? most : most + second - processBytes;
}

/** Parcels of the stage that has the most; a count that the pilot will set is taken to be enough for everybody. */
function mostParcels(counts: ForecastCounts, fitParcelCount: number): number {
  if (counts.outerPathCount === null) return Number.POSITIVE_INFINITY;
  const outerBlocks = Math.ceil(Math.max(counts.outerPathCount, counts.nestedOuterPathCount) / blockLanes);
  return Math.max(fitParcelCount, outerBlocks);
}

function sizeOf({ laneCode, uniformCode }: Program): number {
  return (laneCode.length + uniformCode.length) / instructionWidth;
}
