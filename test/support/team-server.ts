import { fork } from 'node:child_process';
import { mkdtemp, rm } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import type { TeamStoreAccount } from '../../src/core/model/team-store.ts';

export interface ServedDocument {
  readonly id: string;
  readonly rev: string;
  readonly conflicts: readonly string[];
}

export interface TeamServer {
  readonly account: TeamStoreAccount;
  /** All connections die, nothing listens; the database stays. */
  cut(): Promise<void>;
  /** The same in the middle of an upload, once so many more bytes have come. Resolves when it has happened. */
  cutAfter(bytes: number): Promise<void>;
  /** Once so many more bytes have come, new calls wait until `listen`: what was going on cannot end meanwhile. */
  holdAfter(bytes: number): Promise<void>;
  /** Listens again, on the same port; lets go what was held. */
  listen(): Promise<void>;
  counts(): Promise<{ readonly calls: number; readonly uploads: number; readonly bytesIn: number }>;
  documents(): Promise<readonly ServedDocument[]>;
  /** Past the door: documents as they are, revision included. */
  put(documents: readonly object[]): Promise<void>;
  /** The database is made anew, as after a loss. */
  empty(): Promise<void>;
  stop(): Promise<void>;
}

type Message = { readonly event?: string; readonly id?: number; readonly answer?: unknown };

/** Starts team-server.mjs in a process of its own, listening on a free port of this machine. */
export async function startTeamServer(): Promise<TeamServer> {
  // The server leaves every upload in its folder for passing files.
  const folder = await mkdtemp(join(tmpdir(), 'thrumbook-team-'));
  const child = fork(fileURLToPath(new URL('./team-server.mjs', import.meta.url)), {
    execArgv: [],
    env: { ...process.env, TMPDIR: folder },
    stdio: ['ignore', 'ignore', 'inherit', 'ipc'],
  });
  const heard = new Set<(message: Message) => void>();
  child.on('message', (message) => heard.forEach((listener) => listener(message as Message)));
  const next = (isIt: (message: Message) => boolean) =>
    new Promise<Message>((resolve) => {
      const listener = (message: Message) => {
        if (!isIt(message)) return;
        heard.delete(listener);
        resolve(message);
      };
      heard.add(listener);
    });
  let lastId = 0;
  const ask = async <T>(name: string, value?: unknown): Promise<T> => {
    lastId += 1;
    const id = lastId;
    const answered = next((message) => message.id === id);
    child.send({ id, ask: name, value });
    return (await answered).answer as T;
  };
  const reached = async (bytes: number, what: 'cut' | 'hold'): Promise<void> => {
    const happened = next(({ event }) => event === 'reached');
    await ask('watch', { bytes, what });
    await happened;
  };
  await next(({ event }) => event === 'ready');
  const { port } = await ask<{ port: number }>('listen');
  return {
    account: { url: `http://127.0.0.1:${port}/team`, user: 'works', password: 'päss:word' },
    cut: () => ask('cut'),
    cutAfter: (bytes) => reached(bytes, 'cut'),
    holdAfter: (bytes) => reached(bytes, 'hold'),
    listen: async () => void (await ask('listen')),
    counts: () => ask('counts'),
    documents: () => ask('documents'),
    put: async (documents) => void (await ask('put', documents)),
    empty: () => ask('empty'),
    async stop() {
      const ended = new Promise((resolve) => child.once('exit', resolve));
      child.disconnect();
      await ended;
      await rm(folder, { recursive: true, force: true });
    },
  };
}
