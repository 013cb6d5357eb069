import { check } from '../index.js';
import type { Message } from '../messages/message.js';
import { checkReport } from '../report/check-text.js';
import { exitCodeOfRefusal, exitCodes } from './exit-codes.js';
import { type RawOverrides, readOverrides } from './overrides.js';
import { readScenario } from './scenario-source.js';
import { deliver, deliverDocument, refuse, showMessages } from './speak.js';
import { pageWidth, styleFor } from './terminal.js';

/** The options of `tarry check` as the command-line parser leaves them. */
export interface CheckFlags extends RawOverrides {
  readonly json?: boolean;
}

/** Checks a scenario and prints its settings and what a run will need; gives the exit code. */
export async function checkCommand(file: string, flags: CheckFlags): Promise<number> {
  const json = flags.json === true;
  const mistakes: Message[] = [];
  const overrides = readOverrides(file, flags, mistakes);
  if (mistakes.length > 0) {
    refuse(mistakes, json);
    return exitCodes.usage;
  }
  const source = await readScenario(file);
  const outcome = source.kind === 'read' ? await check(source.text, overrides) : source;
  if (outcome.kind === 'refused') {
    refuse(outcome.messages, json);
    return exitCodeOfRefusal(outcome.messages);
  }
  const { scenario, forecast, advice } = outcome;
  const { title, money } = scenario.model;
  if (json) {
    showMessages(advice);
    deliverDocument({
      schemaVersion: 1,
      status: 'checked',
      scenario: { path: overrides.path, title, money },
      settings: scenario.settings,
      forecast,
      advice,
    });
  } else {
    const layout = { style: styleFor(process.stdout), width: pageWidth(process.stdout) };
    deliver(checkReport({ title, settings: scenario.settings, forecast, advice }, layout));
  }
  return exitCodes.done;
}
