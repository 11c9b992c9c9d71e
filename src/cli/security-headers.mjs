/**
 * What every answer of our server carries, what the build writes into the page for hosts that send no headers, and
 * what it writes to `_headers` for hosts that read such a file. One list, so that they cannot differ.
 */

/** @type {Readonly<Record<string, string>>} */
const POLICY = {
  'default-src': "'none'",
  'script-src': "'self'",
  'style-src': "'self'",
  'img-src': "'self' blob: data:",
  'worker-src': "'self'",
  'manifest-src': "'self'",
  // The team store is chosen by the person, so its address cannot stand here; everything else stays on the phone.
  'connect-src': "'self' https: http://127.0.0.1:* http://localhost:*",
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
