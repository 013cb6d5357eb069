import type { z } from 'zod';
import { mistake } from '../messages/build.js';
import type { Message } from '../messages/message.js';
import type { Plan, RunRecord } from '../result/record.js';
import { readTextFile } from './read-text.js';
import { recordShape, replayShape } from './record-shape.js';

interface Refused {
  readonly kind: 'refused';
  readonly messages: readonly Message[];
}

/** A plan that was read from a record, or why it could not be. */
export type ReadPlan = { readonly kind: 'read'; readonly plan: Plan } | Refused;

/** A record that was read back, or why it could not be. */
export type ReadRecord = { readonly kind: 'read'; readonly record: RunRecord } | Refused;

const RECORD_BYTE_LIMIT = 256 * 1024 * 1024;

function invalid(path: string, what: string, evidence: Record<string, unknown>): Message {
  return mistake('record-invalid', {
    what: `${path} ${what}`,
    why: 'Only a whole record tells with what counts a run was made and what it found.',
    mend: 'Give a file that `tarry value --json` printed, or one from a run directory, unchanged.',
    evidence,
  });
}

function isMissing(root: unknown, path: readonly PropertyKey[]): boolean {
  let holder = root;
  for (const key of path) {
    if (typeof holder !== 'object' || holder === null || !Object.hasOwn(holder, key)) return true;
    holder = (holder as Record<PropertyKey, unknown>)[key];
  }
  return false;
}

/** One message for each thing that is missing or wrong. */
function findings(path: string, content: unknown, issues: readonly z.core.$ZodIssue[]): Message[] {
  return issues.map((issue) => {
    if (issue.path.length === 0) return invalid(path, 'is not a record: it holds no object.', {});
    const field = issue.path.join('.');
    const what = isMissing(content, issue.path)
      ? `is not a whole record: \`${field}\` is missing.`
      : `is not a record: \`${field}\` is wrong (${issue.message}).`;
    return invalid(path, what, { field });
  });
}

/** Reads a JSON file and holds it against a shape. */
async function readShaped<T>(
  path: string,
  shape: z.ZodType<T>,
): Promise<{ readonly kind: 'read'; readonly content: T } | Refused> {
  const source = await readTextFile(path, RECORD_BYTE_LIMIT);
  if (source.kind === 'refused') return source;
  let content: unknown;
  try {
    content = JSON.parse(source.text);
  } catch (error) {
    const reason = error instanceof Error ? error.message : String(error);
    return { kind: 'refused', messages: [invalid(path, 'is not JSON.', { reason })] };
  }
  const parsed = shape.safeParse(content);
  return parsed.success
    ? { kind: 'read', content: parsed.data }
    : { kind: 'refused', messages: findings(path, content, parsed.error.issues) };
}

/**
 * Reads the plan out of a record in JSON, to replay it.
 *
 * @fails `file-unreadable`, `file-too-large`, `file-not-text`, `record-invalid`
 */
export async function readPlan(path: string): Promise<ReadPlan> {
  const read = await readShaped(path, replayShape);
  if (read.kind === 'refused') return read;
  const { plan } = read.content;
  if (plan.upper === 'andersen-broadie' && (plan.nestedOuterPathCount === 0 || plan.nestedInnerPathCount === 0)) {
    const what = 'asks for the Andersen-Broadie upper bound but gives it no paths.';
    return { kind: 'refused', messages: [invalid(path, what, { field: 'plan.upper' })] };
  }
  return { kind: 'read', plan };
}

/**
 * Reads a whole record back.
 *
 * @fails `file-unreadable`, `file-too-large`, `file-not-text`, `record-invalid`
 */
export async function readRecord(path: string): Promise<ReadRecord> {
  const read = await readShaped(path, recordShape);
  // The shape holds what reports need; what else a record carries is taken on trust, as the writer wrote it.
  return read.kind === 'refused' ? read : { kind: 'read', record: read.content as unknown as RunRecord };
}
