import { mkdtemp, writeFile } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { Readable } from 'node:stream';
import { parseWidth } from '#built/cli/arguments.js';
import type { Message } from '#built/messages/message.js';
import { readPlan } from '#built/store/read-record.js';
import { readStream, readTextFile } from '#built/store/read-text.js';
import { prepareRunDirectory } from '#built/store/record-file.js';
import type { CodeRow } from './scenario-code-rows.js';

const refusals = (outcome: object): readonly Message[] =>
  'messages' in outcome ? (outcome.messages as readonly Message[]) : [];

async function fileWith(text: string): Promise<string> {
  const path = join(await mkdtemp(join(tmpdir(), 'tarry-codes-')), 'file');
  await writeFile(path, text);
  return path;
}

/** The codes of files and of the command line. */
export const fileCodeRows: readonly CodeRow[] = [
  ['file-unreadable', async () => refusals(await readTextFile(join(tmpdir(), 'no', 'such', 'file'), 10))],
  ['file-too-large', async () => refusals(await readStream(Readable.from([Buffer.from('too much')]), 'pipe', 3))],
  ['file-not-text', async () => refusals(await readStream(Readable.from([Buffer.from([0xff, 0xfe])]), 'pipe', 10))],
  ['record-invalid', async () => refusals(await readPlan(await fileWith('{}')))],
  ['run-directory-unwritable', async () => prepareRunDirectory(join(await fileWith(''), 'below'))],
  [
    'command-line',
    () => {
      const parsed = parseWidth('wide');
      return 'mistake' in parsed ? [parsed.mistake] : [];
    },
  ],
];
