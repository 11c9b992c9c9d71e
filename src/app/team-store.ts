/** Work with the team's server: only what the person set up, only when the person asks. */
import type { FieldValue } from '../core/model/fact.ts';
import type {
  TeamStoreAccount,
  TeamStoreProblem,
  TeamStoreProgress,
  TeamStoreReport,
  TeamStoreStanding,
} from '../core/model/team-store.ts';
import { live, type Live } from './live-state.ts';
import type { StorePort, TeamStorePort } from './ports.ts';

export interface TeamStoreState {
  /** Undefined while it was not looked up yet; `none`: no team store is set up. */
  readonly account?:
    'none' | { readonly url: string; readonly user: string; readonly isPasswordKnown: boolean };
  readonly standing?: TeamStoreStanding;
  /** While a run goes on. */
  readonly progress?: TeamStoreProgress;
  /** Of the run that ended last, since the app was opened. */
  readonly report?: TeamStoreReport;
}

export interface TeamStore {
  readonly state: Live<TeamStoreState>;
  /** What is set up and how it stands; asks no server. */
  look(): Promise<void>;
  /** Asks the server whether the account is right and remembers it then; otherwise what is wrong. */
  connect(account: TeamStoreAccount, isPasswordKept: boolean): Promise<TeamStoreProblem | undefined>;
  /** Send and fetch. `again`: compare everything. */
  replicate(options?: { readonly again?: boolean }): Promise<void>;
  cancel(): void;
  /** The address and the password leave this phone; readings stay on both sides. */
  forget(): Promise<void>;
}

const KEY = 'team-store';

interface Kept {
  readonly url: string;
  readonly user: string;
  readonly password?: string;
}

export function createTeamStoreUse(
  store: Pick<StorePort, 'getSetting' | 'putSetting' | 'onChange'>,
  load: () => Promise<TeamStorePort>,
): TeamStore {
  const state = live<TeamStoreState>({});
  const change = (part: Partial<TeamStoreState>) => state.set({ ...state.get(), ...part });
  let account: TeamStoreAccount | undefined;
  let control: AbortController | undefined;

  const showAccount = (): void => {
    if (account === undefined) return state.set({ account: 'none' });
    const { url, user, password } = account;
    change({ account: { url, user, isPasswordKnown: password !== '' } });
  };
  const showStanding = async (): Promise<void> => {
    if (account !== undefined) change({ standing: await (await load()).standing(account.url) });
  };
  const ended = (): void => {
    control = undefined;
    const { progress: _, ...rest } = state.get();
    state.set(rest);
  };

  // New readings wait at once, also those of another tab; a run counts for itself.
  store.onChange((what) => {
    if (what === 'facts' && control === undefined) showStanding().catch(() => {});
  });

  return {
    state,
    async look() {
      const kept = parseKept(await store.getSetting(KEY));
      const isSame = kept?.url === account?.url && kept?.user === account?.user;
      // A password that was not to be kept lives as long as the page.
      if (!isSame || account === undefined) account = kept && { password: '', ...kept };
      showAccount();
      await showStanding();
    },

    async connect(typed, isPasswordKept) {
      const port = await load();
      const address = port.address(typed.url);
      if ('problem' in address) return address.problem;
      const asked = { url: address.url, user: typed.user, password: typed.password };
      const problem = await port.check(asked, new AbortController().signal);
      if (problem !== undefined) return problem;
      const { url, user, password } = asked;
      const kept: Kept = isPasswordKept ? { url, user, password } : { url, user };
      await store.putSetting(KEY, { ...kept } as FieldValue);
      account = asked;
      showAccount();
      await showStanding();
      return undefined;
    },

    async replicate(options = {}) {
      if (account === undefined || control !== undefined) return;
      const running = new AbortController();
      control = running;
      change({ progress: { step: 'sending', doneCount: 0, totalCount: 0 } });
      try {
        const report = await (
          await load()
        ).replicate(account, {
          ...options,
          signal: running.signal,
          onProgress: (progress) => change({ progress }),
        });
        change({ report });
      } finally {
        ended();
        await showStanding();
      }
    },

    cancel: () => control?.abort(),

    async forget() {
      control?.abort();
      account = undefined;
      await store.putSetting(KEY, null);
      showAccount();
    },
  };
}

/** This program wrote it; still, a broken part only costs typing it again. */
function parseKept(kept: FieldValue | undefined): Kept | undefined {
  if (typeof kept !== 'object' || kept === null) return undefined;
  const { url, user, password } = kept as Readonly<Record<string, FieldValue>>;
  if (typeof url !== 'string' || typeof user !== 'string') return undefined;
  return typeof password === 'string' ? { url, user, password } : { url, user };
}
