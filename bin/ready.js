#!/usr/bin/env node
/**
 * Makes a clone ready to run: installs the packages if the lock file changed since they were installed, and builds if
 * a source changed since the last build. Both are skipped, in well under a second, when there is nothing to do.
 */
import { spawnSync } from 'node:child_process';
import { createHash } from 'node:crypto';
import { copyFileSync, existsSync, mkdirSync, readdirSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';

const root = fileURLToPath(new URL('..', import.meta.url));
const installStamp = join(root, 'node_modules/.tarry-installed');
const buildStamp = join(root, 'dist/.built');

/** Hash over names and contents, so that a checkout with new times but the same text is not built again. */
function fingerprint(files) {
  const hash = createHash('sha256').update(process.version);
  for (const file of files) hash.update(`${file}\0`).update(readFileSync(join(root, file)));
  return hash.digest('hex');
}

function filesBelow(folder) {
  return readdirSync(join(root, folder), { recursive: true, withFileTypes: true })
    .filter((entry) => entry.isFile() && entry.name !== 'grammar.js')
    .map((entry) => join(entry.parentPath, entry.name).slice(root.length))
    .sort();
}

function isCurrent(stamp, wanted) {
  return existsSync(stamp) && readFileSync(stamp, 'utf8') === wanted;
}

function run(words) {
  const { status } = spawnSync(words.join(' '), { cwd: root, shell: true, stdio: ['ignore', 2, 2] });
  if (status !== 0) process.exit(status ?? 1);
}

const wantedInstall = fingerprint(['package.json', 'package-lock.json']);
if (!isCurrent(installStamp, wantedInstall)) {
  process.stderr.write('installing packages …\n');
  run(['npm', 'ci', '--no-audit', '--no-fund', '--loglevel=error']);
  writeFileSync(installStamp, wantedInstall);
}

const wantedBuild = fingerprint(['package-lock.json', 'tsconfig.json', ...filesBelow('src')]);
if (!isCurrent(buildStamp, wantedBuild)) {
  process.stderr.write('building …\n');
  rmSync(join(root, 'dist'), { recursive: true, force: true });
  mkdirSync(join(root, 'dist/program'), { recursive: true });
  run(['npx', 'peggy', '--format', 'es', '--output', 'src/program/grammar.js', 'src/program/grammar.peggy']);
  run(['npx', 'asc', '--config', 'src/program/kernels/asconfig.json', '--outFile', 'dist/program/kernels.wasm']);
  run(['npx', 'tsc', '--project', 'tsconfig.json']);
  copyFileSync(join(root, 'src/program/grammar.js'), join(root, 'dist/program/grammar.js'));
  writeFileSync(buildStamp, wantedBuild);
}
