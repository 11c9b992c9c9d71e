import preact from '@preact/preset-vite';
import { mkdtemp, rm } from 'node:fs/promises';
import type { Server } from 'node:http';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { build } from 'vite';
import { createFileServer, listen } from '../../src/cli/file-server.mjs';

export interface ServedPreview {
  readonly url: string;
  close(): Promise<void>;
}

/** Builds one preview page as the app is built and serves it with the same headers, so that the policy is tested too. */
export async function servedPreview(page: 'reading' | 'ladder'): Promise<ServedPreview> {
  const root = fileURLToPath(new URL('../..', import.meta.url));
  const outDir = await mkdtemp(join(tmpdir(), 'thrumbook-preview-'));
  await build({
    root,
    base: './',
    configFile: false,
    logLevel: 'error',
    plugins: [preact()],
    build: {
      outDir,
      emptyOutDir: true,
      target: 'es2022',
      assetsInlineLimit: 0,
      modulePreload: { polyfill: false },
      rollupOptions: { input: join(root, `test/preview/${page}.html`) },
    },
  });
  const server: Server = createFileServer(outDir);
  const port = await listen(server, 0);
  return {
    url: `http://127.0.0.1:${port}/test/preview/${page}.html`,
    async close() {
      server.closeAllConnections();
      await new Promise((done) => server.close(done));
      await rm(outDir, { recursive: true, force: true });
    },
  };
}
