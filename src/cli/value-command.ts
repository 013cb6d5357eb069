import { value } from '../index.js';
import { textReport } from '../report/text.js';
import type { RunRecord } from '../result/record.js';
import type { ValueOutcome } from '../run/options.js';
import { recordText, writeRecord } from '../store/record-file.js';
import { exitCodeOfRefusal, exitCodes } from './exit-codes.js';
import { listenForInterruption } from './interruption.js';
import { progressOn } from './progress.js';
import { deliver, deliverDocument, refuse, remark, showMessages } from './speak.js';
import { pageWidth, styleFor } from './terminal.js';
import { type Prepared, prepareValue, type ValueFlags } from './value-arguments.js';

const STOPPING = 'Stopping: what is finished will be delivered. Ctrl-C once more ends at once.';

/** Runs the valuation with the bar on, listening for Ctrl-C. */
async function run({ text, options }: Extract<Prepared, { kind: 'ready' }>): Promise<ValueOutcome> {
  const progress = progressOn(process.stderr);
  const interruption = listenForInterruption(() => {
    progress.end();
    remark(STOPPING);
  });
  const onProgress = (state: Parameters<typeof progress.show>[0]) => {
    if (!interruption.signal.aborted) progress.show(state);
  };
  try {
    return await value(text, { ...options, signal: interruption.signal, onProgress });
  } finally {
    progress.end();
    interruption.release();
  }
}

/** Keeps the record if a run directory is named; a failure is said but never costs the result. */
async function keep(
  record: RunRecord,
  directory: string | undefined,
): Promise<{ path: string | null; failed: boolean }> {
  if (directory === undefined) return { path: null, failed: false };
  const written = await writeRecord(directory, record, new Date());
  if (written.kind === 'written') {
    remark(`Run ${written.id} is kept as ${written.path}`);
    return { path: written.path, failed: false };
  }
  showMessages(written.messages);
  return { path: null, failed: true };
}

function exitCodeOf(record: RunRecord, keepingFailed: boolean, strict: boolean): number {
  if (record.status === 'stopped') return exitCodes.stopped;
  if (keepingFailed) return exitCodes.refused;
  return strict && record.advice.length > 0 ? exitCodes.doubted : exitCodes.done;
}

/** Values a scenario and prints the bracket; gives the exit code. */
export async function valueCommand(file: string, flags: ValueFlags): Promise<number> {
  const json = flags.json === true;
  const prepared = await prepareValue(file, flags);
  if (prepared.kind === 'refused') {
    refuse(prepared.messages, json);
    return prepared.exitCode;
  }
  for (const words of prepared.remarks) remark(words);
  const outcome = await run(prepared);
  if (outcome.kind === 'refused') {
    refuse(outcome.messages, json);
    return exitCodeOfRefusal(outcome.messages);
  }
  if (outcome.kind === 'stopped') {
    remark('Stopped before there was a bracket; there is nothing to deliver.');
    if (json) deliverDocument({ schemaVersion: 1, status: 'stopped', stage: outcome.stage, messages: [] });
    return exitCodes.stopped;
  }
  const { record } = outcome;
  const kept = await keep(record, flags.runDir);
  if (json) {
    showMessages(record.advice);
    deliver(recordText(record));
  } else {
    const layout = { style: styleFor(process.stdout), width: pageWidth(process.stdout), recordPath: kept.path };
    deliver(textReport(record, layout));
  }
  return exitCodeOf(record, kept.failed, flags.strict === true);
}
