#!/usr/bin/env node
/** Prints where the time of a valuation goes, stage by stage and kernel by kernel. Argument: a scenario file. */
import { readFileSync } from 'node:fs';
import { profileScenario } from '../dist/benchmark/profile.js';
import { renderMessages } from '../dist/index.js';
import { thisMachine } from '../dist/workers/machine.js';

const file = process.argv[2] ?? 'scenarios/02-five-lots.yaml';
let text;
try {
  text = readFileSync(file, 'utf8');
} catch (problem) {
  console.error(`${file} cannot be read (${problem.code}). Name a scenario file, as in: npm run profile -- FILE`);
  process.exit(2);
}
const outcome = await profileScenario(text, file, thisMachine());
if (outcome.kind === 'refused') {
  console.error(renderMessages(outcome.messages));
  process.exit(1);
}
console.log(`${file}, all work in the calling thread; ns for each path in a call, share of the stage\n`);
for (const { stage, seconds, kernels } of outcome.stages) {
  console.log(`${stage}: ${seconds.toFixed(2)} s`);
  console.log('  share        ns     calls  kernel');
  for (const { name, share, nsPerLane, callCount } of kernels) {
    const perLane = nsPerLane === null ? '' : nsPerLane.toFixed(2);
    const columns = [(100 * share).toFixed(1).padStart(5), perLane.padStart(8), String(callCount).padStart(8)];
    console.log(`  ${columns[0]}%  ${columns[1]}  ${columns[2]}  ${name}`);
  }
  const rest = 1 - kernels.reduce((sum, { share }) => sum + share, 0);
  console.log(
    `  ${(100 * rest).toFixed(1).padStart(5)}%                      outside: solving, copies of paths, start of the engine\n`,
  );
}
