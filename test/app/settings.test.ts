import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { DEFAULT_SETTINGS, openSettings, parseSettings } from '../../src/app/settings.ts';

describe('settings', () => {
  it('fall back field by field, so that one broken field costs only itself', () => {
    const kept = { theme: 'dark', frequencyUnit: 'furlong', phoneMassKg: -1, cautionsSeen: ['a', 3] };
    expect(parseSettings(kept)).toEqual({ ...DEFAULT_SETTINGS, theme: 'dark', cautionsSeen: ['a'] });
  });

  it('are whole whatever was kept', () => {
    fc.assert(
      fc.property(fc.anything(), (kept) => {
        expect(Object.keys(parseSettings(kept)).sort()).toEqual(Object.keys(DEFAULT_SETTINGS).sort());
      }),
    );
  });

  it('are written as they are changed, and read again', async () => {
    const values = new Map<string, unknown>();
    const store = {
      getSetting: (key: string) => Promise.resolve(values.get(key) as never),
      putSetting: (key: string, value: unknown) => Promise.resolve(void values.set(key, value)),
    };
    const settings = await openSettings(store, () => {});
    settings.change({ theme: 'sunlight' });
    expect((await openSettings(store, () => {})).get().theme).toBe('sunlight');
  });

  it('tell a failed write instead of losing it silently', async () => {
    const failures: unknown[] = [];
    const store = {
      getSetting: () => Promise.resolve(undefined),
      putSetting: () => Promise.reject(new Error('quota')),
    };
    (await openSettings(store, (error) => failures.push(error))).change({ theme: 'dark' });
    await Promise.resolve();
    await Promise.resolve();
    expect(failures).toHaveLength(1);
  });
});
