import { readFile } from 'node:fs/promises';
import { createServer } from 'node:http';
import { extname, join, normalize, sep } from 'node:path';
import { promisify } from 'node:util';
import { gzip } from 'node:zlib';
import { securityHeaders } from './security-headers.mjs';

const gzipped = promisify(gzip);

/** @type {Readonly<Record<string, string>>} */
const TYPES = {
  '.html': 'text/html; charset=utf-8',
  '.js': 'text/javascript; charset=utf-8',
  '.css': 'text/css; charset=utf-8',
  '.json': 'application/json; charset=utf-8',
  '.webmanifest': 'application/manifest+json; charset=utf-8',
  '.svg': 'image/svg+xml; charset=utf-8',
  '.png': 'image/png',
  '.ico': 'image/x-icon',
  '.txt': 'text/plain; charset=utf-8',
};

/** Files in assets/ carry a hash of their content in their name. */
const HASHED = /^\/assets\//;

/**
 * A file server for one folder: GET and HEAD only, security headers on every answer, gzip for text.
 * @param {string} root folder to serve
 * @returns {import('node:http').Server} not yet listening
 */
export function createFileServer(root) {
  return createServer((request, response) => {
    answer(root, request, response).catch(() => {
      if (!response.headersSent)
        send(response, '/', 500, 'text/plain; charset=utf-8', 'Could not read the file.');
      else response.destroy();
    });
  });
}

/**
 * @param {string} root
 * @param {import('node:http').IncomingMessage} request
 * @param {import('node:http').ServerResponse} response
 */
async function answer(root, request, response) {
  const path = sitePath(request.url ?? '/');
  if (request.method !== 'GET' && request.method !== 'HEAD') {
    response.setHeader('Allow', 'GET, HEAD');
    return send(response, '/', 405, 'text/plain; charset=utf-8', 'Only GET and HEAD.');
  }
  const file = path === undefined ? undefined : await fileAt(root, path);
  if (path === undefined || file === undefined) {
    return send(response, '/', 404, 'text/plain; charset=utf-8', 'There is no such file.');
  }
  const type = TYPES[extname(path)] ?? 'application/octet-stream';
  const isText = !type.startsWith('image/') || type.startsWith('image/svg');
  const acceptsGzip = /\bgzip\b/.test(String(request.headers['accept-encoding'] ?? ''));
  response.setHeader('Vary', 'Accept-Encoding');
  if (isText && acceptsGzip) response.setHeader('Content-Encoding', 'gzip');
  send(
    response,
    path,
    200,
    type,
    isText && acceptsGzip ? await gzipped(file) : file,
    request.method === 'HEAD',
  );
}

/**
 * @param {import('node:http').ServerResponse} response
 * @param {string} path
 * @param {number} status
 * @param {string} type
 * @param {string | Uint8Array} body
 * @param {boolean} [headOnly]
 */
function send(response, path, status, type, body, headOnly = false) {
  response.writeHead(status, {
    ...securityHeaders(path),
    'Content-Type': type,
    'Content-Length': Buffer.byteLength(body),
    'Cache-Control': status === 200 && HASHED.test(path) ? 'public, max-age=31536000, immutable' : 'no-cache',
  });
  response.end(headOnly ? undefined : body);
}

/**
 * Path inside the site, or undefined for one that would leave it or name a hidden file.
 * @param {string} url
 */
function sitePath(url) {
  try {
    const path = decodeURIComponent(url.split(/[?#]/, 1)[0] ?? '/');
    const isInside = path.startsWith('/') && !/[\0\\]/.test(path) && !/(^|\/)\./.test(path);
    if (!isInside) return undefined;
    return path.endsWith('/') ? `${path}index.html` : path;
  } catch {
    return undefined;
  }
}

/**
 * @param {string} root
 * @param {string} path
 */
async function fileAt(root, path) {
  const base = normalize(root.endsWith(sep) ? root : root + sep);
  const full = normalize(join(base, path));
  if (!full.startsWith(base)) return undefined;
  try {
    return await readFile(full);
  } catch {
    return undefined;
  }
}

/**
 * Listens on 127.0.0.1, on `port` or the first free one of the next few.
 * @param {import('node:http').Server} server
 * @param {number} port 0 for any
 * @param {number} [attempts]
 * @returns {Promise<number>} the port it listens on
 */
export async function listen(server, port, attempts = 10) {
  for (let next = port; ; next++) {
    try {
      return await listenOn(server, next);
    } catch (error) {
      const isTaken = error instanceof Error && 'code' in error && error.code === 'EADDRINUSE';
      if (!isTaken || next - port + 1 >= attempts) throw error;
    }
  }
}

/**
 * @param {import('node:http').Server} server
 * @param {number} port
 * @returns {Promise<number>}
 */
function listenOn(server, port) {
  return new Promise((resolve, reject) => {
    server.once('error', reject);
    server.listen(port, '127.0.0.1', () => {
      server.off('error', reject);
      const address = server.address();
      resolve(typeof address === 'object' && address !== null ? address.port : port);
    });
  });
}
