import { createHash } from 'node:crypto';

/**
 * Names a run by the time it ended (UTC) and its content: ids sort by time, and two runs of one moment differ.
 *
 * @example runId(new Date(0), '{}') // '19700101-000000000-44136fa3'
 */
export function runId(endedAt: Date, content: string): string {
  const [date = '', time = ''] = endedAt
    .toISOString()
    .replace(/[-:.Z]/g, '')
    .split('T');
  const hash = createHash('sha256').update(content).digest('hex').slice(0, 8);
  return `${date}-${time}-${hash}`;
}
