import { createHash } from 'node:crypto';

/** The hash by which records tell which text they were made from. */
export function textHash(text: string): string {
  return createHash('sha256').update(text).digest('hex');
}
