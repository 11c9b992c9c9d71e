import type { LoggedError } from '../app/ports.ts';
import type { Connection } from './connection.ts';
import type { StoreEnvironment } from './store-environment.ts';

/** How many errors are kept: enough for a bad day, small enough to copy. */
export const ERROR_LOG_LIMIT = 200;
const TEXT_LIMIT = 2000;

/** Ring of errors on this phone. Writing never fails outwards: an error about errors helps nobody. */
export function createErrorLog(connection: Connection, environment: StoreEnvironment) {
  return {
    noteError(message: string, detail = ''): void {
      const row = {
        at: environment.nowIso(),
        message: message.slice(0, TEXT_LIMIT),
        detail: detail.slice(0, TEXT_LIMIT),
      };
      void connection
        .change(['errors'], 'relaxed', async (change) => {
          const errors = change.objectStore('errors');
          const last = Number(await errors.add(row));
          await errors.delete(IDBKeyRange.upperBound(last - ERROR_LOG_LIMIT));
        })
        .catch(() => {});
    },
    errorLog(): Promise<readonly LoggedError[]> {
      return connection.run((database) => database.getAll('errors'));
    },
  };
}
