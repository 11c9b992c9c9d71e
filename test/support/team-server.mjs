/*
 * A CouchDB-protocol server of another make (express-pouchdb over a database in memory) in a process of its own, behind a
 * door that asks for name and password, answers CORS as an administrator would set it up, and can be cut: all connections
 * die at once and nothing listens, the database stays. Started by team-server.ts; never exposed.
 */
import { createRequire } from 'node:module';
import { createServer } from 'node:http';

const require = createRequire(import.meta.url);
const PouchDB = require('pouchdb-core').plugin(require('pouchdb-adapter-memory'));
const expressPouch = require('express-pouchdb');

const [user, password] = ['works', 'päss:word'];
const expected = `Basic ${Buffer.from(`${user}:${password}`, 'utf8').toString('base64')}`;

// An upload that is cut in its middle would end this server's process, data and all.
process.on('unhandledRejection', () => {});
process.on('uncaughtException', () => {});

const Memory = PouchDB.defaults({ adapter: 'memory' });
const app = expressPouch(Memory, { mode: 'minimumForPouchDB' });
/** Raised by `empty`: the address stays, another database answers. */
let generation = 0;
const database = () => new Memory(`team${generation}`);
await database().info();

const counts = { calls: 0, uploads: 0, bytesIn: 0 };
/** Bytes until something happens, and what: everything dies, or new calls are held until `listen`. */
let bytesLeft = Infinity;
let what = 'cut';
let gate = Promise.resolve();
let release = () => {};

const server = createServer((request, response) => {
  response.setHeader('Access-Control-Allow-Origin', request.headers.origin ?? '*');
  response.setHeader('Vary', 'Origin');
  if (request.method === 'OPTIONS') {
    response.setHeader('Access-Control-Allow-Methods', 'GET, PUT, POST');
    response.setHeader('Access-Control-Allow-Headers', 'accept, authorization, content-type');
    response.setHeader('Access-Control-Max-Age', '600');
    response.writeHead(204).end();
    return;
  }
  counts.calls += 1;
  if (request.method === 'PUT') counts.uploads += 1;
  if (request.headers.authorization !== expected) {
    response.writeHead(401, { 'Content-Type': 'application/json' }).end('{"error":"unauthorized"}');
    return;
  }
  countBytes(request);
  request.url = request.url?.replace(/^\/team/, `/team${generation}`);
  void gate.then(() => {
    if (!request.destroyed) app(request, response);
  });
});

/** Looks on as the app reads: a listener of our own would start the stream too early. */
function countBytes(request) {
  const emit = request.emit.bind(request);
  request.emit = (name, ...values) => {
    if (name === 'data') {
      counts.bytesIn += values[0].length;
      bytesLeft -= values[0].length;
      if (bytesLeft <= 0) reached();
    }
    return emit(name, ...values);
  };
}

let port = 0;
const listen = () =>
  new Promise((resolve) => {
    release();
    if (server.listening) return resolve(undefined);
    server.listen(port, '127.0.0.1', () => {
      port = server.address().port;
      resolve(undefined);
    });
  });
function reached() {
  bytesLeft = Infinity;
  if (what === 'cut') cut();
  else gate = new Promise((resolve) => (release = () => resolve(undefined)));
  process.send?.({ event: 'reached' });
}
function cut() {
  server.close();
  server.closeAllConnections();
}

process.on('message', async ({ id, ask, value }) => {
  const answers = {
    listen: async () => (await listen(), { port }),
    cut: async () => cut(),
    watch: async () => {
      ({ what, bytes: bytesLeft } = value);
    },
    counts: async () => ({ ...counts }),
    documents: async () => {
      const { rows } = await database().allDocs({ include_docs: true, conflicts: true });
      return rows.map(({ doc }) => ({ id: doc._id, rev: doc._rev, conflicts: doc._conflicts ?? [] }));
    },
    put: async () => database().bulkDocs(value, { new_edits: false }),
    empty: async () => {
      generation += 1;
      await database().info();
    },
  };
  process.send?.({ id, answer: await answers[ask]() });
});
process.on('disconnect', () => process.exit());
process.send?.({ event: 'ready' });
