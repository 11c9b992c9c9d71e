import { spawn } from 'node:child_process';
import { mkdtemp, readFile, rm } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { chromium, type BrowserContext } from 'playwright-core';
import { CHROMIUM_INSTRUCTIONS, findChromium } from '../../src/cli/chromium.mjs';

/**
 * Chromium without the focus emulation that the test driver switches on: here a tab behind another one is hidden and a
 * frozen page hears of it, as on a phone.
 */
export async function launchPlainBrowser(): Promise<{
  readonly context: BrowserContext;
  close(): Promise<void>;
}> {
  const executable = findChromium();
  if (executable === undefined) throw new Error(CHROMIUM_INSTRUCTIONS);
  const profile = await mkdtemp(join(tmpdir(), 'thrumbook-plain-'));
  const flags = ['--headless', '--no-sandbox', '--disable-gpu', '--disable-quic', '--no-first-run'];
  const quiet = ['--disable-background-networking', '--disable-component-update', '--disable-sync'];
  const args = [...flags, ...quiet, '--remote-debugging-port=0', `--user-data-dir=${profile}`, 'about:blank'];
  const child = spawn(executable, args, { stdio: 'ignore' });
  const ended = new Promise((resolve) => child.once('exit', resolve));
  const browser = await chromium.connectOverCDP(`http://127.0.0.1:${await debuggingPort(profile)}`, {
    noDefaults: true,
  });
  return {
    context: browser.contexts()[0]!,
    async close() {
      await browser.close();
      child.kill();
      await ended;
      await rm(profile, { recursive: true, force: true, maxRetries: 5, retryDelay: 100 });
    },
  };
}

async function debuggingPort(profile: string): Promise<number> {
  for (let i = 0; i < 100; i += 1) {
    const text = await readFile(join(profile, 'DevToolsActivePort'), 'utf8').catch(() => '');
    const port = Number(text.split('\n')[0]);
    if (port > 0) return port;
    await new Promise((resolve) => setTimeout(resolve, 100));
  }
  throw new Error('Chromium did not open its debugging port within 10 s');
}
