import { type ReadText, readStream, readTextFile } from '../store/read-text.js';

/** How standard input is called in messages and records. */
export const STANDARD_INPUT = 'standard input';

/** Far above any scenario; the scenario reader keeps a stricter limit of its own. */
const SCENARIO_BYTE_LIMIT = 16 * 1024 * 1024;

/** Reads the scenario that the command names; `-` is standard input. */
export function readScenario(file: string): Promise<ReadText> {
  return file === '-'
    ? readStream(process.stdin, STANDARD_INPUT, SCENARIO_BYTE_LIMIT)
    : readTextFile(file, SCENARIO_BYTE_LIMIT);
}

/** The scenario's name in messages and in the record. */
export function scenarioName(file: string): string {
  return file === '-' ? STANDARD_INPUT : file;
}
