// `npm run build`: install what is missing, then build dist/.
import { requireNode } from './node-version.mjs';

requireNode();
import('./project.mjs')
  .then(async ({ installMissing, build }) => {
    await installMissing();
    await build();
  })
  .catch((error) => {
    console.error(error instanceof Error ? error.message : error);
    process.exitCode = 1;
  });
