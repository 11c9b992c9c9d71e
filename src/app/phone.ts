/** The check of this phone: ten seconds at rest, kept, and carried by every later reading. */
import type { FieldValue, PhoneCheck } from '../core/model/fact.ts';
import type { Outcome } from '../core/model/outcome.ts';
import type { CapturePort, StorePort } from './ports.ts';

export interface Phone {
  lastCheck(): Promise<PhoneCheck | undefined>;
  /** Call it inside a tap: it may ask for permission. */
  check(): Promise<Outcome<PhoneCheck>>;
}

const KEY = 'check';

export function createPhone(
  capture: Pick<CapturePort, 'check'>,
  store: Pick<StorePort, 'getSetting' | 'putSetting'>,
): Phone {
  return {
    lastCheck: () => lastCheck(store),
    async check() {
      const outcome = await capture.check();
      if (outcome.ok) await store.putSetting(KEY, outcome.value as unknown as FieldValue);
      return outcome;
    },
  };
}

/** The kept check; this program wrote it, so its shape is looked at only roughly. */
export async function lastCheck(store: Pick<StorePort, 'getSetting'>): Promise<PhoneCheck | undefined> {
  const kept = await store.getSetting(KEY);
  const isCheck = typeof kept === 'object' && kept !== null && 'rateHz' in kept && 'usableBandHz' in kept;
  return isCheck ? (kept as unknown as PhoneCheck) : undefined;
}
