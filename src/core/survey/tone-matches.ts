import type { Analysis, Tone } from '../model/analysis.ts';
import { STANDARD_DEVIATIONS_95 } from '../model/interval.ts';
import type { ToneOrigin } from '../model/guided-pairs.ts';
import type { ToneMatch } from '../model/judgement.ts';
import type { Forcing } from '../model/source.ts';

interface Hit {
  readonly forcingIndex: number;
  readonly folded: boolean;
  /** Relative width of the forcing band: a narrow one is the better explanation. */
  readonly width: number;
  /** Distance to the nearest point of the range, Hz. */
  readonly distanceHz: number;
}

/** A tone's frequency is uncertain by its standard deviation and by half a resolution cell of the record. */
const toneReachHz = (tone: Tone, durationS: number): number =>
  STANDARD_DEVIATIONS_95 * tone.frequencySdHz + 0.5 / durationS;

/** Frequencies that would appear where the tone appears: itself, then k times the rate plus or minus it, up to `upToHz`. */
function sourcesOfImage(tone: Tone, rateHz: number, upToHz: number): { hz: number; folded: boolean }[] {
  const direct = { hz: tone.frequencyHz, folded: false };
  const images: { hz: number; folded: boolean }[] = [];
  for (let k = 1; k * rateHz - tone.frequencyHz <= upToHz; k++)
    images.push(
      { hz: k * rateHz - tone.frequencyHz, folded: true },
      { hz: k * rateHz + tone.frequencyHz, folded: true },
    );
  if (tone.fold.verdict === 'direct') return [direct];
  return tone.fold.verdict === 'folded' ? images : [direct, ...images];
}

function hitsOf(tone: Tone, analysis: Analysis, forcings: readonly Forcing[]): Hit[] {
  const { rateHz, durationS } = analysis.recording;
  const reach = toneReachHz(tone, durationS);
  const upToHz = Math.max(0, ...forcings.map((forcing) => forcing.frequencyHz[1])) + reach;
  return sourcesOfImage(tone, rateHz, upToHz).flatMap(({ hz, folded }) =>
    forcings.flatMap((forcing, forcingIndex) => {
      const [low, high] = forcing.frequencyHz;
      if (hz < low - reach || hz > high + reach) return [];
      const [near, far] = forcing.rangeHz;
      const distanceHz = Math.max(0, near - hz, hz - far);
      return [{ forcingIndex, folded, width: (high - low) / high, distanceHz }];
    }),
  );
}

/** Direct before folded, the narrower band before the wider, then the nearer. */
const isBetter = (a: Hit, b: Hit): boolean => {
  if (a.folded !== b.folded) return !a.folded;
  return Math.abs(a.width - b.width) > 0.05 ? a.width < b.width : a.distanceHz < b.distanceHz;
};

/** Each tone with the forcing that explains it, directly or through a folded image; without one, it is named as unmatched. */
export function toneMatches(analysis: Analysis, forcings: readonly Forcing[]): readonly ToneMatch[] {
  return analysis.tones.map((tone, toneIndex) => {
    const hits = hitsOf(tone, analysis, forcings);
    const first = hits[0];
    if (!first) return { toneIndex, folded: false };
    const best = hits.reduce((held, next) => (isBetter(next, held) ? next : held), first);
    const forcing = forcings[best.forcingIndex] as Forcing;
    return { toneIndex, forcing, forcingIndex: best.forcingIndex, folded: best.folded };
  });
}

/** Below this share a tone counts as gone, above the other as still there. Our own bounds (judgement, no source). */
export const GONE_SHARE = 0.2;
export const REMAINING_SHARE = 0.8;

/** A neighbouring machine's speed wanders this much between two readings with changing load (common practice, no source). */
const OFF_DRIFT_RATIO = 0.005;

/**
 * A steady line below so many standard deviations is not told from the sensor's noise for sure (our own bound). The standard deviation
 * of its amplitude is noise density over root of duration (Rife & Boorstyn, IEEE Trans. Inf. Theory 20 (1974) 591).
 */
const SURE_LINE_SDS = 4;

/** Whether the other reading would have shown what is left of this tone, had it been a fifth of it. */
function wouldShow(tone: Tone, expectedHz: readonly number[], off: Analysis): boolean {
  const { usableBandHz, noiseMps2PerRootHz, durationS } = off.recording;
  const smallest = (SURE_LINE_SDS * Math.max(0, ...noiseMps2PerRootHz)) / Math.sqrt(durationS);
  const isInside = expectedHz.every((hz) => hz >= usableBandHz[0] && hz <= usableBandHz[1]);
  return isInside && GONE_SHARE * tone.amplitudeMps2 >= smallest;
}

/** Where the tone would appear in a reading sampled at another rate: a true frequency stays, an image moves. */
function expectedIn(tone: Tone, rateHz: number): readonly number[] {
  if (tone.fold.verdict === 'direct') return [tone.frequencyHz];
  const asSeen = tone.fold.verdict === 'folded' ? [] : [tone.frequencyHz];
  return [...asSeen, ...tone.fold.candidatesHz].map((hz) => Math.abs(hz - rateHz * Math.round(hz / rateHz)));
}

/**
 * Machine running against machine off, same spot: whose vibration it is. Tones of the running reading are looked for in the other;
 * `unknown` where that one could not have shown them.
 */
export function toneOrigins(running: Analysis, off: Analysis): readonly ToneOrigin[] {
  return running.tones.map((tone, toneIndex) => {
    const reach =
      Math.max(toneReachHz(tone, running.recording.durationS), 0.5 / off.recording.durationS) +
      OFF_DRIFT_RATIO * tone.frequencyHz;
    const expected = expectedIn(tone, off.recording.rateHz);
    const same = off.tones.filter((other) =>
      expected.some((hz) => Math.abs(other.frequencyHz - hz) <= reach),
    );
    const left = Math.max(0, ...same.map((other) => other.amplitudeMps2));
    const remainingRatio = left / tone.amplitudeMps2;
    if (same.length === 0 && !wouldShow(tone, expected, off))
      return { toneIndex, remainingRatio, whose: 'unknown' };
    const whose =
      remainingRatio < GONE_SHARE ? 'machine' : remainingRatio > REMAINING_SHARE ? 'elsewhere' : 'both';
    return { toneIndex, remainingRatio, whose };
  });
}
