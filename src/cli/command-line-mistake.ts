import type { CommanderError } from 'commander';
import { mistake } from '../messages/build.js';
import type { Message } from '../messages/message.js';

const WHY: Readonly<Record<string, string>> = {
  'commander.unknownOption': 'Passing over an option that is not known could change what the call means.',
  'commander.unknownCommand': 'Only the commands that `tarry --help` lists exist.',
  'commander.missingArgument': 'Without it there is nothing to work on.',
  'commander.optionMissingArgument': 'This option means nothing without a value.',
  'commander.excessArguments': 'One call works on one scenario.',
};

/** Turns the complaint of the command-line parser into a message of our own form, with its near name as the remedy. */
export function fromCommander(error: CommanderError, helpCommand: string): Message {
  const [, body = '', near] = /^(?:error: )?([\s\S]*?)(?:\n\(Did you mean ([\s\S]*?)\?\))?$/.exec(error.message) ?? [];
  const what = body.trim().replace(/^./, (letter) => letter.toUpperCase());
  const help = `\`${helpCommand}\` lists what there is.`;
  return mistake('command-line', {
    what: /[.!?]$/.test(what) ? what : `${what}.`,
    why: WHY[error.code] ?? 'The command cannot tell what is meant.',
    mend: near === undefined ? help : `Did you mean ${near}? ${help}`,
    evidence: { parser: error.code },
  });
}
