#!/usr/bin/env node
/** Prints where the time of a valuation goes, stage by stage and kernel by kernel. Argument: a scenario file. */
import { readFileSync } from 'node:fs';
import { profileScenario } from '../dist/benchmark/profile.js';
import { thisMachine } from '../dist/workers/machine.js';

const file = process.argv[2] ?? 'scenarios/02-five-lots.yaml';
for (const { stage, seconds, kernels } of await profileScenario(readFileSync(file, 'utf8'), thisMachine())) {
  console.log(`${stage}: ${seconds.toFixed(2)} s in the calling thread`);
  for (const { name, share, nsPerLane, callCount } of kernels) {
    const perLane = nsPerLane === null ? '' : nsPerLane.toFixed(2);
    console.log(
      `  ${(100 * share).toFixed(1).padStart(5)}%  ${perLane.padStart(8)} ns/lane  ${String(callCount).padStart(8)} calls  ${name}`,
    );
  }
  const rest = 1 - kernels.reduce((sum, { share }) => sum + share, 0);
  console.log(`  ${(100 * rest).toFixed(1).padStart(5)}%  outside the kernels`);
}
