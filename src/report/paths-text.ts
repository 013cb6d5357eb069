import type { PathsFinding } from '../result/record.js';
import { counted, factor, memory } from './numbers.js';

/** Whether the fit's paths all stay in memory or are simulated again, and what that costs, in one sentence. */
export function pathsSentence(paths: PathsFinding): string {
  const { kept, segmentDates, checkpointCount, workFactor, bytes } = paths;
  if (kept === 'all') return `All paths of the fit are kept in memory (${memory(bytes)}).`;
  const checkpoints = checkpointCount === 0 ? '' : `, with ${counted(checkpointCount, 'checkpoint')}`;
  return `The paths of the fit are kept in memory (${memory(bytes)}) in segments of ${counted(segmentDates, 'date')}${checkpoints}, and recomputed when another segment is needed: they are simulated ${factor(workFactor)} times instead of once. \`--fit-memory\` sets how much is kept.`;
}
