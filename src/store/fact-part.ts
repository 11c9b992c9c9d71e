import type { StorePort } from '../app/ports.ts';
import type { Connection } from './connection.ts';
import { createFactStore, type FactStore } from './fact-store.ts';
import { createMergeStore } from './merge-store.ts';
import type { StoreEnvironment } from './store-environment.ts';
import { buildSummaries } from './summary-build.ts';

type MergeStore = Pick<StorePort, 'facts' | 'fact' | 'putFacts' | 'rawOf' | 'storedRawOf' | 'changesSince'>;
export type FactPart = FactStore & MergeStore;

/** All that understands facts, and so brings their schemas along: loaded after the first screen stands. */
export async function createFactPart(
  connection: Connection,
  environment: StoreEnvironment,
  device: string,
): Promise<FactPart> {
  await buildSummaries(connection);
  return { ...createFactStore(connection, environment, device), ...createMergeStore(connection) };
}
