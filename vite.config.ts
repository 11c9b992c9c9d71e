import { readFileSync } from 'node:fs';
import { fileURLToPath } from 'node:url';
import preact from '@preact/preset-vite';
import type { Plugin } from 'vite';
import { VitePWA } from 'vite-plugin-pwa';
import { defineConfig } from 'vitest/config';
import { noticesPlugins } from './src/cli/notices.ts';
import { commit } from './src/cli/project.mjs';
import { headersFile, PAGE_POLICY } from './src/cli/security-headers.mjs';

const root = fileURLToPath(new URL('.', import.meta.url));
const { version } = JSON.parse(readFileSync(`${root}package.json`, 'utf8')) as { version: string };
const notices = noticesPlugins(root);

/**
 * Few chunks compress better than thirty (6 kB of 265 kB), and each is what one step of the work needs. Dependencies
 * follow a group unless a higher one has them: the first keeps whatever the first screen shares with later ones.
 */
const CHUNKS = [
  { name: 'first', tags: ['$initial' as const], priority: 5 },
  { name: 'plots', test: /uplot/, priority: 4 },
  { name: 'facts', test: /store\/fact-part/, priority: 3 },
  { name: 'shared', test: /src\//, minShareCount: 2, priority: 2 },
  { name: 'hand-over', test: /src\/exchange\/|screens\/hand-over|tokens\.css/, priority: 1 },
];

export default defineConfig({
  root,
  base: './',
  define: { __APP_VERSION__: JSON.stringify(version), __APP_COMMIT__: JSON.stringify(commit()) },
  plugins: [preact(), ...(process.env.VITEST ? [] : [staticHostSafety(), notices.page, offline()])],
  worker: {
    format: 'es',
    plugins: () => [notices.worker()],
    rollupOptions: { output: { entryFileNames: 'assets/worker-[name]-[hash].js' } },
  },
  build: {
    target: 'es2022',
    // An inlined asset would need data: in more places of the policy; the polyfill is an inline script.
    assetsInlineLimit: 0,
    modulePreload: { polyfill: false },
    reportCompressedSize: false,
    rolldownOptions: { output: { codeSplitting: { groups: CHUNKS } } },
  },
  test: {
    projects: [
      {
        extends: true,
        test: {
          name: 'unit',
          include: ['test/**/*.test.{ts,tsx}'],
          exclude: ['test/e2e/**', 'test/soak/**'],
          testTimeout: 20_000,
        },
      },
      {
        extends: true,
        test: {
          name: 'e2e',
          include: ['test/e2e/**/*.test.{ts,tsx}'],
          globalSetup: ['test/support/built-app.ts'],
          // Two cores: one browser at a time, or timing-sensitive recordings stall.
          fileParallelism: false,
          testTimeout: 60_000,
          hookTimeout: 60_000,
        },
      },
    ],
  },
});

/** The policy as a meta tag (development needs a socket and inline styles, so only in the build), and `_headers`. */
function staticHostSafety(): Plugin {
  return {
    name: 'static-host-safety',
    apply: 'build',
    transformIndexHtml: () => [
      {
        tag: 'meta',
        attrs: { 'http-equiv': 'Content-Security-Policy', content: PAGE_POLICY },
        injectTo: 'head-prepend',
      },
    ],
    generateBundle() {
      this.emitFile({ type: 'asset', fileName: '_headers', source: headersFile() });
    },
  };
}

/** Everything precached; an update waits until the person takes it (registration: src/app). */
function offline() {
  return VitePWA({
    registerType: 'prompt',
    injectRegister: null,
    filename: 'sw.js',
    includeManifestIcons: false,
    manifest: {
      id: './',
      name: 'Thrumbook',
      short_name: 'Thrumbook',
      description: 'Resonance spot checks with the phone you already carry. Works offline.',
      start_url: './',
      scope: './',
      display: 'standalone',
      background_color: '#f7f4ec',
      theme_color: '#f7f4ec',
      categories: ['utilities', 'productivity'],
      // An installed app on a laptop opens packets by double click (or by "Open with").
      file_handlers: [{ action: './', accept: { 'application/zip': ['.zip'], 'text/csv': ['.csv'] } }],
      icons: [
        { src: 'icon.svg', sizes: 'any', type: 'image/svg+xml' },
        { src: 'icon-192.png', sizes: '192x192', type: 'image/png' },
        { src: 'icon-512.png', sizes: '512x512', type: 'image/png' },
        { src: 'icon-maskable-512.png', sizes: '512x512', type: 'image/png', purpose: 'maskable' },
      ],
    },
    workbox: {
      // Not the PNG icons: the system fetches those when the app is installed, and keeps them itself.
      globPatterns: ['**/*.{js,css,html,svg,txt,webmanifest}'],
      navigateFallback: 'index.html',
      cleanupOutdatedCaches: true,
      // The first visit is under the worker's care at once; later versions wait (no skipWaiting).
      clientsClaim: true,
      inlineWorkboxRuntime: true,
      sourcemap: false,
    },
  });
}
