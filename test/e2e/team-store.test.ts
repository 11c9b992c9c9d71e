import { AxeBuilder } from '@axe-core/playwright';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { seededChance } from '../../src/capture/seeded-chance.ts';
import { createTeamStore } from '../../src/exchange/team-store/create-team-store.ts';
import type { Store } from '../../src/store/open-store.ts';
import { takePracticeReading } from '../support/app-steps.ts';
import { launchBrowser, serveApp, type ServedApp, type TestBrowser } from '../support/browser.ts';
import { nodeEnvironment } from '../support/team-environment.ts';
import { newPhone } from '../support/team-phone.ts';
import { startTeamServer, type TeamServer } from '../support/team-server.ts';
import { pushUnderCuts } from '../support/team-trial.ts';

describe('readings of 100 kB to a foreign server (long form: npm run soak -- team-store)', () => {
  it('all arrive once, whatever is cut, reloaded or killed; a second browser fetches them all', async () => {
    const chance = seededChance(1);
    const figures = await pushUnderCuts({
      readingCount: 20,
      cutCount: 2,
      reloadCount: 1,
      killCount: 1,
      chance: () => chance.uniform(),
    });
    console.info('team store', figures);
    expect(figures).toMatchObject({ arrivedCount: 20, conflictCount: 0, strangeCount: 0 });
    expect(figures).toMatchObject({ pulledCount: 20, wrongCount: 0 });
    expect(figures.packedBytes).toBeGreaterThan(20 * 95_000);
    expect(figures.uploadCount).toBeLessThanOrEqual(20 + 4 * 3);
  });
});

describe('team store in the whole built app', () => {
  let app: ServedApp;
  let server: TeamServer;
  let one: TestBrowser;
  let other: TestBrowser;
  const called: string[] = [];

  beforeAll(async () => {
    [app, server] = [await serveApp(), await startTeamServer()];
    [one, other] = [await launchBrowser(), await launchBrowser({ viewport: { width: 1280, height: 800 } })];
    one.context.on('request', (request) => called.push(new URL(request.url()).origin));
  });
  afterAll(async () => {
    await Promise.all([one?.close(), other?.close()]);
    await Promise.all([app?.stop(), server?.stop()]);
  });

  const connect = async ({ page }: TestBrowser, password: string) => {
    await page.getByLabel('Address').fill(server.account.url);
    await page.getByLabel('Your name there').fill(server.account.user);
    await page.getByLabel('Password', { exact: true }).fill(password);
    await page.getByRole('button', { name: 'Connect' }).click();
  };

  it('sends nothing before it is set up, says what is wrong, then carries a reading over', async () => {
    await one.page.goto(`${app.url}?rig=handrail&pace=4`);
    await takePracticeReading(one.page);
    await one.page.goto(`${app.url}#/hand-over`);
    await one.page.getByRole('button', { name: 'Set up a team store' }).click();
    expect([...new Set(called)]).toEqual([new URL(app.url).origin]);

    await connect(one, 'wrong');
    await one.page.getByText('does not know this name with this password').waitFor();
    await connect(one, server.account.password);
    await one.page.getByText('Waiting here').waitFor();
    await one.page.getByRole('button', { name: 'Send and fetch' }).click();
    await one.page.getByText(/^Complete: [1-9]\d* sent, 0 fetched/).waitFor();
    expect((await server.documents()).some(({ id }) => id.startsWith('reading:'))).toBe(true);
    const allowed = [new URL(app.url).origin, new URL(server.account.url).origin];
    expect([...new Set(called)].every((origin) => allowed.includes(origin))).toBe(true);

    await other.page.goto(`${app.url}#/hand-over`);
    await other.page.getByRole('button', { name: 'Set up a team store' }).click();
    await connect(other, server.account.password);
    await other.page.getByRole('button', { name: 'Send and fetch' }).click();
    await other.page.getByText(/^Complete: 0 sent, [1-9]\d* fetched/).waitFor();
    await other.page.goto(`${app.url}#/readings`);
    await other.page.getByText(/Hz/).first().waitFor();
    // The wrong password is an answer of the server that the browser notes by itself.
    expect(one.faults.filter((fault) => !fault.includes('401'))).toEqual([]);
    expect(other.faults).toEqual([]);
  });

  it('shows what two people wrote at once side by side; the choice of one settles it for all', async () => {
    const environment = nodeEnvironment({ stallMs: 10_000 });
    const replicate = (store: Store) =>
      createTeamStore(store, environment).replicate(server.account, {
        signal: new AbortController().signal,
        onProgress: () => {},
      });
    const phones = [await newPhone({ clockMs: -3_600_000 }), await newPhone()];
    for (const phone of phones) await replicate(phone);
    const reading = (await phones[0]!.listReadings())[0]!.id;
    await phones[0]!.edit(reading, { notes: 'Loose at the foot.' });
    await phones[1]!.edit(reading, { notes: 'Tightened. Take again.' });
    for (const phone of phones) await replicate(phone);

    const { page } = other;
    await page.goto(`${app.url}#/hand-over`);
    await page.getByRole('button', { name: 'Send and fetch' }).click();
    await page.getByRole('heading', { name: 'One entry was written twice' }).waitFor();
    await page.getByText('Loose at the foot.').waitFor();
    const { violations } = await new AxeBuilder({ page }).setLegacyMode().analyze();
    expect(violations.map(({ id, nodes }) => `${id}: ${nodes[0]?.html}`)).toEqual([]);
    await page.getByRole('button', { name: 'Keep Tightened. Take again.' }).click();
    await page.getByRole('heading', { name: 'One entry was written twice' }).waitFor({ state: 'detached' });
    await page.getByRole('button', { name: 'Send and fetch' }).click();
    await page.getByText('Complete: 1 sent, 0 fetched.').waitFor();
    for (const phone of phones) {
      await replicate(phone);
      const entity = await phone.entity(reading);
      expect(entity?.conflicts).toEqual({});
      expect(entity?.fields['notes']).toBe('Tightened. Take again.');
    }
  });

  it('tells a call that the policy of the page refuses, and the page for the administrator opens', async () => {
    // A first visit: later ones come from the service worker, past the route below.
    const first = await launchBrowser();
    try {
      const { page, faults } = first;
      // What a build for one team has in its place.
      await page.route(app.url, async (route) => {
        const response = await route.fetch();
        const policy = response.headers()['content-security-policy'] ?? '';
        const narrow = policy.replace(/connect-src [^;]*/, "connect-src 'self'");
        await route.fulfill({
          response,
          headers: { ...response.headers(), 'content-security-policy': narrow },
        });
      });
      await page.goto(`${app.url}#/hand-over`);
      await page.getByRole('button', { name: 'Set up a team store' }).click();
      await connect(first, server.account.password);
      await page.getByText('may only talk to the team stores it was built for').waitFor();
      expect(faults.length).toBeGreaterThan(0);
      expect(faults.filter((fault) => !fault.includes('Content Security Policy'))).toEqual([]);
      await page.goto(`${app.url}help/team-store.html`);
      await page.getByRole('heading', { name: 'The server of a team store' }).waitFor();
      expect(faults.filter((fault) => fault.includes('404'))).toEqual([]);
    } finally {
      await first.close();
    }
  });

  it('asks again for a password that was not to be kept, and forgets the account on request', async () => {
    const { page } = one;
    await page.goto(`${app.url}#/hand-over`);
    await page.reload();
    await page.getByText('Enter the password to go on').waitFor();
    const kept = await page.evaluate(
      async () =>
        new Promise<string>((resolve) => {
          const opening = indexedDB.open('thrumbook');
          opening.onsuccess = () => {
            const all = opening.result.transaction('settings').objectStore('settings').getAll();
            all.onsuccess = () => resolve(JSON.stringify(all.result));
          };
        }),
    );
    expect(kept).toContain(server.account.url);
    expect(kept).not.toContain('päss');
    await page.getByLabel('Password', { exact: true }).fill(server.account.password);
    await page.getByRole('button', { name: 'Sign in' }).click();
    await page.getByRole('button', { name: 'Send and fetch' }).click();
    await page.getByText('Complete: 0 sent, 3 fetched.').waitFor();
    await page.getByText('Account and checks').click();
    await page.getByRole('button', { name: 'Forget this team store' }).click();
    await page.getByRole('button', { name: 'Set up a team store' }).waitFor();
    await page.reload();
    await page.getByRole('button', { name: 'Set up a team store' }).waitFor();
  });
});
