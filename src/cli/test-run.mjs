import { mkdtempSync, readFileSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { CHROMIUM_INSTRUCTIONS, findOrInstallChromium } from './chromium.mjs';
import { buildWhenOld, installMissing, ROOT, run } from './project.mjs';

/** @typedef {{ name: string, passed: number, failed: number, skipped: number, seconds: number }} Result */

const VITEST = join(ROOT, 'node_modules', 'vitest', 'vitest.mjs');

/**
 * Installs what is missing, then runs the gates and tests; prints a table and, as its last line, the sum.
 * @returns {Promise<boolean>} whether everything passed
 */
export async function testRun() {
  await installMissing();
  const chromium = findOrInstallChromium();
  const folder = mkdtempSync(join(tmpdir(), 'thrumbook-test-'));
  /** @type {Result[]} */
  const results = [];
  try {
    results.push(await gate('type check', () => run('npm', ['run', '-s', 'typecheck'])));
    results.push(await gate('lint', () => run('npm', ['run', '-s', 'lint'])));
    results.push(await tests('unit', folder));
    const built = await gate('build', buildStatus);
    results.push(built);
    if (built.failed === 0) {
      results.push(await gate('size', () => run('npm', ['run', '-s', 'size'])));
      results.push(await browserTests(chromium, folder));
    }
  } finally {
    rmSync(folder, { recursive: true, force: true });
  }
  return report(results);
}

async function buildStatus() {
  try {
    await buildWhenOld();
    return 0;
  } catch {
    return 1;
  }
}

/**
 * A step that passes or fails as a whole counts as one test.
 * @param {string} name
 * @param {() => Promise<number>} step
 * @returns {Promise<Result>}
 */
async function gate(name, step) {
  console.log(`\n=== ${name}`);
  const startMs = Date.now();
  const failed = (await step()) === 0 ? 0 : 1;
  return { name, passed: 1 - failed, failed, skipped: 0, seconds: (Date.now() - startMs) / 1000 };
}

/**
 * @param {string | undefined} chromium
 * @param {string} folder
 * @returns {Promise<Result>}
 */
async function browserTests(chromium, folder) {
  if (chromium !== undefined) return tests('e2e', folder, { CHROMIUM: chromium });
  console.log(`\n=== e2e\n${CHROMIUM_INSTRUCTIONS}`);
  return { name: 'e2e (no Chromium)', passed: 0, failed: 1, skipped: 0, seconds: 0 };
}

/**
 * Runs one vitest project and counts its tests.
 * @param {'unit' | 'e2e'} project
 * @param {string} folder for the report
 * @param {NodeJS.ProcessEnv} [env]
 * @returns {Promise<Result>}
 */
async function tests(project, folder, env = {}) {
  console.log(`\n=== ${project}`);
  const startMs = Date.now();
  const file = join(folder, `${project}.json`);
  const reporters = ['--reporter=default', '--reporter=json', `--outputFile.json=${file}`];
  const status = await run(process.execPath, [VITEST, 'run', '--project', project, ...reporters], env);
  const counts = countsOf(file);
  // A file that cannot even be loaded has no failed test; the run's status still tells.
  if (status !== 0 && counts.failed === 0) counts.failed = 1;
  return { name: project, ...counts, seconds: (Date.now() - startMs) / 1000 };
}

/** @param {string} file a report of vitest */
function countsOf(file) {
  try {
    const report = JSON.parse(readFileSync(file, 'utf8'));
    return {
      passed: Number(report.numPassedTests),
      failed: Number(report.numFailedTests),
      skipped: Number(report.numPendingTests) + Number(report.numTodoTests),
    };
  } catch {
    return { passed: 0, failed: 0, skipped: 0 };
  }
}

/** @param {readonly Result[]} results */
function report(results) {
  console.log('');
  for (const { name, passed, failed, skipped, seconds } of results) {
    const rest = skipped > 0 ? `, ${skipped} skipped` : '';
    console.log(`${name.padEnd(18)} ${passed} passed, ${failed} failed${rest} (${seconds.toFixed(1)} s)`);
  }
  const sum = (/** @type {'passed' | 'failed'} */ key) =>
    results.reduce((total, result) => total + result[key], 0);
  console.log(`${sum('passed')} passed, ${sum('failed')} failed`);
  return sum('failed') === 0;
}
