import { createHash } from 'node:crypto';
import { cp, mkdtemp, readdir, readFile, rename, rm, writeFile } from 'node:fs/promises';
import type { Server } from 'node:http';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { createFileServer, listen } from '../../src/cli/file-server.mjs';
import { DIST } from '../../src/cli/project.mjs';

/**
 * A later deployment made out of the built app: every script of the page has another name, as after a change, and the
 * old names are gone. `mark` goes into the title, so that a test sees which version runs.
 */
export async function laterBuild(mark: string): Promise<string> {
  const folder = await mkdtemp(join(tmpdir(), 'thrumbook-build-'));
  await cp(process.env['THRUMBOOK_DIST'] ?? DIST, folder, { recursive: true });
  const assets = join(folder, 'assets');
  const scripts = (await readdir(assets)).filter(
    (name) => name.endsWith('.js') && !name.startsWith('worker-'),
  );
  for (const name of scripts) await rename(join(assets, name), join(assets, mark + name));
  const files = [join(folder, 'index.html'), join(folder, 'sw.js')];
  const texts = [
    ...files,
    ...(await readdir(assets)).filter((name) => name.endsWith('.js')).map((name) => join(assets, name)),
  ];
  for (const file of texts) {
    const text = await readFile(file, 'utf8');
    await writeFile(
      file,
      scripts.reduce((value, name) => value.replaceAll(name, mark + name), text),
    );
  }
  await editFile(folder, 'index.html', (html) =>
    html.replace('<head>', `<head><meta name="build" content="${mark}">`),
  );
  return folder;
}

/** Changes one file of a build, and its revision in the service worker. */
export async function editFile(
  folder: string,
  name: string,
  change: (text: string) => string,
): Promise<void> {
  const changed = change(await readFile(join(folder, name), 'utf8'));
  await writeFile(join(folder, name), changed);
  const worker = await readFile(join(folder, 'sw.js'), 'utf8');
  const revision = createHash('md5').update(changed).digest('hex');
  const entry = new RegExp(`(url:"${name.replaceAll('.', '\\.')}",revision:)(?:"[^"]*"|null)`);
  await writeFile(join(folder, 'sw.js'), worker.replace(entry, `$1"${revision}"`));
}

export async function removeBuild(folder: string): Promise<void> {
  await rm(folder, { recursive: true, force: true });
}

/** One address whose content can be exchanged, as a deployment does. */
export async function serveDeployments(): Promise<{
  readonly url: string;
  deploy(folder: string): Promise<void>;
  stop(): Promise<void>;
}> {
  let server: Server = createFileServer(process.env['THRUMBOOK_DIST'] ?? DIST);
  const port = await listen(server, 0);
  const end = async (): Promise<void> => {
    const ended = new Promise((resolve) => server.close(resolve));
    server.closeAllConnections();
    await ended;
  };
  return {
    url: `http://127.0.0.1:${port}/`,
    async deploy(folder) {
      await end();
      server = createFileServer(folder);
      await listen(server, port, 1);
    },
    stop: end,
  };
}
