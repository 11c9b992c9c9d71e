import { describe, expect, it } from 'vitest';
import {
  connectSources,
  headersFile,
  PAGE_POLICY,
  securityHeaders,
} from '../../src/cli/security-headers.mjs';

describe('connectSources', () => {
  it.each([
    [undefined, "'self' https: http://127.0.0.1:* http://localhost:*"],
    ['none', "'self'"],
    ['https://store.example https://b.example:6984', "'self' https://store.example https://b.example:6984"],
  ])('%s: %s', (teamStores, sources) => expect(connectSources(teamStores)).toBe(sources));

  it.each(['http://store.example', "https://a.example; script-src 'unsafe-inline'", '*'])(
    'refuses %s, which would widen the policy',
    (teamStores) => expect(() => connectSources(teamStores)).toThrow(RangeError),
  );
});

describe('the policy', () => {
  it('is the same in the page, in the headers and in the file for static hosts', () => {
    const header = securityHeaders('/')['Content-Security-Policy']!;
    expect(header).toBe(`${PAGE_POLICY}; frame-ancestors 'none'`);
    expect(headersFile()).toContain(`Content-Security-Policy: ${header}`);
  });
});
