import { readFileSync } from 'node:fs';

/** What the page names in its head: the script, what that imports at once, and the style sheets. */
const page = readFileSync(new URL('dist/index.html', import.meta.url), 'utf8');
const named = [...page.matchAll(/(?:src|href)="\.\/(assets\/[^"]+)"/g)].map((match) => `dist/${match[1]}`);

// What is reached, plus 2 % or so; the first limits and what became of them: DEVELOPERS.md, "Budgets".
export default [
  {
    name: 'JavaScript before first use',
    path: named.filter((path) => path.endsWith('.js')),
    limit: '50 kB',
    gzip: true,
  },
  {
    name: 'Everything before first use',
    path: ['dist/index.html', ...named, 'dist/manifest.webmanifest', 'dist/icon.svg'],
    limit: '57 kB',
    gzip: true,
  },
  { name: 'All JavaScript', path: ['dist/assets/*.js', 'dist/sw.js'], limit: '272 kB', gzip: true },
  {
    name: 'Everything kept for offline',
    path: [
      'dist/index.html',
      'dist/assets/*',
      'dist/sw.js',
      'dist/*.{svg,txt,webmanifest}',
      'dist/rescue.*',
      'dist/help/*',
    ],
    limit: '291 kB',
    gzip: true,
  },
];
