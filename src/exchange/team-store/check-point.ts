import type { StorePort } from '../../app/ports.ts';
import type { FieldValue } from '../../core/model/fact.ts';
import { FACT_REFUSALS, type RefusedFact } from '../../core/model/team-store.ts';
import { isPlainObject } from '../../core/packet/canonical-json.ts';
import type { Sequence } from './team-store-calls.ts';

/** How far the work with one server is. Losing it costs time, never a fact: everything is compared again. */
export interface CheckPoint {
  /** Sequence number of this phone's log up to which the server has acknowledged everything. */
  readonly pushed: number;
  /** Place in the server's changes up to which everything was looked at here. */
  readonly since: Sequence;
  readonly lastSuccessAt?: string;
  readonly refused: readonly RefusedFact[];
}

export const START: CheckPoint = { pushed: 0, since: 0, refused: [] };

/** More are counted by nobody: a person looks at the first and calls the administrator (our own bound). */
const REFUSED_LIMIT = 200;

type Settings = Pick<StorePort, 'getSetting' | 'putSetting'>;

const keyOf = (url: string): string => `team-store-point ${url}`;

export async function readCheckPoint(store: Settings, url: string): Promise<CheckPoint> {
  const kept = await store.getSetting(keyOf(url));
  if (!isPlainObject(kept)) return START;
  const { pushed, since, lastSuccessAt, refused } = kept;
  return {
    pushed: typeof pushed === 'number' && pushed > 0 ? pushed : 0,
    since: typeof since === 'string' || typeof since === 'number' ? since : 0,
    ...(typeof lastSuccessAt === 'string' ? { lastSuccessAt } : {}),
    refused: Array.isArray(refused) ? (refused as unknown[]).filter(isRefused) : [],
  };
}

export async function writeCheckPoint(store: Settings, url: string, point: CheckPoint): Promise<void> {
  const refused = point.refused.slice(-REFUSED_LIMIT);
  await store.putSetting(keyOf(url), { ...point, refused } as unknown as FieldValue);
}

/** Each fact once a side, with the newest reason. */
export function withRefused(point: CheckPoint, refused: readonly RefusedFact[]): CheckPoint {
  const named = new Map([...point.refused, ...refused].map((one) => [`${one.lies} ${one.id}`, one]));
  return { ...point, refused: [...named.values()] };
}

function isRefused(value: unknown): value is RefusedFact {
  if (!isPlainObject(value)) return false;
  const { id, lies, reason } = value;
  const isReason = FACT_REFUSALS.some((known) => known === reason);
  return typeof id === 'string' && (lies === 'here' || lies === 'there') && isReason;
}
