import { spawnSync } from 'node:child_process';
import { existsSync } from 'node:fs';
import { join } from 'node:path';

const USUAL_PATHS = [
  '/usr/bin/chromium',
  '/usr/bin/chromium-browser',
  '/usr/bin/google-chrome-stable',
  '/usr/bin/google-chrome',
  '/snap/bin/chromium',
  '/Applications/Chromium.app/Contents/MacOS/Chromium',
  '/Applications/Google Chrome.app/Contents/MacOS/Google Chrome',
  ...[process.env.PROGRAMFILES, process.env['PROGRAMFILES(X86)'], process.env.LOCALAPPDATA]
    .filter((folder) => folder !== undefined)
    .map((folder) => join(folder, 'Google', 'Chrome', 'Application', 'chrome.exe')),
];

export const CHROMIUM_INSTRUCTIONS =
  'The browser tests need Chromium or Chrome. Install it (Debian, Ubuntu: apt-get install chromium), or name it:\n' +
  '  CHROMIUM=/path/to/chromium npm test';

/**
 * Path of a Chromium: the environment variable CHROMIUM first, then the usual places.
 * @returns {string | undefined}
 */
export function findChromium() {
  const named = process.env.CHROMIUM;
  if (named) return existsSync(named) ? named : undefined;
  return USUAL_PATHS.find((path) => existsSync(path));
}

/**
 * Finds Chromium, or installs it where this can be done without asking: as root with apt-get.
 * @returns {string | undefined}
 */
export function findOrInstallChromium() {
  const found = findChromium();
  if (found !== undefined || process.env.CHROMIUM) return found;
  const isRoot = process.getuid?.() === 0;
  if (!isRoot || !existsSync('/usr/bin/apt-get')) return undefined;
  console.log('Installing Chromium for the browser tests ...');
  const env = { ...process.env, DEBIAN_FRONTEND: 'noninteractive' };
  const options = /** @type {const} */ ({ stdio: 'inherit', env });
  spawnSync('apt-get', ['update', '-qq'], options);
  spawnSync('apt-get', ['install', '-y', '-qq', '--no-install-recommends', 'chromium'], options);
  return findChromium();
}
