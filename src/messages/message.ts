/** A position in a text that somebody wrote; lines and columns count from 1. */
export interface Place {
  readonly file: string;
  readonly line: number;
  readonly column: number;
  /** Characters to underline, at least 1. */
  readonly length: number;
}

/** `mistake` stops the work; `advice` travels with a delivered result. */
export type Severity = 'mistake' | 'advice';

/**
 * One finding, as data: what was found, why it matters, how to mend it.
 *
 * Messages are records and not strings so that a terminal, a report and a program can each show them their own way.
 */
export interface Message {
  /** Kebab-case, one of the codes in `codes.ts`; never changes its meaning. */
  readonly code: string;
  readonly severity: Severity;
  readonly place: Place | null;
  /** The line of the text that `place` points into, without its line end. */
  readonly sourceLine: string | null;
  readonly what: string;
  readonly why: string;
  readonly mend: string;
  /** Figures and names behind the finding; plain JSON data. */
  readonly evidence: Readonly<Record<string, unknown>>;
}
