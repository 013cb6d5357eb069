import { readdirSync, readFileSync } from 'node:fs';
import { dirname, join, sep } from 'node:path';
import { fileURLToPath } from 'node:url';
import { expect, test } from 'vitest';

const source = fileURLToPath(new URL('../../src', import.meta.url));

/** Which rooms a room imports; everyone may import `messages` and `numeric`. DEVELOPERS.md explains the rooms. */
const table: Record<string, readonly string[]> = {
  messages: [],
  numeric: [],
  program: [],
  laws: ['program'],
  clauses: ['program'],
  scenario: ['program', 'laws', 'clauses'],
  paths: ['scenario', 'program', 'laws'],
  regression: ['paths', 'program'],
  martingale: ['regression', 'paths', 'program'],
  rule: ['regression', 'martingale', 'paths', 'clauses', 'program'],
  bounds: ['rule', 'martingale', 'paths', 'program'],
  result: [],
  workers: ['bounds', 'rule', 'program'],
  store: ['result'],
  run: ['program', 'scenario', 'rule', 'bounds', 'workers', 'result'],
  benchmark: ['run', 'workers', 'rule', 'scenario', 'program'],
  report: ['result'],
  cli: ['run', 'store', 'report', 'result'],
};

/** Rooms whose plain values anyone further down may name as types. */
const plainValues = ['scenario', 'program', 'paths', 'regression', 'rule', 'bounds', 'result', 'run'];

/** Rooms further up the one direction, for types. */
const order = Object.keys(table);

const files = readdirSync(source, { recursive: true, encoding: 'utf8' }).filter(
  (file) => file.endsWith('.ts') && !file.endsWith('.d.ts'),
);

interface Import {
  readonly file: string;
  readonly room: string;
  readonly target: string;
  readonly isType: boolean;
}

function importsOf(file: string): Import[] {
  const text = readFileSync(join(source, file), 'utf8');
  const room = file.includes(sep) ? file.split(sep)[0]! : 'index';
  return [...text.matchAll(/^(?:import|export)\s+(type\s+)?[^'";]*?from\s+'(\.{1,2}\/[^']+)'/gm)].map(
    ([, type, path]) => {
      const parts = join(dirname(file), path!).split(sep);
      return { file, room, target: parts.length > 1 ? parts[0]! : 'index', isType: type !== undefined };
    },
  );
}

function isAllowed({ room, target, isType }: Import): boolean {
  if (room === 'index' || room === target || target === 'messages' || target === 'numeric') return true;
  if (target === 'index') return room === 'cli';
  if (table[room]!.includes(target)) return true;
  return isType && plainValues.includes(target) && order.indexOf(target) < order.indexOf(room);
}

test('every import follows the table of the house', () => {
  const all = files.flatMap(importsOf);
  expect(all.length).toBeGreaterThan(100);
  expect(all.filter((found) => !isAllowed(found)).map(({ file, target }) => `${file} imports ${target}`)).toEqual([]);
});

test('control: the check refuses an import against the direction', () => {
  expect(isAllowed({ file: 'laws/x.ts', room: 'laws', target: 'paths', isType: false })).toBe(false);
  expect(isAllowed({ file: 'program/x.ts', room: 'program', target: 'scenario', isType: true })).toBe(false);
  expect(isAllowed({ file: 'bounds/x.ts', room: 'bounds', target: 'scenario', isType: false })).toBe(false);
});

/** Source without comments and texts, so that words in them are not taken for code. */
function code(file: string): string {
  return readFileSync(join(source, file), 'utf8')
    .replace(/\/\*[\s\S]*?\*\/|\/\/.*$/gm, '')
    .replace(/'(?:[^'\\\n]|\\.)*'/g, "''");
}

const machineRooms = ['cli', 'store', 'workers'];

test('console, process, files, threads and the clock stay in cli, store and workers', () => {
  const touching = files
    .filter((file) => !machineRooms.includes(file.split(sep)[0]!))
    .filter((file) => {
      const imports = /from 'node:(fs|worker_threads|os|process|perf_hooks|timers|child_process)/.test(
        readFileSync(join(source, file), 'utf8'),
      );
      return imports || /\b(console|process|performance|Date)\s*[.(]|\bsetTimeout\(/.test(code(file));
    });
  expect(touching).toEqual([]);
});

test('nothing that decides a result calls a function whose digits an engine may choose', () => {
  const pattern =
    /Math\.(random|exp|log|pow|sin|cos|tan|tanh|log1p|expm1|cbrt|hypot|log2|log10|sinh|cosh|atan2?|asin|acos)\(|\*\*/;
  const speaking = ['cli', 'store', 'report', 'messages', 'result'];
  const calling = files
    .filter((file) => !speaking.includes(file.split(sep)[0]!))
    .filter((file) => pattern.test(code(file)));
  expect(calling).toEqual([]);
  expect(files.filter((file) => /Math\.random/.test(code(file)))).toEqual([]);
});

test('files are short: none over 350 lines but tables', () => {
  const long = files
    .filter((file) => !file.endsWith('-tables.ts'))
    .filter((file) => readFileSync(join(source, file), 'utf8').split('\n').length > 350);
  expect(long).toEqual([]);
});
