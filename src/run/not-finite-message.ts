import { mistake } from '../messages/build.js';
import type { Message } from '../messages/message.js';
import type { NotFinitePlace } from '../rule/not-finite.js';

/** The message for a path that left the finite numbers. */
export function notFiniteMessage(
  { what, line, path, date, time }: NotFinitePlace,
  source: string | object,
  file: string,
): Message {
  const sourceLine = line === null || typeof source !== 'string' ? null : (source.split(/\r?\n/)[line - 1] ?? null);
  const column = sourceLine === null ? 1 : sourceLine.length - sourceLine.trimStart().length + 1;
  return mistake('not-finite', {
    place: line === null ? null : { file: file, line, column, length: Math.max(1, (sourceLine ?? '').trim().length) },
    sourceLine,
    what: `On path ${path}, at date ${date} (time ${time}), ${what} is not a finite number.`,
    why: 'One such path makes every mean meaningless, so the run was stopped; nothing was left out silently.',
    mend: 'Look for a logarithm or root of something that can be negative, a division that can meet 0, growth without bound, or a volatility far too large.',
    evidence: { path, date, time, what },
  });
}
