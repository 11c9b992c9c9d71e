import { mkdirSync, mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { request, type IncomingHttpHeaders, type Server } from 'node:http';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { gunzipSync } from 'node:zlib';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { createFileServer, listen } from '../../src/cli/file-server.mjs';

let folder: string;
let server: Server;
let port: number;

beforeAll(async () => {
  folder = mkdtempSync(join(tmpdir(), 'thrumbook-server-'));
  mkdirSync(join(folder, 'site', 'assets'), { recursive: true });
  const put = (name: string, text: string) => writeFileSync(join(folder, name), text);
  put('secret.txt', 'outside');
  put('site/index.html', '<!doctype html><title>it</title>');
  put('site/.inputs', 'hidden');
  put('site/sw.js', '1');
  put('site/manifest.webmanifest', '{}');
  put('site/assets/index-abc.js', 'export {};'.repeat(100));
  put('site/assets/worker-entry-abc.js', '1');
  put('site/icon.svg', '<svg/>');
  server = createFileServer(join(folder, 'site'));
  port = await listen(server, 0);
});

afterAll(() => {
  server.close();
  server.closeAllConnections();
  rmSync(folder, { recursive: true });
});

interface Answer {
  readonly status: number;
  readonly headers: IncomingHttpHeaders;
  readonly body: Buffer;
}

/** Not fetch: that would tidy the path before it is sent. */
function get(
  path: string,
  options: { method?: string; headers?: Record<string, string> } = {},
): Promise<Answer> {
  return new Promise((resolve, reject) => {
    const sent = request({ host: '127.0.0.1', port, path, ...options }, (response) => {
      const parts: Buffer[] = [];
      response.on('data', (part: Buffer) => parts.push(part));
      response.on('end', () =>
        resolve({ status: response.statusCode ?? 0, headers: response.headers, body: Buffer.concat(parts) }),
      );
    });
    sent.on('error', reject);
    sent.end();
  });
}

describe('createFileServer', () => {
  it('serves the page at the root with the security headers', async () => {
    const { status, headers, body } = await get('/?rig=handrail');
    expect(status).toBe(200);
    expect(body.toString()).toContain('<title>it</title>');
    expect(headers['content-type']).toBe('text/html; charset=utf-8');
    expect(headers['content-security-policy']).toContain(
      "default-src 'none'; script-src 'self'; style-src 'self'",
    );
    expect(headers['content-security-policy']).toContain("frame-ancestors 'none'");
    expect(headers['content-security-policy']).not.toMatch(/unsafe/);
    expect(headers['permissions-policy']).toContain('accelerometer=(self), gyroscope=(self)');
    expect(headers['x-content-type-options']).toBe('nosniff');
    expect(headers['referrer-policy']).toBe('no-referrer');
    expect(headers['cross-origin-opener-policy']).toBe('same-origin');
  });

  it.each([
    ['/assets/index-abc.js', 'text/javascript; charset=utf-8', 'public, max-age=31536000, immutable'],
    ['/sw.js', 'text/javascript; charset=utf-8', 'no-cache'],
    ['/', 'text/html; charset=utf-8', 'no-cache'],
    ['/manifest.webmanifest', 'application/manifest+json; charset=utf-8', 'no-cache'],
    ['/icon.svg', 'image/svg+xml; charset=utf-8', 'no-cache'],
  ])('%s is %s, cached "%s"', async (path, type, caching) => {
    const { headers } = await get(path);
    expect(headers['content-type']).toBe(type);
    expect(headers['cache-control']).toBe(caching);
  });

  it('gives a worker a policy of its own without any connection', async () => {
    const { headers } = await get('/assets/worker-entry-abc.js');
    expect(headers['content-security-policy']).toBe("default-src 'none'; script-src 'self'");
  });

  it.each([
    '/../secret.txt',
    '/%2e%2e/secret.txt',
    '/assets/..%2f..%2fsecret.txt',
    '/..%5csecret.txt',
    '/.inputs',
    '/nothing',
    '/%00',
    '/%zz',
    '/assets/',
    '/assets',
  ])('answers 404 to %s and gives nothing away', async (path) => {
    const { status, body, headers } = await get(path);
    expect(status).toBe(404);
    expect(body.toString()).toBe('There is no such file.');
    expect(headers['content-security-policy']).toBeDefined();
  });

  it('compresses text for who takes it', async () => {
    const plain = await get('/assets/index-abc.js');
    const packed = await get('/assets/index-abc.js', { headers: { 'accept-encoding': 'br, gzip' } });
    expect(packed.headers['content-encoding']).toBe('gzip');
    expect(packed.body.length).toBeLessThan(plain.body.length);
    expect(gunzipSync(packed.body)).toEqual(plain.body);
  });

  it('answers HEAD without a body and refuses everything that writes', async () => {
    expect((await get('/', { method: 'HEAD' })).body).toHaveLength(0);
    const { status, headers } = await get('/', { method: 'POST' });
    expect([status, headers.allow]).toEqual([405, 'GET, HEAD']);
  });
});

describe('listen', () => {
  it('takes the next free port when the wanted one is taken, and gives up when told to', async () => {
    const second = createFileServer(folder);
    const third = createFileServer(folder);
    try {
      expect(await listen(second, port)).toBeGreaterThan(port);
      await expect(listen(third, port, 1)).rejects.toMatchObject({ code: 'EADDRINUSE' });
    } finally {
      second.close();
      third.close();
    }
  });
});
