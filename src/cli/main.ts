import { runCommandLine } from './command-line.js';
import { defectMessage } from './defect-message.js';
import { exitCodes } from './exit-codes.js';
import { deliverDocument, remark, showMessages } from './speak.js';
import { tolerateClosedPipes } from './terminal.js';

/** Says that this program failed. */
function confess(defect: unknown, json: boolean): void {
  const message = defectMessage(defect);
  showMessages([message]);
  if (process.env.TARRY_TRACE === '1' && defect instanceof Error) remark(defect.stack ?? '');
  else remark('With TARRY_TRACE=1 in the environment it also prints where it happened.');
  if (json) deliverDocument({ schemaVersion: 1, status: 'failed', messages: [message] });
}

/**
 * The command `tarry`: runs one call and sets the exit code of the process.
 *
 * The code is set and the process left to end by itself, so that everything written still reaches a slow pipe.
 *
 * @param argv as the process has it, with the two words of the interpreter in front
 */
export async function main(argv: string[]): Promise<void> {
  const json = argv.includes('--json');
  tolerateClosedPipes();
  process.once('uncaughtException', (defect) => {
    confess(defect, json);
    process.exit(exitCodes.defect);
  });
  try {
    process.exitCode = await runCommandLine(argv);
  } catch (defect) {
    confess(defect, json);
    process.exitCode = exitCodes.defect;
  }
}
