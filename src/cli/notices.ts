import { existsSync, readdirSync, readFileSync } from 'node:fs';
import { join } from 'node:path';
import type { Plugin } from 'vite';

/** Inside the service worker, which another tool bundles. */
const SERVICE_WORKER_PACKAGES = [
  'workbox-core',
  'workbox-precaching',
  'workbox-routing',
  'workbox-strategies',
];
const LICENCE_FILE = /^(licen[cs]e|copying)(\.(md|txt))?$/i;

export interface NoticesPlugins {
  /** For the page's bundle: writes notices.txt. */
  readonly page: Plugin;
  /** For the bundle of a worker: only notes what is in it. */
  readonly worker: () => Plugin;
}

/** Vite plugins that collect the licences of the packages that really end up in the bundle. */
export function noticesPlugins(root: string): NoticesPlugins {
  const folders = new Set<string>();
  const note = (ids: Iterable<string>) => {
    for (const id of ids) {
      const folder = packageFolder(id);
      if (folder !== undefined) folders.add(folder);
    }
  };
  const collect: Pick<Plugin, 'renderChunk'> = {
    renderChunk(_code, chunk) {
      note(Object.keys(chunk.modules));
      return null;
    },
  };
  const page: Plugin = {
    name: 'notices',
    apply: 'build',
    ...collect,
    generateBundle() {
      for (const name of SERVICE_WORKER_PACKAGES) folders.add(join(root, 'node_modules', name));
      this.emitFile({ type: 'asset', fileName: 'notices.txt', source: noticesText(root, folders) });
    },
  };
  return { page, worker: () => ({ name: 'notices-worker', apply: 'build', ...collect }) };
}

/** Folder of the package that a module belongs to, or undefined for our own. */
function packageFolder(id: string): string | undefined {
  return /^\0?(.*\/node_modules\/(?:@[^/]+\/)?[^/]+)\//.exec(id.replaceAll('\\', '/'))?.[1];
}

function noticesText(root: string, folders: ReadonlySet<string>): string {
  const own = readFileSync(join(root, 'LICENSE'), 'utf8').trim();
  const parts = [...folders]
    .filter((folder) => existsSync(join(folder, 'package.json')))
    .map(packageNotice)
    .sort();
  return ['Thrumbook', own, 'It contains these packages.', ...parts, ''].join('\n\n');
}

function packageNotice(folder: string): string {
  const { name, version, license } = JSON.parse(readFileSync(join(folder, 'package.json'), 'utf8')) as {
    name: string;
    version: string;
    license?: string;
  };
  const text = licenceText(folder) ?? '';
  return [`${name} ${version} (${license ?? 'see below'})`, text.trim()].join('\n\n').trim();
}

/** The licence file, or the part of the read-me under a heading "License" (fft.js has it there). */
function licenceText(folder: string): string | undefined {
  const entries = readdirSync(folder);
  const file = entries.find((entry) => LICENCE_FILE.test(entry));
  if (file !== undefined) return readFileSync(join(folder, file), 'utf8');
  const readme = entries.find((entry) => /^readme\.md$/i.test(entry));
  return readme === undefined
    ? undefined
    : /^#+\s*licen[cs]e\s*$([\s\S]*)/im.exec(readFileSync(join(folder, readme), 'utf8'))?.[1];
}
