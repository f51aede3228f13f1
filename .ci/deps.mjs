// Installs the locked dependencies when they are not the ones in node_modules.
// Says nothing on standard output, so that a command's own output stays clean.
import { spawnSync } from 'node:child_process';
import { copyFileSync, existsSync, readFileSync } from 'node:fs';

const lock = 'package-lock.json';
const installed = 'node_modules/.skimline-lock.json';
const same = existsSync(installed) && readFileSync(installed).equals(readFileSync(lock));
if (!same) {
  process.stderr.write('Installing dependencies (npm ci)…\n');
  const run = spawnSync('npm', ['ci', '--include=dev', '--no-audit', '--no-fund'], {
    stdio: ['ignore', 2, 2],
    shell: process.platform === 'win32',
  });
  if (run.status !== 0) process.exit(run.status ?? 1);
  copyFileSync(lock, installed);
}
