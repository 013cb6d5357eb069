import { blockLanes } from '../program/program.js';
import { Block } from '../rule/block.js';
import type { Programs } from '../rule/programs.js';
import type { Environment } from '../run/environment.js';
import { interpreterMaker } from '../workers/jobs.js';
import { rounded } from './rounded.js';

const warmUpPathCount = 65_536;

/** Measures draws alone, and draws with steps, on one block again and again. */
export function measureDraws(programs: Programs, pathCount: number, { now, kernels }: Environment) {
  const block = new Block(programs, 'draws', interpreterMaker(kernels('wasm')));
  const dateCount = programs.times.length - 1;
  const { innovations, next } = programs.layout;
  const blockCount = Math.ceil(pathCount / blockLanes);
  const units = blockCount * blockLanes * dateCount * programs.drivers.length;
  let sink = 0;
  const nsPerUnit = (work: (index: number) => void) => {
    for (let index = 0; index < warmUpPathCount / blockLanes; index++) work(index);
    const started = now();
    for (let index = 0; index < blockCount; index++) work(index);
    return rounded(((now() - started) * 1e6) / units, 2);
  };
  const nsPerNormal = nsPerUnit((index) => {
    for (let date = 0; date < dateCount; date++) block.draw('outer', index, date, 0);
    sink += block.column(innovations)[3]!;
  });
  const nsPerStateStep = nsPerUnit((index) => {
    block.restart();
    for (let date = 0; date < dateCount; date++) {
      block.advance();
      block.draw('outer', index, date, 0);
      block.step(date, index * blockLanes);
    }
    sink += block.column(next)[0]!;
  });
  return { nsPerNormal, nsPerStateStep, sink: Math.round(sink) };
}
