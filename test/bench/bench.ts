/** `npm run bench -- [NAME] [options]`: every test/bench/*.bench.ts whose name holds NAME, each in its own process. */
import { runScripts } from '../support/run-scripts.ts';

process.exitCode = runScripts(import.meta.dirname, '.bench.ts', process.argv.slice(2));
