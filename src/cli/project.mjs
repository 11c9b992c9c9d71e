import { createHash } from 'node:crypto';
import { existsSync, readdirSync, readFileSync, statSync, writeFileSync } from 'node:fs';
import { spawn, spawnSync } from 'node:child_process';
import { dirname, join } from 'node:path';
import { fileURLToPath } from 'node:url';

/** The project's own folder, wherever the command was started. */
export const ROOT = join(dirname(fileURLToPath(import.meta.url)), '..', '..');
export const DIST = join(ROOT, 'dist');

/** What a build depends on; a change in any of these makes dist/ old. */
const BUILD_INPUTS = [
  'src',
  'public',
  'index.html',
  'vite.config.ts',
  'package.json',
  'package-lock.json',
  'LICENSE',
];
const INPUTS_STAMP = join(DIST, '.inputs');

/**
 * Runs a program in the project's folder with its output on ours.
 * @param {string} program
 * @param {readonly string[]} args
 * @param {NodeJS.ProcessEnv} [env]
 * @returns {Promise<number>} its exit status
 */
export function run(program, args, env = {}) {
  return new Promise((resolve) => {
    const child = spawn(program, args, {
      cwd: ROOT,
      stdio: 'inherit',
      env: { ...process.env, ...env },
      // npm is a script on Windows and needs a shell there.
      shell: process.platform === 'win32' && program === 'npm',
    });
    child.on('error', () => resolve(127));
    child.on('exit', (status) => resolve(status ?? 1));
  });
}

/** Runs `npm ci` unless what is installed is what the lock file says. */
export async function installMissing() {
  if (isInstalled()) return;
  console.log('Installing what is missing (a minute on a slow line) ...');
  const status = await run('npm', ['ci', '--include=dev', '--ignore-scripts', '--no-audit', '--no-fund']);
  if (status !== 0) {
    throw new Error(
      'npm could not install what the lock file names. Is there a network? Its message stands above.',
    );
  }
}

/** npm keeps a lock of what it put into node_modules, written last: absent or different means not installed. */
function isInstalled() {
  const hidden = join(ROOT, 'node_modules', '.package-lock.json');
  if (!existsSync(hidden)) return false;
  const wanted = packagesOf(join(ROOT, 'package-lock.json'));
  const present = packagesOf(hidden);
  return Object.entries(wanted).every(
    ([path, entry]) => path === '' || entry.optional === true || present[path]?.version === entry.version,
  );
}

/**
 * @param {string} path of a lock file
 * @returns {Record<string, { version?: string, optional?: boolean }>}
 */
function packagesOf(path) {
  return JSON.parse(readFileSync(path, 'utf8')).packages;
}

/** Short name of the commit, or "unknown" outside a git checkout. */
export function commit() {
  const git = spawnSync('git', ['rev-parse', '--short=10', 'HEAD'], { cwd: ROOT, encoding: 'utf8' });
  return git.status === 0 ? git.stdout.trim() : 'unknown';
}

/** Builds dist/ when an input changed since the last build. */
export async function buildWhenOld() {
  if (existsSync(INPUTS_STAMP) && readFileSync(INPUTS_STAMP, 'utf8') === inputsHash()) return;
  await build();
}

/** Builds dist/. */
export async function build() {
  const hash = inputsHash();
  const status = await run(process.execPath, [join(ROOT, 'node_modules', 'vite', 'bin', 'vite.js'), 'build']);
  if (status !== 0) throw new Error('The build failed; the message stands above.');
  writeFileSync(INPUTS_STAMP, hash);
}

function inputsHash() {
  const hash = createHash('sha256');
  // The page shows its commit, and its policy may name a team's hosts.
  hash.update(`${commit()}\0${process.env.THRUMBOOK_TEAM_STORES ?? ''}\0`);
  for (const file of BUILD_INPUTS.flatMap(filesUnder)) {
    hash.update(`${file}\0`);
    hash.update(readFileSync(join(ROOT, file)));
  }
  return hash.digest('hex');
}

/**
 * @param {string} path relative to the project
 * @returns {string[]}
 */
function filesUnder(path) {
  const full = join(ROOT, path);
  if (!existsSync(full)) return [];
  if (!statSync(full).isDirectory()) return [path];
  return readdirSync(full)
    .sort()
    .flatMap((name) => filesUnder(join(path, name)));
}
