import type { z } from 'zod';
import { mistake } from '../messages/build.js';
import type { Message } from '../messages/message.js';
import type { Plan, RunRecord } from '../result/record.js';
import { readTextFile } from './read-text.js';
import { recordShape, replayShape } from './record-shape.js';
import { IS_FOLDER } from './refusal-reason.js';

interface Refused {
  readonly kind: 'refused';
  readonly messages: readonly Message[];
}

/** A plan that was read from a record, or why it could not be. */
export type ReadPlan =
  | {
      readonly kind: 'read';
      readonly plan: Plan;
      /** Hash of the scenario text that the plan was made for, if the record says it. */
      readonly scenarioHash: string | null;
    }
  | Refused;

/** A record that was read back, or why it could not be. */
export type ReadRecord = { readonly kind: 'read'; readonly record: RunRecord } | Refused;

const TYPE_WORDS: Readonly<Record<string, string>> = {
  int: 'a whole number',
  number: 'a number',
  string: 'a text',
  object: 'an object',
  array: 'a list',
};

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

/** What a field must be, in words. */
function wanted(issue: z.core.$ZodIssue): string {
  switch (issue.code) {
    case 'too_small':
      return `${issue.minimum} or more`;
    case 'too_big':
      return `${issue.maximum} or less`;
    case 'invalid_value':
      return issue.values.map((value) => JSON.stringify(value)).join(' or ');
    case 'invalid_type':
      return TYPE_WORDS[issue.expected] ?? 'of another kind';
    default:
      return 'as this program writes it';
  }
}

/** One message for each thing that is missing or wrong. */
function findings(path: string, content: unknown, issues: readonly z.core.$ZodIssue[]): Message[] {
  return issues.map((issue) => {
    if (issue.path.length === 0) return invalid(path, 'is not a record: it holds no object.', {});
    const field = issue.path.join('.');
    const what = isMissing(content, issue.path)
      ? `is not a whole record: \`${field}\` is missing.`
      : `is not a record: \`${field}\` is wrong (it must be ${wanted(issue)}).`;
    return invalid(path, what, { field });
  });
}

/** A run directory is easily given where one record in it is meant. */
function namingRecord(message: Message): Message {
  return message.evidence.reason === IS_FOLDER
    ? { ...message, mend: 'Name one record, as FOLDER/RUN.json: each run in a run directory has a file of its own.' }
    : message;
}

/** Reads a JSON file and holds it against a shape. */
async function readShaped<T>(
  path: string,
  shape: z.ZodType<T>,
): Promise<{ readonly kind: 'read'; readonly content: T } | Refused> {
  const source = await readTextFile(path, RECORD_BYTE_LIMIT);
  if (source.kind === 'refused') return { ...source, messages: source.messages.map(namingRecord) };
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
  const { plan, scenario } = read.content;
  if (plan.upper === 'andersen-broadie' && (plan.nestedOuterPathCount === 0 || plan.nestedInnerPathCount === 0)) {
    const what = 'asks for the Andersen-Broadie upper bound but gives it no paths.';
    return { kind: 'refused', messages: [invalid(path, what, { field: 'plan.upper' })] };
  }
  return { kind: 'read', plan, scenarioHash: scenario?.sha256 ?? null };
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
