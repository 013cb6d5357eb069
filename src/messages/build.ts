import type { AdviceCode, MistakeCode } from './codes.js';
import type { Message, Place, Severity } from './message.js';

/** The parts of a message that differ from case to case. */
export interface MessageParts {
  readonly place?: Place | null;
  /** The line that `place` points into. */
  readonly sourceLine?: string | null;
  /** What was found, in a sentence. */
  readonly what: string;
  /** Why it matters. */
  readonly why: string;
  /** What to write or do instead. */
  readonly mend: string;
  /** Figures and names behind the finding; plain JSON data. */
  readonly evidence?: Readonly<Record<string, unknown>>;
}

/**
 * A message that stops the work.
 *
 * @example mistake('command-line', { what: 'No file is named.', why: 'There is nothing to value.', mend: 'Name a file.' })
 */
export function mistake(code: MistakeCode, parts: MessageParts): Message {
  return message(code, 'mistake', parts);
}

/** A message that travels with a delivered result. */
export function advice(code: AdviceCode, parts: MessageParts): Message {
  return message(code, 'advice', parts);
}

function message(code: string, severity: Severity, parts: MessageParts): Message {
  const { place = null, sourceLine = null, what, why, mend, evidence = {} } = parts;
  return { code, severity, place, sourceLine, what, why, mend, evidence };
}
