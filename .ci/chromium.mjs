// Finds a Chromium for the browser tests; as root on Debian installs one; else says what to do.
import { spawnSync } from 'node:child_process';
import { accessSync, constants, existsSync } from 'node:fs';

const places = [
  process.env.CHROMIUM_PATH,
  '/usr/bin/chromium',
  '/usr/bin/chromium-browser',
  '/usr/bin/google-chrome',
  '/Applications/Chromium.app/Contents/MacOS/Chromium',
  '/Applications/Google Chrome.app/Contents/MacOS/Google Chrome',
];

/** Path of an executable Chromium, or null. */
export function findChromium() {
  for (const path of places) {
    if (path === undefined || path === '') continue;
    try {
      accessSync(path, constants.X_OK);
      return path;
    } catch {}
  }
  return null;
}

function installOnDebian() {
  if (!existsSync('/etc/debian_version') || process.getuid?.() !== 0) return;
  process.stderr.write('Installing Chromium for the browser tests (apt-get)…\n');
  const apt = (...words) =>
    spawnSync('apt-get', words, {
      stdio: ['ignore', 2, 2],
      env: { ...process.env, DEBIAN_FRONTEND: 'noninteractive' },
    });
  apt('update');
  apt('install', '-y', '--no-install-recommends', 'chromium');
}

if (process.argv[1]?.endsWith('chromium.mjs')) {
  if (findChromium() === null) installOnDebian();
  if (findChromium() === null) {
    process.stderr.write(
      'No Chromium found for the browser tests. Install one (Debian: apt-get install chromium) or set CHROMIUM_PATH.\n',
    );
    process.exit(1);
  }
}
