import type { AnalysisSettings, BroadPeak, Mode, Tone } from '../model/analysis.ts';
import type { Doubt } from '../model/doubt.ts';
import { failure, success, type Outcome } from '../model/outcome.ts';
import type { ConditionedSignal } from '../signal/condition-recording.ts';
import { findPeaks, lineSpectrum, type LineSpectrum, type Peak } from './line-search.ts';
import { bandSource, type BandSource } from './narrow-band.ts';
import type { ProcedureAnswer } from './procedure-answer.ts';
import { randomModesBetween } from './running-resonance.ts';
import { pollingImages } from './polling-images.ts';
import { withFamilies } from './tone-family.ts';
import { toneOf, withoutLine } from './tone-measure.ts';
import { BAND_HALF_SHARE, bandNature, type BandNature } from './tone-nature.ts';

/** Shorter records hold too few cycles to tell a line from random motion, s. */
export const SHORTEST_RUNNING_S = 5;
/** Below this a line and a light resonance are not told apart with the certainty stated (our study: 1.7 % at 30 s, 0 at 60 s), s. */
const SHORT_RUNNING_S = 25;
/** A strongest tone within so many standard deviations of nothing is said to be weak. */
const WEAK_TONE_SDS = 10;
/** Lines are looked for up to this share of the rate; beyond, a line and its image cannot be told apart in one record. */
const SEARCH_RATE_SHARE = 0.49;
/** Peaks looked at, at most: beyond the twelfth nothing changes a decision on site. */
const MOST_BANDS = 14;
/** A tone below this share of the rounding step may be made by the rounding (our study: smallest found 0.2 step). */
const LEAST_STEP_SHARE = 0.15;
/** Tones below this share of the strongest are left out: time-base and rounding errors make ghosts at -40 dB and below. */
const LEAST_TONE_SHARE = 0.01;
/** Mixed motion above this share of the searched band is not told from the grid's own error there. */
const EDGE_SHARE = 0.85;
/** Skirts of random motion: nearer than this share of the frequency and below this share of its power. */
const SKIRT_SHARE = 0.35;
const SKIRT_POWER_SHARE = 0.2;

/** A running machine: forced lines with amplitude and nature; broad motion between them; a resonance only where no line drives. */
export function runningProcedure(
  signal: ConditionedSignal,
  _settings: AnalysisSettings,
): Outcome<ProcedureAnswer> {
  const { durationS, rateHz, usableBandHz } = signal.facts;
  if (durationS < SHORTEST_RUNNING_S) return failure('too-short', { durationS, neededS: SHORTEST_RUNNING_S });
  const spectrum = lineSpectrum(signal.grid);
  const source = bandSource(signal.grid);
  const bands = judgedBands(source, spectrum, [usableBandHz[0], SEARCH_RATE_SHARE * rateHz]);
  const lines = tonesOf(signal, spectrum, bands);
  const polling = pollingImages(signal, lines);
  const tones = withFamilies(polling?.tones ?? lines, 1 / durationS);
  const random = bands.filter((band) => band.kind === 'random');
  const modes: Mode[] = tones.length ? [] : randomModesBetween(signal, random);
  if (!tones.length && !modes.length && !random.length) return failure('no-tone', { durationS });
  return success({
    modes,
    tones,
    broadPeaks: broadPeaksOf(random, modes),
    tapTimesS: [],
    doubts: [
      ...runningDoubts(bands, tones, durationS, polling?.imagesHz ?? []),
      ...(polling ? [{ code: 'polled' as const, facts: { sensorRateHz: polling.sensorRateHz } }] : []),
    ],
    ringDowns: [],
  });
}

function judgedBands(
  source: BandSource,
  spectrum: LineSpectrum,
  bandHz: readonly [number, number],
): BandNature[] {
  const taken: (readonly [number, number])[] = [];
  const bands: BandNature[] = [];
  const isFree = (peak: Peak): boolean =>
    taken.every(([low, high]) => peak.frequencyHz < low || peak.frequencyHz > high);
  for (const peak of findPeaks(spectrum, bandHz)) {
    if (bands.length >= MOST_BANDS) break;
    if (!isFree(peak)) continue;
    const roomHz = taken.reduce(
      (least, [low, high]) => Math.min(least, Math.max(low - peak.frequencyHz, peak.frequencyHz - high)),
      Infinity,
    );
    const band = bandNature(source, spectrum, peak.frequencyHz, roomHz);
    const reach = Math.max(band.halfWidthHz, BAND_HALF_SHARE * peak.frequencyHz);
    taken.push([peak.frequencyHz - reach, peak.frequencyHz + reach]);
    bands.push(isTrusted(band, bandHz, bands) ? band : { ...band, kind: 'weak' });
  }
  return bands;
}

/** A tone near a stronger random band may be a piece of its skirt; near half the rate, an artefact of the scatter. */
function isTrusted(
  band: BandNature,
  bandHz: readonly [number, number],
  stronger: readonly BandNature[],
): boolean {
  if (band.kind !== 'mixed' && band.kind !== 'wandering') return true;
  const frequencyHz = band.frequenciesHz[0]!;
  const strongest = stronger.reduce((top, other) => Math.max(top, other.power), 0);
  if (
    band.kind === 'mixed' &&
    frequencyHz > EDGE_SHARE * bandHz[1] &&
    band.power < SKIRT_POWER_SHARE * strongest
  )
    return false;
  return !stronger.some(
    (other) =>
      other.kind === 'random' &&
      Math.abs(other.frequenciesHz[0]! / frequencyHz - 1) < SKIRT_SHARE &&
      band.power < SKIRT_POWER_SHARE * other.power,
  );
}

function tonesOf(signal: ConditionedSignal, spectrum: LineSpectrum, bands: readonly BandNature[]): Tone[] {
  // Stronger lines are taken out before a weaker one is asked for its fold: they would pass for structured noise.
  let rest = signal;
  const tones: Tone[] = [];
  for (const band of bands) {
    if (band.kind === 'random' || band.kind === 'weak') continue;
    const own = band.frequenciesHz.map((_, line) => toneOf(rest, spectrum, band, line));
    tones.push(...own);
    rest = withoutLine(rest, own[0]!, band);
  }
  const strongest = tones.reduce((top, tone) => Math.max(top, tone.amplitudeMps2), 0);
  const step = Math.max(...signal.facts.stepMps2);
  const kept = tones.filter(
    (tone) => tone.amplitudeMps2 > Math.max(LEAST_STEP_SHARE * step, LEAST_TONE_SHARE * strongest),
  );
  const resolutionHz = 1 / signal.facts.durationS;
  return withoutTwice(
    kept.sort((a, b) => b.amplitudeMps2 - a.amplitudeMps2),
    resolutionHz,
  );
}

/** Neighbouring bands may both hold a wandering line: the stronger reading is kept. */
function withoutTwice(tones: readonly Tone[], resolutionHz: number): Tone[] {
  return tones.filter((tone, i) =>
    tones.slice(0, i).every((other) => Math.abs(other.frequencyHz - tone.frequencyHz) > resolutionHz),
  );
}

function broadPeaksOf(random: readonly BandNature[], modes: readonly Mode[]): BroadPeak[] {
  return random
    .filter((band) => modes.every((m) => Math.abs(m.frequencyHz - band.frequenciesHz[0]!) > band.halfWidthHz))
    .map((band) => ({
      frequencyHz: band.frequenciesHz[0]!,
      widthHz: 2 * band.halfWidthHz,
      rmsMps2: Math.sqrt(band.power / 2),
    }))
    .sort((a, b) => b.rmsMps2 - a.rmsMps2);
}

function runningDoubts(
  bands: readonly BandNature[],
  tones: readonly Tone[],
  durationS: number,
  imagesHz: readonly number[],
): Doubt[] {
  const doubts: Doubt[] = [];
  if (durationS < SHORT_RUNNING_S)
    doubts.push({ code: 'short', facts: { durationS, neededS: SHORT_RUNNING_S } });
  const [strongest] = tones;
  if (strongest && strongest.amplitudeMps2 < WEAK_TONE_SDS * strongest.amplitudeSdMps2)
    doubts.push({ code: 'low-signal', facts: { amplitudeMps2: strongest.amplitudeMps2 } });
  const isImage = (frequencyHz: number): boolean =>
    imagesHz.some((f) => Math.abs(f - frequencyHz) < 1 / durationS);
  const beating = bands.find((band) => band.frequenciesHz.length > 1 && !band.frequenciesHz.some(isImage));
  if (beating) {
    const [a, b] = beating.frequenciesHz as readonly [number, number];
    doubts.push({ code: 'beating', facts: { frequencyHz: a, otherHz: b, beatS: 1 / Math.abs(a - b) } });
  }
  return doubts;
}
