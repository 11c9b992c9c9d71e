import { mkdtemp, readlink, rm } from 'node:fs/promises';
import type { Server } from 'node:http';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { chromium, type BrowserContext, type Page } from 'playwright-core';
import { CHROMIUM_INSTRUCTIONS, findChromium } from '../../src/cli/chromium.mjs';
import { createFileServer, listen } from '../../src/cli/file-server.mjs';
import { DIST } from '../../src/cli/project.mjs';

const LAUNCH_FLAGS = [
  '--no-sandbox',
  '--disable-gpu',
  '--disable-quic',
  '--no-first-run',
  '--disable-background-networking',
  '--disable-component-update',
  '--disable-sync',
];
const PHONE = { width: 412, height: 915 };

export interface ServedApp {
  /** Address with a slash at its end; stays the same over stop() and start(). */
  readonly url: string;
  stop(): Promise<void>;
  start(): Promise<void>;
}

/** Serves the built app (or the folder that THRUMBOOK_DIST names) by our own server on a free port. */
export async function serveApp(): Promise<ServedApp> {
  const root = process.env['THRUMBOOK_DIST'] ?? DIST;
  let server: Server | undefined = createFileServer(root);
  const port = await listen(server, 0);
  return {
    url: `http://127.0.0.1:${port}/`,
    async stop() {
      const running = server;
      server = undefined;
      if (!running) return;
      const closed = new Promise((resolve) => running.close(resolve));
      running.closeAllConnections();
      await closed;
    },
    async start() {
      if (server) return;
      server = createFileServer(root);
      await listen(server, port, 1);
    },
  };
}

export interface BrowserOptions {
  /** Default: 412 x 915, touch. */
  readonly viewport?: { readonly width: number; readonly height: number };
  readonly colorScheme?: 'light' | 'dark';
  readonly permissions?: readonly string[];
}

export interface TestBrowser {
  readonly context: BrowserContext;
  readonly page: Page;
  /** Uncaught errors, console errors and policy violations of every page so far. */
  readonly faults: string[];
  /** Ends Chromium as a flat battery would (SIGKILL) and starts it again on the same profile, with an empty page. */
  killAndRestart(): Promise<TestBrowser>;
  /** Ends Chromium and removes its profile. */
  close(): Promise<void>;
}

/** Starts Chromium on a profile of its own. Throws with instructions when there is none. */
export async function launchBrowser(options: BrowserOptions = {}): Promise<TestBrowser> {
  const profile = await mkdtemp(join(tmpdir(), 'thrumbook-e2e-'));
  return launchOn(profile, options);
}

async function launchOn(profile: string, options: BrowserOptions): Promise<TestBrowser> {
  const executablePath = findChromium();
  if (executablePath === undefined) throw new Error(CHROMIUM_INSTRUCTIONS);
  const viewport = options.viewport ?? PHONE;
  const context = await chromium.launchPersistentContext(profile, {
    executablePath,
    args: LAUNCH_FLAGS,
    headless: true,
    viewport,
    hasTouch: viewport.width < 900,
    colorScheme: options.colorScheme ?? 'light',
    ...(options.permissions ? { permissions: [...options.permissions] } : {}),
  });
  const page = context.pages()[0] ?? (await context.newPage());
  const faults: string[] = [];
  noteFaults(page, faults);
  context.on('page', (opened) => noteFaults(opened, faults));
  return {
    context,
    page,
    faults,
    async killAndRestart() {
      await kill(profile, context);
      return launchOn(profile, options);
    },
    async close() {
      await context.close();
      await rm(profile, { recursive: true, force: true, maxRetries: 5, retryDelay: 100 });
    },
  };
}

function noteFaults(page: Page, faults: string[]): void {
  page.on('pageerror', (error) => faults.push(`error: ${error.message}`));
  page.on('console', (message) => {
    if (message.type() === 'error') faults.push(`console: ${message.text()}`);
  });
}

/** Chromium's lock in its profile is a link to "host-pid": the browser process and no other is killed. */
async function kill(profile: string, context: BrowserContext): Promise<void> {
  const lock = await readlink(join(profile, 'SingletonLock'));
  const pid = Number(lock.slice(lock.lastIndexOf('-') + 1));
  const closed = new Promise((resolve) => context.once('close', resolve));
  process.kill(pid, 'SIGKILL');
  await closed;
  await rm(join(profile, 'SingletonLock'), { force: true });
}
