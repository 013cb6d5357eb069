import { spawn } from 'node:child_process';
import { fileURLToPath } from 'node:url';

const COMMAND = fileURLToPath(new URL('../../bin/tarry.js', import.meta.url));

/** What a call of the command left behind. */
export interface Ended {
  readonly code: number | null;
  readonly stdout: string;
  readonly stderr: string;
}

/** A call that is under way. */
export interface Running {
  readonly ended: Promise<Ended>;
  readonly signal: (name: NodeJS.Signals) => void;
  /** Leaves standard output, as `| head` does. */
  readonly closeOutput: () => void;
}

/** Starts the built command as a process of its own, the way a person does. */
export function startTarry(
  words: readonly string[],
  standardInput = '',
  settings: Record<string, string> = {},
): Running {
  const child = spawn(process.execPath, [COMMAND, ...words], { env: { ...process.env, ...settings } });
  let stdout = '';
  let stderr = '';
  child.stdout.setEncoding('utf8').on('data', (piece: string) => {
    stdout += piece;
  });
  child.stderr.setEncoding('utf8').on('data', (piece: string) => {
    stderr += piece;
  });
  // A command that refuses its options ends before it has read its input.
  child.stdin.on('error', () => {});
  child.stdin.end(standardInput);
  return {
    signal: (name) => {
      child.kill(name);
    },
    closeOutput: () => {
      child.stdout.destroy();
    },
    ended: new Promise((resolve, reject) => {
      child.on('error', reject);
      child.on('close', (code) => resolve({ code, stdout, stderr }));
    }),
  };
}

/** Runs the built command to its end. */
export function tarry(words: readonly string[], standardInput = ''): Promise<Ended> {
  return startTarry(words, standardInput).ended;
}
