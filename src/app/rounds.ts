/** A round is one visit to a site: it begins by itself with the first reading and ends when nothing came for hours. */
import type { ReadingSummary, StorePort } from './ports.ts';
import type { SettingsHolder } from './settings.ts';

/** Without a reading for this long the next one begins a new round; our own choice: longer than a lunch break. */
export const ROUND_PAUSE_MS = 4 * 60 * 60 * 1000;

export interface Rounds {
  /** Readings of the round that goes on, newest first; empty when none does. */
  current(
    now: Date,
  ): Promise<{ readonly id: string | undefined; readonly readings: readonly ReadingSummary[] }>;
  /** The round that a reading taken now belongs to; begins one when needed. */
  forNewReading(now: Date, site?: string): Promise<string>;
  end(): void;
}

export function createRounds(store: StorePort, settings: SettingsHolder): Rounds {
  const running = async (now: Date) => {
    const id = settings.get().round ?? undefined;
    if (!id) return { id: undefined, readings: [] };
    const readings = await store.listReadings({ round: id, trashed: false });
    const last = readings[0]?.recordedAt;
    const isOver = last !== undefined && now.getTime() - Date.parse(last) > ROUND_PAUSE_MS;
    return isOver ? { id: undefined, readings: [] } : { id, readings };
  };
  return {
    current: running,
    async forNewReading(now, site) {
      const round = await running(now);
      if (round.id) return round.id;
      const begun = await store.newEntity('round', {
        startedAt: now.toISOString(),
        ...(site ? { site } : {}),
      });
      settings.change({ round: begun.id });
      return begun.id;
    },
    end: () => settings.change({ round: null }),
  };
}
