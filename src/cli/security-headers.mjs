/**
 * What every answer of our server carries, what the build writes into the page for hosts that send no headers, and
 * what it writes to `_headers` for hosts that read such a file. One list, so that they cannot differ.
 */

/** The team store is chosen by the person, so a build for anybody must let any https host through (and loopback, for trying). */
const ANY_TEAM_STORE = 'https: http://127.0.0.1:* http://localhost:*';

/** @type {Readonly<Record<string, string>>} */
const POLICY = {
  'default-src': "'none'",
  'script-src': "'self'",
  'style-src': "'self'",
  'img-src': "'self' blob: data:",
  'worker-src': "'self'",
  'manifest-src': "'self'",
  'connect-src': connectSources(process.env.THRUMBOOK_TEAM_STORES),
  'frame-src': "'self' blob:",
  'base-uri': "'none'",
  'form-action': "'none'",
};

/** For the `<meta>` tag: `frame-ancestors` is ignored there. */
export const PAGE_POLICY = policyText(POLICY);

const HEADER_POLICY = policyText({ ...POLICY, 'frame-ancestors': "'none'" });

/** A worker does not inherit the page's policy; the analysis needs nothing but its own script. */
const WORKER_POLICY = policyText({ 'default-src': "'none'", 'script-src': "'self'" });

/** Chunks of web workers; vite.config.ts names them so. */
export const WORKER_PATH = /^\/assets\/worker-[^/]*\.js$/;

const COMMON_HEADERS = {
  'Permissions-Policy':
    'accelerometer=(self), gyroscope=(self), screen-wake-lock=(self), camera=(self), geolocation=(), microphone=(), payment=(), usb=(), bluetooth=()',
  'X-Content-Type-Options': 'nosniff',
  'Referrer-Policy': 'no-referrer',
  'Cross-Origin-Opener-Policy': 'same-origin',
  'Cross-Origin-Resource-Policy': 'same-origin',
};

/**
 * Headers for one path of the site.
 * @param {string} path begins with a slash
 * @returns {Record<string, string>}
 */
export function securityHeaders(path) {
  const policy = WORKER_PATH.test(path) ? WORKER_POLICY : HEADER_POLICY;
  return { 'Content-Security-Policy': policy, ...COMMON_HEADERS };
}

/** The same as a `_headers` file, which several static hosts read. */
export function headersFile() {
  const lines = Object.entries(securityHeaders('/')).map(([name, value]) => `  ${name}: ${value}`);
  return [
    '/*',
    ...lines,
    '/assets/worker-*',
    '  ! Content-Security-Policy',
    `  Content-Security-Policy: ${WORKER_POLICY}`,
    '/sw.js',
    '  Cache-Control: no-cache',
    '',
  ].join('\n');
}

/** @param {Readonly<Record<string, string>>} policy */
function policyText(policy) {
  return Object.entries(policy)
    .map(([name, value]) => `${name} ${value}`)
    .join('; ');
}

/**
 * Where the page may connect to. A build for one team names its hosts: THRUMBOOK_TEAM_STORES="https://store.example".
 * @param {string | undefined} teamStores origins, separated by blanks; "none" for no team store at all
 */
export function connectSources(teamStores) {
  if (teamStores === undefined || teamStores.trim() === '') return `'self' ${ANY_TEAM_STORE}`;
  if (teamStores.trim() === 'none') return "'self'";
  const origins = teamStores.trim().split(/\s+/);
  const wrong = origins.find((origin) => !/^https:\/\/[\w.-]+(:\d+)?$/.test(origin));
  if (wrong !== undefined) {
    throw new RangeError(
      `THRUMBOOK_TEAM_STORES must hold origins such as https://store.example, not "${wrong}"`,
    );
  }
  return ["'self'", ...origins].join(' ');
}
