// `npm start`: install what is missing, build what is old, serve it, say what to do next.
import { requireNode } from './node-version.mjs';

requireNode();
// Imported after the check, because an old Node could not even read it.
import('./serve.mjs')
  .then(({ serve }) => serve(process.argv.slice(2)))
  .catch((error) => {
    console.error(error instanceof Error ? error.message : error);
    process.exitCode = 1;
  });
