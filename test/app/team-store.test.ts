import { describe, expect, it } from 'vitest';
import type { StorePort, TeamStorePort } from '../../src/app/ports.ts';
import { createTeamStoreUse } from '../../src/app/team-store.ts';
import type { FieldValue } from '../../src/core/model/fact.ts';
import type { TeamStoreProblem } from '../../src/core/model/team-store.ts';

const account = { url: 'https://store.example/works', user: 'm7', password: 'secret' };

function desk(problem?: TeamStoreProblem) {
  const settings = new Map<string, FieldValue>();
  const asked: string[] = [];
  let tellFacts = () => {};
  let finish: (() => void) | undefined;
  const store: Pick<StorePort, 'getSetting' | 'putSetting' | 'onChange'> = {
    getSetting: (key) => Promise.resolve(settings.get(key)),
    putSetting: (key, value) => Promise.resolve(void settings.set(key, value)),
    onChange(listener) {
      tellFacts = () => listener('facts');
      return () => {};
    },
  };
  const port: TeamStorePort = {
    address: (typed) => (typed.startsWith('http:') ? { problem: 'not-secure' } : { url: typed }),
    check: () => Promise.resolve((asked.push('check'), problem)),
    standing: () => Promise.resolve((asked.push('standing'), { waitingCount: 2, refused: [] })),
    async replicate(_account, { signal, onProgress }) {
      asked.push('replicate');
      onProgress({ step: 'sending', doneCount: 1, totalCount: 2 });
      await new Promise<void>((resolve) => {
        finish = resolve;
        signal.addEventListener('abort', () => resolve());
      });
      return { sentCount: 1, fetchedCount: 0, end: signal.aborted ? 'cancelled' : 'done' };
    },
  };
  const use = () => createTeamStoreUse(store, () => Promise.resolve(port));
  return { use, settings, asked, tellFacts: () => tellFacts(), finish: () => finish?.() };
}

describe('createTeamStoreUse', () => {
  it('asks nothing where nothing is set up', async () => {
    const { use, asked } = desk();
    const team = use();
    await team.look();
    await team.replicate();
    expect(team.state.get()).toEqual({ account: 'none' });
    expect(asked).toEqual([]);
  });

  it('remembers an account only after the server took it, the password only if asked', async () => {
    const refused = desk('not-signed-in');
    expect(await refused.use().connect(account, true)).toBe('not-signed-in');
    expect(await refused.use().connect({ ...account, url: 'http://x' }, true)).toBe('not-secure');
    expect(refused.settings.size).toBe(0);

    const { use, settings } = desk();
    const team = use();
    expect(await team.connect(account, false)).toBeUndefined();
    expect(JSON.stringify([...settings])).not.toContain('secret');
    expect(team.state.get().account).toMatchObject({ isPasswordKnown: true });
    const later = use();
    await later.look();
    expect(later.state.get().account).toMatchObject({ user: 'm7', isPasswordKnown: false });
    await team.connect(account, true);
    const atLast = use();
    await atLast.look();
    expect(atLast.state.get().account).toMatchObject({ isPasswordKnown: true });
  });

  it('shows how far a run is, keeps to one run at a time, stops on request', async () => {
    const { use, asked } = desk();
    const team = use();
    await team.connect(account, false);
    const running = team.replicate();
    await new Promise((resolve) => setTimeout(resolve));
    expect(team.state.get().progress).toEqual({ step: 'sending', doneCount: 1, totalCount: 2 });
    await team.replicate();
    expect(asked.filter((what) => what === 'replicate')).toHaveLength(1);
    team.cancel();
    await running;
    expect(team.state.get().progress).toBeUndefined();
    expect(team.state.get().report?.end).toBe('cancelled');
  });

  it('counts what waits anew when readings come', async () => {
    const { use, asked, tellFacts } = desk();
    await use().connect(account, false);
    const before = asked.length;
    tellFacts();
    await new Promise((resolve) => setTimeout(resolve));
    expect(asked.slice(before)).toEqual(['standing']);
  });

  it('forgets address and password', async () => {
    const { use, settings } = desk();
    const team = use();
    await team.connect(account, true);
    await team.forget();
    expect(JSON.stringify([...settings])).not.toContain('store.example');
    expect(team.state.get()).toEqual({ account: 'none' });
  });
});
