/** Development only: serves the previews with hot reload; `npx tsx test/preview/serve.ts`. */
import preact from '@preact/preset-vite';
import { fileURLToPath } from 'node:url';
import { createServer, type ViteDevServer } from 'vite';

const root = fileURLToPath(new URL('../..', import.meta.url));

export async function servePreview(port: number): Promise<ViteDevServer> {
  const server = await createServer({
    root,
    configFile: false,
    plugins: [preact()],
    cacheDir: 'node_modules/.vite-preview',
    server: { port, strictPort: true, host: '127.0.0.1' },
    logLevel: 'warn',
  });
  await server.listen();
  return server;
}

if (process.argv[1] === fileURLToPath(import.meta.url)) await servePreview(5311);
