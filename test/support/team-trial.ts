import type { TeamStoreReport } from '../../src/core/model/team-store.ts';
import { launchBrowser, type TestBrowser } from './browser.ts';
import { serveFieldPage } from './field-bench.ts';
import { startTeamServer, type TeamServer } from './team-server.ts';

export interface TrialPlan {
  readonly readingCount: number;
  /** How often all connections die in the middle of an upload and the server stays away for a while. */
  readonly cutCount: number;
  /** How often the page is loaded anew in the middle. */
  readonly reloadCount: number;
  /** How often the browser is killed in the middle. */
  readonly killCount: number;
  readonly chance: () => number;
}

export interface TrialFigures {
  readonly fillMs: number;
  readonly packedBytes: number;
  readonly pushUnderCutsMs: number;
  readonly uploadCount: number;
  /** Facts of the server: how many, how many with a second revision, how many that nobody sent. */
  readonly arrivedCount: number;
  readonly conflictCount: number;
  readonly strangeCount: number;
  readonly idleMs: number;
  readonly pullMs: number;
  readonly pulledCount: number;
  readonly wrongCount: number;
}

/**
 * Readings of about 100 kB go from real Chromium to a foreign server while connections die, the page is loaded anew and the
 * browser is killed; then a second browser fetches all and hashes every recording. The server's process stays (its database is in
 * memory): what is killed is all its connections and its listening.
 */
export async function pushUnderCuts(plan: TrialPlan): Promise<TrialFigures> {
  const server = await startTeamServer();
  const served = await serveFieldPage('team-page.ts');
  let first = await launchBrowser();
  const second = await launchBrowser();
  try {
    await open(first, served.url);
    const fillStart = performance.now();
    const made = await first.page.evaluate((count) => window.team.fill(count), plan.readingCount);
    const pushStart = performance.now();
    first = await push(first, served.url, server, plan);
    const pushedAt = performance.now();
    const { uploads } = await server.counts();
    const documents = await server.documents();
    const own = new Set(made.map(({ id }) => id));
    const idle = await first.page.evaluate((account) => window.team.replicate(account), server.account);
    await open(second, served.url);
    const pull = await second.page.evaluate((account) => window.team.replicate(account), server.account);
    const verified = await second.page.evaluate(() => window.team.verify());
    return {
      fillMs: pushStart - fillStart,
      packedBytes: made.reduce((sum, { packedBytes }) => sum + packedBytes, 0),
      pushUnderCutsMs: pushedAt - pushStart,
      uploadCount: uploads,
      arrivedCount: documents.filter(({ id }) => own.has(id)).length,
      conflictCount: documents.filter(({ conflicts }) => conflicts.length > 0).length,
      strangeCount: documents.filter(({ id }) => !own.has(id)).length,
      idleMs: idle.sentCount + idle.fetchedCount === 0 && idle.end === 'done' ? idle.tookMs : Infinity,
      pullMs: pull.tookMs,
      pulledCount: verified.readingCount,
      wrongCount: verified.wrong.length,
    };
  } finally {
    await Promise.all([first.close(), second.close()]);
    await served.stop();
    await server.stop();
  }
}

async function open(browser: TestBrowser, url: string): Promise<void> {
  await browser.page.goto(url);
  await browser.page.waitForFunction(() => window.team !== undefined);
}

/** Troubles come in any order, each after a random share of what is still to send. */
async function push(
  browser: TestBrowser,
  url: string,
  server: TeamServer,
  plan: TrialPlan,
): Promise<TestBrowser> {
  let current = browser;
  const start = () => current.page.evaluate((account) => window.team.start(account), server.account);
  const troubles = shuffled(
    [
      ...Array<'cut'>(plan.cutCount).fill('cut'),
      ...Array<'reload'>(plan.reloadCount).fill('reload'),
      ...Array<'kill'>(plan.killCount).fill('kill'),
    ],
    plan.chance,
  );
  await start();
  const step = (plan.readingCount * 100_000) / (troubles.length + 1.5);
  for (const trouble of troubles) {
    const bytes = step * (0.5 + 0.5 * plan.chance());
    if (trouble === 'cut') {
      await server.cutAfter(bytes);
      await new Promise((resolve) => setTimeout(resolve, 700 * plan.chance()));
      await server.listen();
    } else {
      await server.holdAfter(bytes);
      if (trouble === 'kill') current = await current.killAndRestart();
      await open(current, url);
      await server.listen();
      await start();
    }
    await restartIfGivenUp(current, start);
  }
  const report = await finished(current);
  if (report.end !== 'done') throw new Error(`push ended with ${report.end}`);
  return current;
}

async function finished({ page }: TestBrowser): Promise<TeamStoreReport> {
  await page.waitForFunction(() => window.team.done !== undefined, undefined, { timeout: 500_000 });
  return (await page.evaluate(() => window.team.done))!;
}

async function restartIfGivenUp({ page }: TestBrowser, start: () => Promise<void>): Promise<void> {
  const done = await page.evaluate(() => window.team.done);
  if (done !== undefined && done.end !== 'done') await start();
}

function shuffled<T>(items: readonly T[], chance: () => number): readonly T[] {
  return items
    .map((item) => ({ item, at: chance() }))
    .sort((a, b) => a.at - b.at)
    .map(({ item }) => item);
}
