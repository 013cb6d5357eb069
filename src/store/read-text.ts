import { createReadStream } from 'node:fs';
import type { Readable } from 'node:stream';
import { mistake } from '../messages/build.js';
import { memory } from '../messages/figures.js';
import type { Message } from '../messages/message.js';
import { refusalReason } from './refusal-reason.js';

/** A text that was read, or why it could not be. */
export type ReadText =
  | { readonly kind: 'read'; readonly text: string }
  | { readonly kind: 'refused'; readonly messages: readonly Message[] };

function refused(message: Message): ReadText {
  return { kind: 'refused', messages: [message] };
}

/**
 * Reads a whole stream as UTF-8, at most `byteLimit` bytes of it.
 *
 * The limit is kept while reading and not by the size the file system reports, because pipes and devices report none.
 *
 * @fails `file-unreadable`, `file-too-large`, `file-not-text`
 */
export async function readStream(source: Readable, name: string, byteLimit: number): Promise<ReadText> {
  const chunks: Buffer[] = [];
  let byteCount = 0;
  try {
    for await (const chunk of source) {
      byteCount += chunk.length;
      if (byteCount > byteLimit) {
        source.destroy();
        return refused(
          mistake('file-too-large', {
            what: `${name} is larger than ${memory(byteLimit)}.`,
            why: 'A text of this size is not what this place is for, and reading it could use up the memory.',
            mend: 'Check that it is the file you mean.',
            evidence: { byteLimit },
          }),
        );
      }
      chunks.push(chunk);
    }
  } catch (error) {
    const reason = refusalReason(error);
    if (reason === null) throw error;
    return refused(
      mistake('file-unreadable', {
        what: `${name} cannot be read: ${reason}.`,
        why: 'Nothing can be done without it.',
        mend: 'Check the name, the folder you are in, and your right to read it.',
        evidence: { file: name, reason },
      }),
    );
  }
  try {
    return { kind: 'read', text: new TextDecoder('utf-8', { fatal: true }).decode(Buffer.concat(chunks)) };
  } catch {
    return refused(
      mistake('file-not-text', {
        what: `${name} is not UTF-8 text.`,
        why: 'Bytes of another encoding, or of no text at all, would be misread in silence.',
        mend: 'Save it as UTF-8, or check that it is the file you mean.',
        evidence: { file: name },
      }),
    );
  }
}

/** Reads a file as {@link readStream} does. */
export function readTextFile(path: string, byteLimit: number): Promise<ReadText> {
  return readStream(createReadStream(path), path, byteLimit);
}
