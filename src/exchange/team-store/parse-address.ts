import type { TeamStoreProblem } from '../../core/model/team-store.ts';

const LOOPBACK: ReadonlySet<string> = new Set(['127.0.0.1', 'localhost', '[::1]']);
/** Names of databases as CouchDB allows them, below a path of its host if any. */
const DATABASE = /^(?:\/[\w.~-]+)*\/[a-z][a-z0-9_$()+-]*$/;
const LENGTH_LIMIT = 500;

/**
 * The address of a team's database as it is used from then on. Only https, because name and password travel with every
 * call; loopback may be http, for trying. Nothing hidden in it: no account, query or fragment.
 */
export function parseAddress(
  typed: string,
): { readonly url: string } | { readonly problem: TeamStoreProblem } {
  const text = typed.trim();
  const url = parsedUrl(/^[a-z][a-z0-9+.-]*:\/\//i.test(text) ? text : `https://${text}`);
  if (url === undefined || text.length > LENGTH_LIMIT) return { problem: 'bad-address' };
  const isHttp = url.protocol === 'http:';
  if (isHttp && !LOOPBACK.has(url.hostname)) return { problem: 'not-secure' };
  if (!isHttp && url.protocol !== 'https:') return { problem: 'bad-address' };
  const path = url.pathname.replace(/\/$/, '');
  const isPlain = url.username === '' && url.password === '' && url.search === '' && url.hash === '';
  return isPlain && DATABASE.test(path) ? { url: url.origin + path } : { problem: 'bad-address' };
}

function parsedUrl(text: string): URL | undefined {
  try {
    return new URL(text);
  } catch {
    return undefined;
  }
}
