import { type FileHandle, mkdir, open, rename, rm, stat } from 'node:fs/promises';
import { dirname, join } from 'node:path';
import { mistake } from '../messages/build.js';
import type { Message } from '../messages/message.js';
import type { RunRecord } from '../result/record.js';
import { refusalReason } from './refusal-reason.js';
import { runId } from './run-id.js';

/** A record that is kept, or why it could not be. */
export type WrittenRecord =
  | { readonly kind: 'written'; readonly id: string; readonly path: string }
  | { readonly kind: 'refused'; readonly messages: readonly Message[] };

/** A record as text: what `--json` prints and what a run directory keeps. */
export function recordText(record: RunRecord): string {
  return `${JSON.stringify(record, null, 2)}\n`;
}

/** Runs an operation on the run directory; a refusal by the system becomes a message, anything else is thrown on. */
async function orRefusal<T>(directory: string, work: () => Promise<T>): Promise<T | readonly Message[]> {
  try {
    return await work();
  } catch (error) {
    const reason = refusalReason(error);
    if (reason === null) throw error;
    return [
      mistake('run-directory-unwritable', {
        what: `Nothing can be written into the run directory ${directory}: ${reason}.`,
        why: 'The record of the run is to be kept there.',
        mend: 'Give --run-dir a folder that you may write to; it is made if its name is free.',
        evidence: { directory, reason },
      }),
    ];
  }
}

/**
 * Makes a folder and the folders above it that are missing, one by one.
 *
 * The system's own recursive call is not used, because it never returns where a folder refuses to be made and its parent
 * exists, as below /proc.
 */
async function makeFolder(directory: string): Promise<void> {
  const missing: string[] = [];
  for (let folder = directory; ; folder = dirname(folder)) {
    const refusal = await tryFolder(folder);
    if (refusal === null) break;
    if (refusal.code !== 'ENOENT' || dirname(folder) === folder) throw refusal;
    missing.push(folder);
  }
  for (const folder of missing.reverse()) {
    const refusal = await tryFolder(folder);
    if (refusal !== null) throw refusal;
  }
}

/** Null when the folder exists in the end, whoever made it. */
async function tryFolder(folder: string): Promise<NodeJS.ErrnoException | null> {
  try {
    await mkdir(folder);
    return null;
  } catch (error) {
    // A read-only file system may refuse a folder that is there before it looks whether it is.
    const isThere = await stat(folder).then(
      (found) => found.isDirectory(),
      () => false,
    );
    return isThere ? null : (error as NodeJS.ErrnoException);
  }
}

async function syncDirectory(directory: string): Promise<void> {
  const handle = await open(directory, 'r');
  try {
    await handle.sync();
  } catch {
    // Some file systems cannot sync a folder; the file itself is safe by then.
  } finally {
    await handle.close();
  }
}

/** Writes to a name nobody reads and renames: a reader finds the whole record or none, even after a power cut. */
async function writeWhole(directory: string, fileName: string, text: string): Promise<void> {
  const unfinished = join(directory, `.${fileName}.${process.pid}.unfinished`);
  let handle: FileHandle | undefined;
  try {
    handle = await open(unfinished, 'w');
    await handle.writeFile(text);
    await handle.sync();
    await handle.close();
    handle = undefined;
    await rename(unfinished, join(directory, fileName));
  } catch (error) {
    await handle?.close();
    await rm(unfinished, { force: true });
    throw error;
  }
  await syncDirectory(directory);
}

/**
 * Makes a run directory and tries it, so that a long run does not end with nowhere to keep its record.
 *
 * @returns nothing to say, or the message `run-directory-unwritable`
 */
export async function prepareRunDirectory(directory: string): Promise<readonly Message[]> {
  const tried = await orRefusal(directory, async () => {
    await makeFolder(directory);
    const trial = join(directory, `.${process.pid}.trial`);
    const handle = await open(trial, 'w');
    await handle.close();
    await rm(trial, { force: true });
  });
  return tried ?? [];
}

/**
 * Keeps a record in a run directory under an id of its own.
 *
 * @param endedAt handed in, because only the command line reads the clock
 * @fails `run-directory-unwritable`
 */
export async function writeRecord(directory: string, record: RunRecord, endedAt: Date): Promise<WrittenRecord> {
  const text = recordText(record);
  const id = runId(endedAt, text);
  const fileName = `${id}.json`;
  const refusal = await orRefusal(directory, async () => {
    await makeFolder(directory);
    await writeWhole(directory, fileName, text);
  });
  return refusal === undefined
    ? { kind: 'written', id, path: join(directory, fileName) }
    : { kind: 'refused', messages: refusal };
}
