import { createServer } from 'node:http';
import { fileURLToPath } from 'node:url';
import { build } from 'vite';

/** Serves a page of this folder's on a free port of this machine (a secure page), until `stop()`. */
export async function serveFieldPage(
  script: 'field-page.ts' | 'team-page.ts' | 'exchange-page.ts' = 'field-page.ts',
): Promise<{ readonly url: string; stop(): Promise<void> }> {
  const scripts = await bundled(script);
  const server = createServer((request, response) => {
    const name = new URL(request.url ?? '/', 'http://localhost').pathname.slice(1);
    const script = scripts.get(name);
    response.setHeader('Content-Type', script === undefined ? 'text/html' : 'text/javascript');
    const first = [...scripts.keys()][0] ?? '';
    response.end(
      script ??
        `<!doctype html><title>field</title><p>field</p><script type="module" src="/${first}"></script>`,
    );
  });
  await new Promise<void>((resolve) => server.listen(0, '127.0.0.1', resolve));
  const { port } = server.address() as { port: number };
  return {
    url: `http://127.0.0.1:${port}/`,
    stop() {
      server.closeAllConnections();
      return new Promise((resolve) => server.close(() => resolve()));
    },
  };
}

async function bundled(script: string): Promise<ReadonlyMap<string, string>> {
  const entry = fileURLToPath(new URL(`./${script}`, import.meta.url));
  const result = await build({
    configFile: false,
    logLevel: 'error',
    build: {
      write: false,
      minify: false,
      target: 'es2022',
      modulePreload: false,
      rollupOptions: { input: entry, output: { entryFileNames: 'page.js', chunkFileNames: '[name].js' } },
    },
  });
  const outputs = (Array.isArray(result) ? result : [result]).flatMap((one) =>
    'output' in one ? one.output : [],
  );
  const chunks = outputs.filter((one) => one.type === 'chunk');
  return new Map(
    chunks.sort((a, b) => Number(b.isEntry) - Number(a.isEntry)).map((one) => [one.fileName, one.code]),
  );
}
