// `npm test`: everything a change must pass, on a machine with Node and npm alone.
import { requireNode } from './node-version.mjs';

requireNode();
import('./test-run.mjs')
  .then(({ testRun }) => testRun())
  .then((allPassed) => {
    process.exitCode = allPassed ? 0 : 1;
  })
  .catch((error) => {
    console.error(error instanceof Error ? error.message : error);
    console.log('0 passed, 1 failed');
    process.exitCode = 1;
  });
