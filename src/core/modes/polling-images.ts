import type { Tone } from '../model/analysis.ts';
import type { ConditionedSignal } from '../signal/condition-recording.ts';
import { windowSamples } from '../signal/window.ts';
import { alongDirection } from './fold.ts';

/**
 * Side lines that polling makes. A poll reads the latest value of a sensor that runs on its own clock: the readings are held
 * (zero-order hold at the sensor's rate s), then sampled at the poll's rate p. A line at f becomes lines at f - m·s, each
 * |sinc(f/s - m)| strong (Shannon's sampling theorem with a hold; our own derivation), folded at p. A parent and its two
 * nearest images, each where and as strong as one sensor rate says, are taken as proof.
 */

/** Sensor rates looked for, Hz: slower ones are seen by their repeats, of faster ones the images are faint. */
const SENSOR_RATES_HZ = [30, 420] as const;
/** Order of the images that are taken out, to both sides. */
const HIGHEST_IMAGE = 8;
/** The spectrum at an image over that at its parent may be this factor off the strength predicted. */
const STRENGTH_FACTOR = 1.4;
/** Images read as tones come out weaker or stronger where others lie near: they are taken out up to this factor. */
const TONE_STRENGTH_FACTOR = 1.5;
/** Images of higher order beat against each other: they may be this much stronger than predicted. */
const HIGHER_STRENGTH_FACTOR = 2.5;
/** Images lie within so many resolutions of where they should, and must be further than this from their parent to be told from it. */
const FREQUENCY_RESOLUTIONS = 1;
const LEAST_APART_RESOLUTIONS = 6;
/** Sensor rates whose unexplained tones differ by less than this share of the parent's power are as good: the strengths decide. */
const AS_GOOD_SHARE = 1e-3;
/** The second image, weaker and more disturbed, may be this factor off; images fainter than this share of their parent prove nothing. */
const SECOND_STRENGTH_FACTOR = 2;
const LEAST_IMAGE_SHARE = 0.035;
/** Tones above this share of the rate are not always found. */
const TELLING_RATE_SHARE = 0.45;
/** Samples the strengths are taken on, at most: ten minutes at 60 Hz. */
const MOST_SAMPLES = 36_000;
/** A correction of the amplitude is known to this share of itself. */
const CORRECTION_SPREAD_SHARE = 0.3;

export interface Polling {
  readonly sensorRateHz: number;
  /** Tones that are no images, as strong as they were before the hold; the fold of none can be decided. */
  readonly tones: Tone[];
  /** Frequencies taken for images, Hz. */
  readonly imagesHz: readonly number[];
}

/**
 * @param tones strongest first
 * @returns undefined where the tones are not explained by polling
 */
export function pollingImages(signal: ConditionedSignal, tones: readonly Tone[]): Polling | undefined {
  const [parent] = tones;
  if (!parent || tones.length < 3) return undefined;
  const pollHz = 1 / signal.periodS;
  const resolutionHz = 1 / signal.facts.durationS;
  const strengthAt = strengthAlong(signal, parent.direction);
  let best: { polling: Polling; left: number; misfit: number } | undefined;
  for (const sensorRateHz of possibleRates(tones, pollHz)) {
    if (appearsAt(sensorRateHz, pollHz) < LEAST_APART_RESOLUTIONS * resolutionHz) continue;
    if (imageShare(parent.frequencyHz, sensorRateHz, -1) < LEAST_IMAGE_SHARE) continue;
    if (!hasNearest(tones, sensorRateHz, pollHz, resolutionHz)) continue;
    const misfit = misfitOf(parent.frequencyHz, sensorRateHz, pollHz, strengthAt);
    if (misfit > 1) continue;
    const polling = {
      sensorRateHz,
      ...withoutImages(tones, sensorRateHz, pollHz, FREQUENCY_RESOLUTIONS * resolutionHz),
    };
    const left = polling.tones.slice(1).reduce((sum, tone) => sum + tone.amplitudeMps2 ** 2, 0);
    const asGood = AS_GOOD_SHARE * parent.amplitudeMps2 ** 2;
    const isBetter =
      !best || left < best.left - asGood || (left < best.left + asGood && misfit < best.misfit);
    if (isBetter) best = { polling, left, misfit };
  }
  return best?.polling;
}

/**
 * Magnitude of the Hann-weighted transform along a direction on the stamps, which tell the polls truly, at a signed frequency that
 * may lie far above half the rate: the scatter of the polls tells an image from a line that appears in the same place.
 */
function strengthAlong(
  signal: ConditionedSignal,
  direction: readonly number[],
): (signedHz: number) => number {
  const n = Math.min(signal.timeS.length, MOST_SAMPLES);
  const weights = windowSamples('hann', n);
  const along = alongDirection(
    signal.accelerationMps2.map((axis) => axis.subarray(0, n)),
    direction,
  ).map((v, i) => v * weights[i]!);
  return (signedHz) => {
    let re = 0;
    let im = 0;
    for (let i = 0; i < n; i++) {
      const angle = 2 * Math.PI * signedHz * (signal.clockS[i]! + signal.deviationS[i]!);
      re += along[i]! * Math.cos(angle);
      im += along[i]! * Math.sin(angle);
    }
    return Math.hypot(re, im);
  };
}

/** Sensor rates at which some tone would be the nearest image of the strongest. */
function possibleRates(tones: readonly Tone[], pollHz: number): number[] {
  const parentHz = tones[0]!.frequencyHz;
  const rates: number[] = [];
  for (const tone of tones.slice(1))
    for (const side of [1, -1]) {
      const start = parentHz + side * tone.frequencyHz;
      for (let rateHz = start - pollHz; rateHz < SENSOR_RATES_HZ[1]; rateHz += pollHz)
        if (rateHz > SENSOR_RATES_HZ[0] && rateHz > 2 * parentHz) rates.push(rateHz);
    }
  return rates;
}

/** Where a line of frequency f (signed) appears when sampled at `pollHz`. */
function appearsAt(frequencyHz: number, pollHz: number): number {
  const within = Math.abs(frequencyHz) % pollHz;
  return Math.min(within, pollHz - within);
}

/** Strength of image m over that of the line itself as held. */
const imageShare = (frequencyHz: number, sensorRateHz: number, m: number): number =>
  Math.abs(frequencyHz / sensorRateHz / (frequencyHz / sensorRateHz - m));

/** Both nearest images are among the tones, as far as they lie where tones are looked for. */
function hasNearest(tones: readonly Tone[], sensorRateHz: number, pollHz: number, slackHz: number): boolean {
  return [1, -1].every((m) => {
    const atHz = appearsAt(tones[0]!.frequencyHz - m * sensorRateHz, pollHz);
    const isInBand = atHz > 1 && atHz < TELLING_RATE_SHARE * pollHz;
    return !isInBand || tones.some((t) => t !== tones[0] && Math.abs(t.frequencyHz - atHz) < 2 * slackHz);
  });
}

/** Largest log ratio of measured to predicted strength among the nearest images, as a share of what is allowed. */
function misfitOf(
  parentHz: number,
  sensorRateHz: number,
  pollHz: number,
  strengthAt: (signedHz: number) => number,
): number {
  const own = strengthAt(parentHz);
  return [1, -1, 2].reduce((worst, m) => {
    const signedHz = parentHz - m * sensorRateHz;
    // Where the slow part was taken off nothing can be said.
    if (appearsAt(signedHz, pollHz) < 0.5) return worst;
    const predicted = own * imageShare(parentHz, sensorRateHz, m);
    const off =
      Math.abs(Math.log(strengthAt(signedHz) / predicted)) /
      Math.log(m === 2 ? SECOND_STRENGTH_FACTOR : STRENGTH_FACTOR);
    return Math.max(worst, off);
  }, 0);
}

function withoutImages(
  tones: readonly Tone[],
  sensorRateHz: number,
  pollHz: number,
  slackHz: number,
): Omit<Polling, 'sensorRateHz'> {
  const kept: Tone[] = [];
  const imagesHz: number[] = [];
  for (const tone of tones) {
    const isImage = kept.some((parent) => isImageOf(tone, parent, sensorRateHz, pollHz, slackHz));
    if (isImage) imagesHz.push(tone.frequencyHz);
    else kept.push(tone);
  }
  return { tones: kept.map((tone) => asBeforeTheHold(tone, sensorRateHz)), imagesHz };
}

function isImageOf(tone: Tone, parent: Tone, sensorRateHz: number, pollHz: number, slackHz: number): boolean {
  for (let m = -HIGHEST_IMAGE; m <= HIGHEST_IMAGE; m++) {
    if (m === 0) continue;
    const order = Math.abs(m);
    const atHz = appearsAt(parent.frequencyHz - m * sensorRateHz, pollHz);
    const strength = parent.amplitudeMps2 * imageShare(parent.frequencyHz, sensorRateHz, m);
    const most = strength * (order === 1 ? TONE_STRENGTH_FACTOR : HIGHER_STRENGTH_FACTOR);
    if (Math.abs(tone.frequencyHz - atHz) < (order + 1) * slackHz && tone.amplitudeMps2 < most) return true;
  }
  return false;
}

/** A hold lowers a line by sinc(f/s). What is folded cannot be told where stamp and reading are two clocks. */
function asBeforeTheHold(tone: Tone, sensorRateHz: number): Tone {
  const turn = (Math.PI * tone.frequencyHz) / sensorRateHz;
  const gain = turn / Math.sin(turn);
  const { candidatesHz } = tone.fold;
  return {
    ...tone,
    amplitudeMps2: gain * tone.amplitudeMps2,
    amplitudeSdMps2: Math.hypot(
      gain * tone.amplitudeSdMps2,
      CORRECTION_SPREAD_SHARE * (gain - 1) * tone.amplitudeMps2,
    ),
    fold: {
      verdict: 'undecided',
      candidatesHz: [tone.frequencyHz, ...candidatesHz.filter((f) => f !== tone.frequencyHz)],
    },
  };
}
