#!/usr/bin/env node
import { existsSync } from 'node:fs';

if (existsSync(new URL('../dist/cli/main.js', import.meta.url))) {
  const { main } = await import('../dist/cli/main.js');
  await main(process.argv);
} else {
  process.stderr.write('tarry is not built yet. Run `npm run build` once in its folder, then try again.\n');
  process.exitCode = 4;
}
