import { mistake } from '../messages/build.js';
import type { Message } from '../messages/message.js';
import { printable } from '../messages/printable.js';
import type { ValueOptions } from '../run/options.js';
import { readPlan } from '../store/read-record.js';
import { prepareRunDirectory } from '../store/record-file.js';
import { textHash } from '../store/text-hash.js';
import { parseBudget, parseInterpreter, parseWorkers } from './arguments.js';
import { exitCodes } from './exit-codes.js';
import { type RawOverrides, readOverrides, taken } from './overrides.js';
import { readScenario } from './scenario-source.js';

/** The options of `tarry value` as the command-line parser leaves them. */
export interface ValueFlags extends RawOverrides {
  readonly budget?: string;
  readonly plan?: string;
  readonly workers?: string;
  readonly interpreter?: string;
  readonly runDir?: string;
  readonly json?: boolean;
  readonly strict?: boolean;
}

/** Everything a valuation needs from outside, or the exit code and messages that end it before it starts. */
export type Prepared =
  | {
      readonly kind: 'ready';
      readonly text: string;
      readonly options: ValueOptions;
      /** What is worth knowing before the run starts, and no mistake. */
      readonly remarks: readonly string[];
    }
  | { readonly kind: 'refused'; readonly exitCode: number; readonly messages: readonly Message[] };

/** Options that contradict each other. A width beside a plan is no contradiction: the bracket is judged by it. */
function contradictions(flags: ValueFlags): Message[] {
  if (flags.plan === undefined) return [];
  const why = '--plan fixes every count of the run and which upper bound is made.';
  const found: Message[] = [];
  for (const name of ['budget', 'upper'] as const) {
    if (flags[name] !== undefined) {
      const what = `--plan and --${name} are both given.`;
      found.push(mistake('command-line', { what, why, mend: `Leave --${name} or --plan out.` }));
    }
  }
  return found;
}

/** A plan of another text is replayed all the same: its counts are what is wanted. */
function remarksOn(plan: string | undefined, scenarioHash: string | null, text: string): string[] {
  if (plan === undefined || scenarioHash === null || scenarioHash === textHash(text)) return [];
  return [`The plan in ${printable(plan)} comes from another scenario text; its counts are used all the same.`];
}

/** Reads the options, then the files they name, and tries the run directory. */
export async function prepareValue(file: string, flags: ValueFlags): Promise<Prepared> {
  const mistakes: Message[] = [];
  const overrides = readOverrides(file, flags, mistakes);
  const budgetSeconds = taken(flags.budget === undefined ? undefined : parseBudget(flags.budget), mistakes);
  const workers = taken(flags.workers === undefined ? undefined : parseWorkers(flags.workers), mistakes);
  const interpreter = taken(
    flags.interpreter === undefined ? undefined : parseInterpreter(flags.interpreter),
    mistakes,
  );
  mistakes.push(...contradictions(flags));
  if (mistakes.length > 0) return { kind: 'refused', exitCode: exitCodes.usage, messages: mistakes };

  const source = await readScenario(file);
  if (source.kind === 'refused') return { ...source, exitCode: exitCodes.refused };
  const replay = flags.plan === undefined ? null : await readPlan(flags.plan);
  if (replay?.kind === 'refused') return { ...replay, exitCode: exitCodes.refused };
  const unwritable = flags.runDir === undefined ? [] : await prepareRunDirectory(flags.runDir);
  if (unwritable.length > 0) return { kind: 'refused', exitCode: exitCodes.refused, messages: unwritable };
  return {
    kind: 'ready',
    text: source.text,
    remarks: remarksOn(flags.plan, replay?.scenarioHash ?? null, source.text),
    options: {
      ...overrides,
      ...(budgetSeconds === undefined ? {} : { budgetSeconds }),
      ...(workers === undefined ? {} : { workers }),
      ...(interpreter === undefined ? {} : { interpreter }),
      ...(replay === null ? {} : { plan: replay.plan }),
    },
  };
}
