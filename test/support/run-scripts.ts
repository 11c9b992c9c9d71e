import { spawnSync } from 'node:child_process';
import { readdirSync } from 'node:fs';
import { join } from 'node:path';

/**
 * Runs the scripts of a folder whose names end in `ending` and hold the first argument, if it is no option, with the
 * other arguments; a process each, so that one's memory does not count for the next.
 * @returns the number of scripts that failed, as an exit status
 */
export function runScripts(folder: string, ending: string, args: readonly string[]): number {
  const name = args[0]?.startsWith('-') === false ? args[0] : undefined;
  const options = name === undefined ? args : args.slice(1);
  const scripts = readdirSync(folder)
    .filter((file) => file.endsWith(ending) && (name === undefined || file.includes(name)))
    .sort();
  if (scripts.length === 0) throw new RangeError(`no script *${name ?? ''}*${ending} here`);
  let failedCount = 0;
  for (const script of scripts) {
    console.log(`\n=== ${script}`);
    const command = ['--expose-gc', '--import', 'tsx', join(folder, script), ...options];
    const { status } = spawnSync(process.execPath, command, { stdio: 'inherit' });
    if (status !== 0) failedCount++;
  }
  return Math.min(failedCount, 100);
}
