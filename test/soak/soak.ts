/** `npm run soak -- [NAME] [options]`: the long proofs, test/soak/*.soak.ts, each in its own process. */
import { runScripts } from '../support/run-scripts.ts';

process.exitCode = runScripts(import.meta.dirname, '.soak.ts', process.argv.slice(2));
