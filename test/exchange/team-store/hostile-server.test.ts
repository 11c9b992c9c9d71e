import { createServer, type RequestListener, type Server } from 'node:http';
import type { AddressInfo } from 'node:net';
import fc from 'fast-check';
import { afterEach, describe, expect, it } from 'vitest';
import { createTeamStore } from '../../../src/exchange/team-store/create-team-store.ts';
import type { Store } from '../../../src/store/open-store.ts';
import { memoryCouch, type MemoryCouch } from '../../support/memory-couch.ts';
import { readingDraft, sampleRecording } from '../../support/reading-draft.ts';
import { nodeEnvironment } from '../../support/team-environment.ts';
import { newPhone } from '../../support/team-phone.ts';

const servers: Server[] = [];
afterEach(() => {
  for (const server of servers.splice(0)) {
    server.closeAllConnections();
    server.close();
  }
});

async function serve(listener: RequestListener): Promise<string> {
  const server = createServer(listener);
  servers.push(server);
  await new Promise<void>((resolve) => server.listen(0, '127.0.0.1', resolve));
  return `http://127.0.0.1:${(server.address() as AddressInfo).port}/team`;
}

async function phoneWithReading(): Promise<Store> {
  const store = await newPhone();
  await store.saveReading(readingDraft(), sampleRecording(100));
  return store;
}

const replicate = (store: Store, url: string, over: Parameters<typeof nodeEnvironment>[0] = {}) =>
  createTeamStore(store, nodeEnvironment({ stallMs: 150, ...over })).replicate(
    { url, user: 'works', password: 'secret' },
    { signal: new AbortController().signal, onProgress: () => {} },
  );

/** Nothing lost, nothing taken, nothing marked as sent. */
async function expectUntouched(store: Store, url: string): Promise<void> {
  const readings = await store.listReadings();
  expect(readings).toHaveLength(1);
  expect(await store.openReading(readings[0]!.id)).toBeDefined();
  const { waitingCount, lastSuccessAt } = await createTeamStore(store, nodeEnvironment()).standing(url);
  expect({ waitingCount, lastSuccessAt }).toEqual({ waitingCount: 1, lastSuccessAt: undefined });
}

const HTML = '<!doctype html><title>Sign in to the guest network</title>';
const answering =
  (status: number, body: string, headers: Record<string, string> = {}): RequestListener =>
  (_, response) =>
    response.writeHead(status, headers).end(body);

describe('a hostile or broken server is refused with a reason, and nothing is lost', () => {
  it.each<[string, string, RequestListener]>([
    ['a web page', 'not-a-team-store', answering(200, HTML, { 'Content-Type': 'text/html' })],
    ['a web page that claims to be JSON', 'not-a-team-store', answering(200, `\ufeff${HTML}`)],
    ['a web page with an error', 'no-database', answering(404, HTML)],
    ['nothing', 'strange-answer', answering(200, '')],
    ['half a JSON', 'strange-answer', answering(200, '{"reading:1":{"miss')],
    [
      'malformed UTF-8',
      'strange-answer',
      (_, response) => response.end(Buffer.from('7b22ff223a317d', 'hex')),
    ],
    ['a number', 'strange-answer', answering(200, '7')],
    ['a list', 'strange-answer', answering(200, '[]')],
    ['what was not asked for', 'strange-answer', answering(200, '{"reading:1":{"missing":["1-a"]}}')],
    ['keys that reach a prototype', 'strange-answer', answering(200, '{"__proto__":{"missing":[]}}')],
    ['deep nesting', 'strange-answer', answering(200, `${'['.repeat(5000)}${']'.repeat(5000)}`)],
    ['wrong name or password', 'not-signed-in', answering(401, '{}')],
    ['no permission', 'not-permitted', answering(403, '{}')],
    ['no such database', 'no-database', answering(404, '{}')],
    ['teapot', 'strange-answer', answering(418, '{}')],
    ['too many requests', 'server-failing', answering(429, '{}')],
    ['a failure', 'server-failing', answering(500, '{}')],
    ['another place', 'redirected', answering(302, '', { Location: 'http://127.0.0.1:9/elsewhere' })],
    ['another place for good', 'redirected', answering(308, '', { Location: '/team/' })],
    ['silence', 'stalled', () => {}],
    ['silence after the head', 'stalled', (_, response) => response.writeHead(200).flushHeaders()],
    ['a byte now and then', 'stalled', dripping],
    ['a broken connection', 'unreachable', (request) => request.socket.destroy()],
    ['a body that breaks off', 'unreachable', breakingOff],
    ['a body announced too large', 'too-much', answering(200, '{}', { 'Content-Length': '900000000' })],
    ['a body without end', 'too-much', endless],
  ])('answers with %s: %s', async (_, end, listener) => {
    const store = await phoneWithReading();
    const url = await serve(listener);
    expect(await replicate(store, url)).toEqual({ sentCount: 0, fetchedCount: 0, end });
    await expectUntouched(store, url);
    store.close();
  });

  it('sends name and password nowhere else when redirected', async () => {
    let heardCount = 0;
    const elsewhere = await serve((_, response) => {
      heardCount += 1;
      response.end('{}');
    });
    const url = await serve(answering(307, '', { Location: elsewhere }));
    const store = await phoneWithReading();
    expect((await replicate(store, url)).end).toBe('redirected');
    expect(heardCount).toBe(0);
  });

  it('says "taken" and has not: nothing counts as sent', async () => {
    const store = await phoneWithReading();
    const couch = memoryCouch();
    const lying: MemoryCouch['fetch'] = (url, init) =>
      init.method === 'PUT' ? Promise.resolve(new Response('{"ok":true,"id":"x"}')) : couch.fetch(url, init);
    const taking: MemoryCouch['fetch'] = (url, init) =>
      init.method === 'PUT' ? Promise.resolve(new Response('[]', { status: 201 })) : couch.fetch(url, init);
    const url = 'https://store.example/team';
    expect((await replicate(store, url, { fetch: lying })).end).toBe('strange-answer');
    await expectUntouched(store, url);
    expect((await replicate(store, url, { fetch: taking })).end).toBe('not-kept');
    await expectUntouched(store, url);
  });

  it('is slow and poor but honest: waited for as long as bytes come', async () => {
    const store = await newPhone();
    const url = await serve((_, response) => {
      const text = JSON.stringify({ results: [], last_seq: 'a'.repeat(3000) });
      let at = 0;
      const timer = setInterval(() => {
        response.write(text.slice(at, at + 100));
        at += 100;
        if (at < text.length) return;
        clearInterval(timer);
        response.end();
      }, 10);
    });
    expect((await replicate(store, url)).end).toBe('done');
  });

  it.each<[string, object, string]>([
    [
      'more rows than asked for',
      { results: Array(501).fill({ id: 'a', changes: [] }), last_seq: 1 },
      'strange-answer',
    ],
    ['no place in the order', { results: [], last_seq: { x: 1 } }, 'strange-answer'],
    ['a place beyond numbers', { results: [], last_seq: 1e300 }, 'strange-answer'],
    ['rows without revisions', { results: [{ id: 'a' }], last_seq: 1 }, 'strange-answer'],
    ['rows that are no rows', { results: [7], last_seq: 1 }, 'strange-answer'],
    [
      'the same page without end',
      { results: [{ id: '_design/a', changes: [] }], last_seq: 0 },
      'strange-answer',
    ],
  ])('lists changes with %s', async (_, answer, end) => {
    const store = await newPhone();
    const fetch: MemoryCouch['fetch'] = () => Promise.resolve(new Response(JSON.stringify(answer)));
    expect((await replicate(store, 'https://store.example/team', { fetch })).end).toBe(end);
  });

  it.each<[string, (raw: Uint8Array<ArrayBuffer>) => Uint8Array<ArrayBuffer>]>([
    ['more bytes than the reading declares', (raw) => new Uint8Array(10_000_000).fill(raw[0]!)],
    ['a flipped bit', (raw) => raw.map((byte, index) => (index === 40 ? byte ^ 1 : byte))],
    ['half of them', (raw) => raw.slice(0, raw.length >> 1)],
    ['nothing', () => new Uint8Array()],
  ])('sends samples with %s: that reading is named, the others arrive', async (_, damage) => {
    const [one, other] = [await phoneWithReading(), await newPhone()];
    const couch = memoryCouch();
    const url = 'https://store.example/team';
    await one.saveReading(readingDraft(), sampleRecording(120));
    await replicate(one, url, { fetch: couch.fetch });
    const [id, kept] = [...couch.documents][0]!;
    couch.documents.set(id, { ...kept, raw: damage(kept.raw!) });
    const report = await replicate(other, url, { fetch: couch.fetch });
    expect(report).toEqual({ sentCount: 0, fetchedCount: 1, end: 'done' });
    const { refused } = await createTeamStore(other, nodeEnvironment()).standing(url);
    expect(refused).toEqual([{ id, lies: 'there', reason: 'raw-damaged' }]);
    // Whole again, everything compared again: it arrives, and is not named any more.
    couch.documents.set(id, kept);
    const again = createTeamStore(other, nodeEnvironment({ fetch: couch.fetch }));
    const options = { signal: new AbortController().signal, onProgress: () => {}, again: true };
    expect((await again.replicate({ url, user: 'a', password: 'b' }, options)).fetchedCount).toBe(1);
    expect((await again.standing(url)).refused).toEqual([]);
  });

  it('answers with any JSON: the run ends with a reason or an end, and what is here stays', async () => {
    const answer = fc.oneof(
      fc.jsonValue(),
      fc.record({
        results: fc.array(
          fc.record(
            {
              id: fc.oneof(fc.string(), fc.constant('reading:01J00000000000000000000000')),
              changes: fc.oneof(fc.jsonValue(), fc.array(fc.record({ rev: fc.string() }))),
              deleted: fc.jsonValue(),
              doc: fc.jsonValue(),
            },
            { requiredKeys: [] },
          ),
          { maxLength: 4 },
        ),
        last_seq: fc.oneof(fc.nat(5), fc.string(), fc.jsonValue()),
        pending: fc.jsonValue(),
      }),
    );
    const store = await phoneWithReading();
    const empty = await newPhone();
    const url = 'https://store.example/team';
    await fc.assert(
      fc.asyncProperty(fc.array(answer, { minLength: 1, maxLength: 6 }), async (answers) => {
        let callCount = 0;
        const fetch: MemoryCouch['fetch'] = () => {
          callCount += 1;
          if (callCount > 60) throw new TypeError('failed to fetch');
          return Promise.resolve(new Response(JSON.stringify(answers[callCount % answers.length])));
        };
        for (const phone of [store, empty])
          expect(typeof (await replicate(phone, url, { fetch })).end).toBe('string');
        expect(await store.listReadings()).toHaveLength(1);
        expect(await empty.listReadings()).toHaveLength(0);
      }),
      { numRuns: 60, seed: 7 },
    );
  });
});

function dripping(_: unknown, response: Parameters<RequestListener>[1]): void {
  const timer = setInterval(() => response.write(' '), 20);
  response.on('close', () => clearInterval(timer));
}

function breakingOff(_: unknown, response: Parameters<RequestListener>[1]): void {
  response.writeHead(200, { 'Content-Length': '100' });
  response.write('{"a":');
  setTimeout(() => response.destroy(), 20);
}

function endless(_: unknown, response: Parameters<RequestListener>[1]): void {
  const more = (): void => {
    while (!response.destroyed && response.write(' '.repeat(65_536)));
    response.once('drain', more);
  };
  more();
}
