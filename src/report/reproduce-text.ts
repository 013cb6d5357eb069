import { printable } from '../messages/printable.js';
import type { RunRecord } from '../result/record.js';
import { paragraph, shellWord } from './prose.js';

const STANDARD_INPUT = 'standard input';

const CONSTANT = 'constants.';

/** Constants that were changed from outside, as options that change them again. */
function withOptions({ settings }: RunRecord): string[] {
  return settings.flatMap(({ name, value, origin }) => {
    if (origin.kind !== 'command line' || !name.startsWith(CONSTANT)) return [];
    // The echo of a formula ends with what it came to: `2 * 0.1 = 0.2`.
    const expression = value.replace(/ = [-+.\de]+$/i, '');
    return [`--with ${shellWord(printable(`${name.slice(CONSTANT.length)}=${expression}`))}`];
  });
}

/** The command that gives the same digits again, and what it must be given. */
export function reproduceText(record: RunRecord, recordPath: string | null, width: number): string {
  const { path, sha256 } = record.scenario;
  const file = path === null || path === STANDARD_INPUT ? '-' : shellWord(printable(path));
  const seed = shellWord(printable(record.seed));
  const plan = recordPath === null ? 'RECORD' : shellWord(printable(recordPath));
  const command = ['  tarry value', file, `--seed ${seed}`, ...withOptions(record), `--plan ${plan}`].join(' ');
  const needs = [
    recordPath === null ? 'RECORD is this run as `--json` prints it or `--run-dir` keeps it.' : '',
    `Scenario sha256 ${sha256.slice(0, 16)}…, tarry ${record.versions.tarry}, Node ${record.versions.node}.`,
    record.status === 'stopped' ? 'This run was stopped: a replay finishes the plan, so its digits differ.' : '',
    'Workers, interpreter and fit memory do not matter.',
  ];
  return `${command}\n${paragraph(needs.filter(Boolean).join(' '), width)}`;
}

/** Settings that were changed outside the file, which a reader of the file would not know. */
export function changedText(record: RunRecord, width: number): string | null {
  const changed = record.settings.filter((setting) => setting.origin.kind === 'command line');
  if (changed.length === 0) return null;
  const words = changed.map((setting) => `${printable(setting.name)} = ${printable(setting.value)}`);
  return paragraph(`Changed on the command line: ${words.join('; ')}.`, width);
}
