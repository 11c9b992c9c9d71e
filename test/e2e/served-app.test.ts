import { readdirSync } from 'node:fs';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { DIST } from '../../src/cli/project.mjs';
import { launchBrowser, serveApp, type ServedApp, type TestBrowser } from '../support/browser.ts';

let app: ServedApp;
let browser: TestBrowser;

beforeAll(async () => {
  app = await serveApp();
  browser = await launchBrowser();
});

afterAll(async () => {
  await browser.close();
  await app.stop();
});

describe('the built app on our server', () => {
  it('starts without a fault and without a request to anywhere else', async () => {
    const elsewhere: string[] = [];
    browser.page.on('request', (request) => {
      if (!request.url().startsWith(app.url)) elsewhere.push(request.url());
    });
    await browser.page.goto(app.url);
    await browser.page.getByRole('heading').first().waitFor();
    await browser.page.evaluate(async () => void (await navigator.serviceWorker.ready));
    expect(browser.faults).toEqual([]);
    expect(elsewhere).toEqual([]);
  });

  it('runs no script but its own files', async () => {
    const { page } = browser;
    expect(await page.locator('script:not([src])').count()).toBe(0);
    const ran = await page.evaluate(() => {
      const script = document.createElement('script');
      script.textContent = 'window.inlineRan = true';
      document.head.append(script);
      const blob = document.createElement('script');
      blob.src = URL.createObjectURL(new Blob(['window.blobRan = true']));
      document.head.append(blob);
      return new Promise((resolve) =>
        setTimeout(() => resolve(['inlineRan', 'blobRan'].filter((name) => name in window)), 300),
      );
    });
    expect(ran).toEqual([]);
    // eval() of the page's own world; playwright's evaluate runs outside the policy.
    const refused = await page.evaluate(
      () =>
        new Promise((resolve) => {
          addEventListener('securitypolicyviolation', (event) => resolve(event.effectiveDirective), {
            once: true,
          });
          const frame = document.createElement('iframe');
          frame.src = 'https://elsewhere.example/';
          document.body.append(frame);
        }),
    );
    expect(refused).toBe('frame-src');
  });

  it('gives the analysis worker, which does not inherit the policy of the page, one without any connection', async () => {
    const root = process.env['THRUMBOOK_DIST'] ?? DIST;
    const workers = readdirSync(`${root}/assets`).filter(
      (name) => name.startsWith('worker-') && name.endsWith('.js'),
    );
    expect(workers).toHaveLength(1);
    const { headers } = await fetch(`${app.url}assets/${workers[0]}`);
    expect(headers.get('content-security-policy')).toBe("default-src 'none'; script-src 'self'");
  });

  it('keeps every file for work without a network, but the icons of the system', async () => {
    const kept = await browser.page.evaluate(async () => {
      const names = await caches.keys();
      const requests = await Promise.all(names.map(async (name) => (await caches.open(name)).keys()));
      return requests.flat().map((request) => new URL(request.url).pathname.slice(1));
    });
    const root = process.env['THRUMBOOK_DIST'] ?? DIST;
    const built = readdirSync(root, { recursive: true, withFileTypes: true })
      .filter((entry) => entry.isFile())
      .map((entry) => `${entry.parentPath}/${entry.name}`.slice(root.length + 1).replaceAll('\\', '/'))
      .filter((name) => !['.inputs', '_headers', 'sw.js'].includes(name) && !name.endsWith('.png'));
    expect(kept.sort()).toEqual(built.sort());
  });

  it('starts after a flat battery, with the server gone and no network', async () => {
    await app.stop();
    browser = await browser.killAndRestart();
    await browser.context.setOffline(true);
    await browser.page.goto(app.url);
    await browser.page.getByRole('heading').first().waitFor();
    expect(browser.faults).toEqual([]);
  });
});
