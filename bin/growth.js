#!/usr/bin/env node
/** Prints how the cost of a path grows with drivers and with dates, one JSON line for each problem. */
import { measureGrowth } from '../dist/benchmark/growth.js';
import { thisMachine } from '../dist/workers/machine.js';

for (const line of await measureGrowth(thisMachine())) console.log(JSON.stringify(line));
