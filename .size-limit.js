import { readFileSync } from 'node:fs';

/** What the page names in its head: the script, what that imports at once, and the style sheets. */
const page = readFileSync(new URL('dist/index.html', import.meta.url), 'utf8');
const named = [...page.matchAll(/(?:src|href)="\.\/(assets\/[^"]+)"/g)].map((match) => `dist/${match[1]}`);

export default [
  {
    name: 'JavaScript before first use',
    path: named.filter((path) => path.endsWith('.js')),
    limit: '60 kB',
    gzip: true,
  },
  { name: 'All JavaScript', path: ['dist/assets/*.js', 'dist/sw.js'], limit: '160 kB', gzip: true },
  {
    name: 'First visit, with everything kept for offline',
    path: ['dist/**/*', '!dist/_headers', '!dist/.inputs'],
    limit: '250 kB',
    gzip: true,
  },
];
