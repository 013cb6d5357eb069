import type { Message } from '../messages/message.js';

/** What the command says to the program that started it. */
export const exitCodes = {
  done: 0,
  /** A mistake in the scenario or in data. */
  refused: 1,
  /** A mistake on the command line, among them options that the scenario cannot follow. */
  usage: 2,
  /** Ended early on request; what was finished is delivered. */
  stopped: 3,
  /** A defect of ours. */
  defect: 4,
  /** Finished, but advice was raised and `--strict` was given. */
  doubted: 5,
  /** Ended at once by a second Ctrl-C. */
  interrupted: 130,
} as const;

/** The code for a refused scenario: whose mistake it is decides, the file's before that of an option beside it. */
export function exitCodeOfRefusal(messages: readonly Message[]): number {
  const isOverride = ({ evidence }: Message) => evidence.override !== undefined;
  return messages.length > 0 && messages.every(isOverride) ? exitCodes.usage : exitCodes.refused;
}
