import type { PathsFinding } from '../result/record.js';
import { counted, factor, memory } from './numbers.js';

/** Whether the fit's paths all stay in memory or are simulated again, and what that costs, in one sentence. */
export function pathsSentence(paths: PathsFinding): string {
  const { kept, segmentDates, checkpointCount, workFactor, bytes } = paths;
  if (kept === 'all')
    return `All paths of the fit are kept in memory (${memory(bytes)}), so that each is simulated once.`;
  const checkpoints = checkpointCount === 0 ? '' : ` and at ${counted(checkpointCount, 'checkpoint')}`;
  return `The paths of the fit are kept in memory (${memory(bytes)}) for ${counted(segmentDates, 'date')} at a time${checkpoints}, and recomputed elsewhere: ${factor(workFactor)} times the work of simulating each once.`;
}
