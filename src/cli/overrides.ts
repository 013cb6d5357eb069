import type { Message } from '../messages/message.js';
import type { CheckOptions } from '../run/options.js';
import { type Parsed, parseFitMemory, parseUpper, parseWidth, parseWith } from './arguments.js';
import { scenarioName } from './scenario-source.js';

/** The options that every command takes which reads a scenario, as the command-line parser leaves them. */
export interface RawOverrides {
  readonly with?: readonly string[];
  readonly seed?: string;
  readonly width?: string;
  readonly upper?: string;
  readonly fitMemory?: string;
}

/** Takes a value where it was read, and gathers what is wrong where it was not. */
export function taken<T>(parsed: Parsed<T> | undefined, mistakes: Message[]): T | undefined {
  if (parsed === undefined) return undefined;
  if ('value' in parsed) return parsed.value;
  mistakes.push(parsed.mistake);
  return undefined;
}

/** Reads what changes the scenario from outside, and what every command is told beside it; every mistake is added to `mistakes`. */
export function readOverrides(file: string, raw: RawOverrides, mistakes: Message[]): CheckOptions {
  const constants = taken(raw.with === undefined ? undefined : parseWith(raw.with), mistakes);
  const width = taken(raw.width === undefined ? undefined : parseWidth(raw.width), mistakes);
  const upper = taken(raw.upper === undefined ? undefined : parseUpper(raw.upper), mistakes);
  const fitMemoryBytes = taken(raw.fitMemory === undefined ? undefined : parseFitMemory(raw.fitMemory), mistakes);
  return {
    path: scenarioName(file),
    ...(raw.seed === undefined ? {} : { seed: raw.seed }),
    ...(constants === undefined ? {} : { with: constants }),
    ...(width === undefined ? {} : { width }),
    ...(upper === undefined ? {} : { upper }),
    ...(fitMemoryBytes === undefined ? {} : { fitMemoryBytes }),
  };
}
