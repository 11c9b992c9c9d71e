import { createFileServer, listen } from './file-server.mjs';
import { buildWhenOld, DIST, installMissing } from './project.mjs';

/** Fixed, because a browser keeps readings per address: another port would look empty. */
const PORT = 4827;

/**
 * Serves the built app on this computer until Ctrl-C.
 * @param {readonly string[]} args `--port N`
 */
export async function serve(args) {
  const wanted = portFrom(args);
  await installMissing();
  await buildWhenOld();
  const server = createFileServer(DIST);
  const port = await listen(server, wanted);
  if (port !== wanted) sayTaken(wanted, port);
  console.log(`
Thrumbook runs at http://127.0.0.1:${port}/

  Open that address in a browser on this computer. Without a motion sensor it offers
  a practice rig, and it opens recordings (CSV) and packets from phones.
  To put it on a phone, copy dist/ to any https host (README, "Putting it on phones").

Ctrl-C ends it. Readings stay in the browser.`);
  process.once('SIGINT', () => stop(server));
  process.once('SIGTERM', () => stop(server));
}

/** @param {readonly string[]} args */
function portFrom(args) {
  const at = args.indexOf('--port');
  if (at < 0) return PORT;
  const port = Number(args[at + 1]);
  if (!Number.isInteger(port) || port < 1 || port > 65535) {
    throw new Error(`--port needs a number from 1 to 65535, not "${args[at + 1] ?? ''}".`);
  }
  return port;
}

/**
 * @param {number} wanted
 * @param {number} port
 */
function sayTaken(wanted, port) {
  console.log(`
Port ${wanted} is taken, perhaps by a Thrumbook that still runs: look at http://127.0.0.1:${wanted}/ first.
A browser keeps readings per address, so on port ${port} you will not see those taken on port ${wanted}.`);
}

/** @param {import('node:http').Server} server */
function stop(server) {
  console.log('\nStopped.');
  server.close();
  server.closeAllConnections();
}
