import { interpreterKinds, upperMethods } from '../index.js';
import { mistake } from '../messages/build.js';
import { memory } from '../messages/figures.js';
import type { Message } from '../messages/message.js';
import { nearest } from '../messages/nearest.js';
import { listed } from '../messages/printable.js';
import type { InterpreterKind, Overrides } from '../run/options.js';

/** A value read from the command line, or what is wrong with it. */
export type Parsed<T> = { readonly value: T } | { readonly mistake: Message };

type UpperMethod = NonNullable<Overrides['upper']>;

const MOST_WORKERS = 512;
const MOST_BYTES = 1e15;
const SECONDS_PER: Readonly<Record<string, number>> = { s: 1, m: 60, h: 3600 };
const MOST_SECONDS = 7 * 24 * 3600;
const BYTES_PER: Readonly<Record<string, number>> = { KB: 1e3, MB: 1e6, GB: 1e9, TB: 1e12 };
const POSITIVE_NUMBER = /^(\d+(\.\d*)?|\.\d+)(e[+-]?\d+)?$/i;

function wrong(what: string, why: string, mend: string, evidence: Record<string, unknown>): { mistake: Message } {
  return { mistake: mistake('command-line', { what, why, mend, evidence }) };
}

/**
 * Reads `--with NAME=EXPRESSION`, parted at the first equals sign. Whether the name exists and the expression is sound
 * is judged with the scenario.
 */
export function parseWith(texts: readonly string[]): Parsed<Readonly<Record<string, string>>> {
  const entries = new Map<string, string>();
  for (const text of texts) {
    const parting = text.indexOf('=');
    const name = text.slice(0, Math.max(0, parting)).trim();
    const expression = text.slice(parting + 1).trim();
    if (parting < 0 || name === '' || expression === '') {
      const mend = 'Write it as in --with spread=0.25, with quotes around it if it holds spaces or brackets.';
      return wrong(
        `--with ${text} is not of the form NAME=EXPRESSION.`,
        'A constant needs a name and a new value.',
        mend,
        { text },
      );
    }
    if (entries.has(name)) {
      return wrong(`--with names ${name} twice.`, 'Only one value can hold.', 'Leave one of the two out.', { name });
    }
    entries.set(name, expression);
  }
  return { value: Object.fromEntries(entries) };
}

/** Reads `--width`: a share of the value such as `0.1%`, or an amount of money such as `0.02`. */
export function parseWidth(text: string): Parsed<string> {
  const trimmed = text.trim();
  const digits = trimmed.endsWith('%') ? trimmed.slice(0, -1).trimEnd() : trimmed;
  const amount = Number(digits);
  if (!POSITIVE_NUMBER.test(digits) || !Number.isFinite(amount) || amount <= 0) {
    const mend = 'Write --width 0.1% for a share of the value, or --width 0.02 for an amount of money.';
    return wrong(`--width ${text} is no width.`, 'A bracket is as wide as a positive number says.', mend, { text });
  }
  return { value: trimmed.endsWith('%') ? `${digits}%` : digits };
}

/** Reads `--budget`: a number with `s`, `m` or `h` behind it, as seconds. */
export function parseBudget(text: string): Parsed<number> {
  const found = /^(.*?)\s*([smh])?$/.exec(text.trim());
  const digits = found?.[1] ?? '';
  const unit = found?.[2];
  const mend = 'Write --budget 30s, --budget 2m or --budget 1h.';
  if (!POSITIVE_NUMBER.test(digits)) {
    return wrong(`--budget ${text} is no length of time.`, 'The run is planned to take about that long.', mend, {
      text,
    });
  }
  if (unit === undefined) {
    return wrong(`--budget ${text} has no unit.`, 'It could mean seconds or minutes.', mend, { text });
  }
  const seconds = Number(digits) * SECONDS_PER[unit]!;
  if (seconds === 0) {
    return wrong(`--budget ${text} is no time at all.`, 'A run takes some time, however small it is.', mend, {
      seconds,
    });
  }
  if (!(seconds <= MOST_SECONDS)) {
    return wrong(`--budget ${text} is out of range.`, 'A run can be planned for up to seven days.', mend, { seconds });
  }
  return { value: seconds };
}

/** Reads `--fit-memory`: a number with `KB`, `MB`, `GB` or `TB` behind it, powers of ten, as bytes. */
export function parseFitMemory(text: string): Parsed<number> {
  const found = /^(.*?)\s*([kmgt]b)?$/i.exec(text.trim());
  const digits = found?.[1] ?? '';
  const unit = found?.[2]?.toUpperCase();
  const mend = 'Write --fit-memory 256MB or --fit-memory 1GB.';
  if (!POSITIVE_NUMBER.test(digits) || !(Number(digits) > 0)) {
    const why = 'It must be a number above 0 with a unit: KB, MB, GB or TB, powers of ten.';
    return wrong(`--fit-memory ${text} is no amount of memory.`, why, mend, { text });
  }
  if (unit === undefined) {
    return wrong(`--fit-memory ${text} has no unit.`, 'It could mean bytes or megabytes.', mend, { text });
  }
  const bytes = Number(digits) * BYTES_PER[unit]!;
  if (!(bytes <= MOST_BYTES)) {
    return wrong(`--fit-memory ${text} is out of range.`, `At most ${memory(MOST_BYTES)} can be asked for.`, mend, {
      bytes,
    });
  }
  return { value: bytes };
}

/** Reads `--workers`: how many threads; 0 computes without any. */
export function parseWorkers(text: string): Parsed<number> {
  const count = Number(text);
  if (!/^\d+$/.test(text.trim()) || count > MOST_WORKERS) {
    const why = `The number of threads is a whole number from 0 (none beside the main one) to ${MOST_WORKERS}.`;
    return wrong(`--workers ${text} is no number of threads.`, why, 'Write --workers 2.', { text });
  }
  return { value: count };
}

/** Reads `--upper`: how the martingale bound is made. */
export function parseUpper(text: string): Parsed<UpperMethod> {
  const why = `The bound can be made by ${listed(upperMethods, 'or')}.`;
  return oneOf('--upper', text, upperMethods, 'method', why);
}

/** Reads `--interpreter`: what runs the compiled programs. */
export function parseInterpreter(text: string): Parsed<InterpreterKind> {
  const why = 'Programs are run by `wasm`, the fast one, or by `plain`, slow and readable; both give the same bits.';
  return oneOf('--interpreter', text, interpreterKinds, 'interpreter', why);
}

function oneOf<T extends string>(
  option: string,
  text: string,
  choices: readonly T[],
  noun: string,
  why: string,
): Parsed<T> {
  const found = choices.find((choice) => choice === text.trim());
  if (found !== undefined) return { value: found };
  const near = nearest(text, choices);
  const mend = near.length > 0 ? `Did you mean ${listed(near, 'or')}?` : `Write ${option} ${choices[0]}.`;
  return wrong(`${option} ${text} is no ${noun}.`, why, mend, { text });
}
