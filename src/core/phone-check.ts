import type { PhoneCheck } from './model/fact.ts';
import type { Outcome } from './model/outcome.ts';
import { success } from './model/outcome.ts';
import type { Recording } from './model/recording.ts';
import { conditionRecording } from './signal/condition-recording.ts';

/** Lower end of the band of such a reading, Hz (as in condition-recording.ts: drift and tilt below). */
const LOWEST_PROMISED_HZ = 0.3;
/** Length of the reading that `smallestToneMps2` promises for, s. */
const PROMISED_S = 60;
/**
 * Power of a line over the noise of one bin that no noise reaches by chance: with 1800 bins in 60 s a false alarm
 * in a thousand readings needs ln(1800 * 1000) = 14.4 (exponential law of a periodogram, Schuster 1898).
 */
const DETECTION_RATIO = Math.log(PROMISED_S * 30 * 1000);

/**
 * What this phone can see, from some seconds at rest. Problems as conditionRecording.
 * @param checkedAt UTC stamp, kept as it is
 */
export function phoneCheck(recording: Recording, checkedAt: string): Outcome<PhoneCheck> {
  const conditioned = conditionRecording(recording, 'auto');
  if (!conditioned.ok) return conditioned;
  const { rateHz, timing, stepMps2, noiseMps2PerRootHz, gravityMps2, usableBandHz } = conditioned.value.facts;
  const step = Math.max(0, ...stepMps2);
  return success({
    checkedAt,
    rateHz,
    scatterSdS: timing.scatterSdS,
    repeatCount: timing.repeatCount,
    gapCount: timing.gapCount,
    stepMps2: step,
    noiseMps2PerRootHz,
    gravityMps2: gravityMps2 ?? 0,
    smallestToneMps2: smallestTone(Math.max(...noiseMps2PerRootHz), step),
    // The check is short; the promised reading is not.
    usableBandHz: [Math.min(LOWEST_PROMISED_HZ, usableBandHz[0]), usableBandHz[1]],
  });
}

/** Peak amplitude of the weakest line found in 60 s: a periodogram line is a² T / 2 over the density; a line within half a rounding step may vanish. */
function smallestTone(noiseMps2PerRootHz: number, stepMps2: number): number {
  const byNoise = noiseMps2PerRootHz * Math.sqrt((2 * DETECTION_RATIO) / PROMISED_S);
  return Math.max(byNoise, stepMps2 / 2);
}
