import 'fake-indexeddb/auto';
import { describe, it, expect } from 'vitest';
import { connect } from '../../src/store/connection.ts';
import type { Database } from '../../src/store/schema.ts';
import { asStoreError, StoreError } from '../../src/store/store-error.ts';

let serial = 0;
const freshName = () => `connection-${(serial += 1)}`;
const named = (name: string) => Object.assign(new Error(name), { name });

describe('connect', () => {
  it('opens again once when the browser dropped the connection behind its back', async () => {
    const connection = await connect(freshName());
    let seen: Database | undefined;
    await connection.run(async (database) => {
      seen = database;
      return Promise.resolve();
    });
    // What a browser does to a page that was long in the background.
    seen?.close();
    await connection.change(['settings'], 'relaxed', async (change) => {
      await change.objectStore('settings').put('kept', 'x');
    });
    expect(await connection.run((database) => database.get('settings', 'x'))).toBe('kept');
  });

  it('tries no more than twice', async () => {
    const connection = await connect(freshName());
    let tries = 0;
    const work = () => {
      tries += 1;
      return Promise.reject(named('InvalidStateError'));
    };
    await expect(connection.run(work)).rejects.toMatchObject({ code: 'closed' });
    expect(tries).toBe(2);
  });

  it('undoes all of a change whose work fails', async () => {
    const connection = await connect(freshName());
    const failing = connection.change(['settings'], 'strict', async (change) => {
      await change.objectStore('settings').put('half', 'x');
      throw new TypeError('our own mistake');
    });
    await expect(failing).rejects.toThrow('our own mistake');
    expect(await connection.run((database) => database.get('settings', 'x'))).toBeUndefined();
  });

  it('is closed for good after close()', async () => {
    const connection = await connect(freshName());
    connection.close();
    await expect(connection.run((database) => database.get('settings', 'x'))).rejects.toMatchObject({
      code: 'closed',
    });
  });
});

describe('asStoreError', () => {
  it('names the environment, and lets our own mistakes through', () => {
    const codes = {
      QuotaExceededError: 'quota',
      VersionError: 'newer-database',
      InvalidStateError: 'closed',
      AbortError: 'closed',
      UnknownError: 'unavailable',
      SecurityError: 'unavailable',
    };
    for (const [name, code] of Object.entries(codes))
      expect(asStoreError(named(name))).toMatchObject({ code });
    const mistake = new TypeError('x');
    expect(asStoreError(mistake)).toBe(mistake);
    const known = new StoreError('damaged');
    expect(asStoreError(known)).toBe(known);
  });
});
