import { Argument, Command, CommanderError } from 'commander';
import { upperMethods, version } from '../index.js';
import { type CheckFlags, checkCommand } from './check-command.js';
import { fromCommander } from './command-line-mistake.js';
import { exitCodes } from './exit-codes.js';
import { refuse } from './speak.js';
import type { ValueFlags } from './value-arguments.js';
import { valueCommand } from './value-command.js';

const EXIT_CODES = `
Exit codes:
  0  done
  1  mistake in the scenario or in data
  2  mistake on the command line, or in what --with, --seed, --width, --upper,
     --budget or --fit-memory ask of the scenario
  3  stopped early; what was finished is delivered
  4  a defect of this program
  5  finished, but advice was raised and --strict was given`;

function gather(text: string, earlier: string[] = []): string[] {
  return [...earlier, text];
}

/** A command on one scenario, with the options that all such commands share. */
function scenarioCommand(program: Command, name: string, summary: string): Command {
  return program
    .command(name)
    .summary(summary)
    .description(summary)
    .addArgument(new Argument('<FILE>', 'the scenario; - reads it from standard input'))
    .option('--with <NAME=EXPRESSION>', 'give a constant another value (may be repeated)', gather)
    .option('--seed <TEXT>', 'draw other random numbers: any text')
    .option('--width <WIDTH>', 'wanted width of the bracket: 0.1% of the value, or 0.02 in money')
    .option('--fit-memory <SIZE>', 'memory for the paths of the fit, 256MB or 1GB; the result does not depend on it')
    .option('--json', 'print one JSON document on standard output and nothing else there');
}

function build(finish: (exitCode: number) => void): Command {
  const program = new Command('tarry')
    .description(
      'Values early-exercise rights on many uncertain drivers: a scenario file goes in, a bracket comes out.',
    )
    .version(version(), '--version', 'print the version')
    .helpOption('--help', 'print this help')
    .helpCommand('help [COMMAND]', 'print the help of a command')
    .addHelpText('after', EXIT_CODES)
    .exitOverride()
    // Complaints are printed by us, in the form of every other message.
    .configureOutput({ outputError: () => {} });

  scenarioCommand(program, 'check', 'read a scenario, show every setting and what a run will need').action(
    async (file: string, flags: CheckFlags) => finish(await checkCommand(file, flags)),
  );

  scenarioCommand(program, 'value', 'value a scenario: a lower bound, an upper bound and a 95% bracket')
    .option('--budget <TIME>', 'plan the run for about this long: 30s, 2m or 1h')
    .option('--plan <RECORD>', 'replay the counts of an earlier run, from its record')
    .option('--upper <METHOD>', `how the martingale bound is made: ${upperMethods.join(', ')}`)
    .option('--workers <COUNT>', 'threads to use; the result does not depend on it')
    .option('--interpreter <KIND>', 'wasm (default) or plain, slower and readable; the result does not depend on it')
    .option('--run-dir <FOLDER>', 'keep the record of the run in this folder')
    .option('--strict', 'end with exit code 5 if advice was raised')
    .action(async (file: string, flags: ValueFlags) => finish(await valueCommand(file, flags)));

  return program;
}

/** The help that answers a mistake in this call. */
function helpFor(program: Command, words: readonly string[]): string {
  const named = program.commands.find((command) => command.name() === words[0]);
  return named === undefined ? 'tarry --help' : `tarry ${named.name()} --help`;
}

/**
 * Runs one call of the command line and gives its exit code.
 *
 * @param argv as the process has it, with the two words of the interpreter in front
 */
export async function runCommandLine(argv: readonly string[]): Promise<number> {
  let exitCode: number = exitCodes.done;
  const program = build((code) => {
    exitCode = code;
  });
  try {
    await program.parseAsync([...argv]);
  } catch (error) {
    if (!(error instanceof CommanderError)) throw error;
    if (error.exitCode === 0) return exitCodes.done;
    const words = argv.slice(2);
    // A call without a command has printed the help already.
    if (error.code !== 'commander.help')
      refuse([fromCommander(error, helpFor(program, words))], words.includes('--json'));
    return exitCodes.usage;
  }
  return exitCode;
}
