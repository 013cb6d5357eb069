#!/usr/bin/env node
/**
 * Prints how fast this machine runs a fixed problem, one JSON line for one thread and one for two workers.
 *
 * The work is that of a valuation, through the same programs, interpreter and conductors: five drivers, nine dates,
 * nineteen columns, no martingale. Argument: the count of paths, 1,000,000 if left out; below some 200,000 fixed costs
 * show. `speedup…` compares the workers with one worker.
 */
import { runYardstick, runYardstickWorkers } from '../dist/benchmark/yardstick.js';
import { thisMachine } from '../dist/workers/machine.js';

const pathCount = Number(process.argv[2] ?? 1_000_000);
if (!Number.isSafeInteger(pathCount) || pathCount < 1000) {
  console.error(`The count of paths is ${process.argv[2]}; it must be a whole number from 1000 up.`);
  process.exit(2);
}
const machine = thisMachine();
console.error('one thread, then two workers against one; some twenty seconds …');
console.log(JSON.stringify(await runYardstick(pathCount, machine)));
console.log(JSON.stringify(await runYardstickWorkers(pathCount, 2, machine)));
