import type { AnalysisSettings, BroadPeak, Fold, Mode, Tone } from '../model/analysis.ts';
import type { Doubt } from '../model/doubt.ts';
import { failure, success, type Outcome } from '../model/outcome.ts';
import type { ConditionedSignal } from '../signal/condition-recording.ts';
import { foldOfTone, signedCandidatesHz } from './fold.ts';
import { findPeaks, lineSpectrum, type LineSpectrum, type Peak } from './line-search.ts';
import { bandSource, envelopeAlong, envelopeDirection, type BandSource } from './narrow-band.ts';
import type { ProcedureAnswer } from './procedure-answer.ts';
import { randomModesBetween } from './running-resonance.ts';
import { phaseTrack, toneEnvelope, withoutTone } from '../signal/tone-envelope.ts';
import { withFamilies } from './tone-family.ts';
import { BAND_HALF_SHARE, bandNature, type BandNature } from './tone-nature.ts';

/** Shorter records hold too few cycles to tell a line from random motion, s. */
export const SHORTEST_RUNNING_S = 5;
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
/** Length of the blocks a line's amplitude is taken over, s and cycles. */
const BLOCK_S = 0.3;
const BLOCK_CYCLES = 3;

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
  const tones = tonesOf(signal, spectrum, bands);
  const random = bands.filter((band) => band.kind === 'random');
  const modes: Mode[] = tones.length ? [] : randomModesBetween(signal, random);
  if (!tones.length && !modes.length && !random.length) return failure('no-tone', { durationS });
  return success({
    modes,
    tones,
    broadPeaks: broadPeaksOf(random, modes),
    tapTimesS: [],
    doubts: runningDoubts(bands),
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
    const own = band.frequenciesHz.map((_, line) => toneOf(signal, rest, spectrum, band, line));
    tones.push(...own);
    rest = withoutLine(rest, own[0]!, band);
  }
  const strongest = tones.reduce((top, tone) => Math.max(top, tone.amplitudeMps2), 0);
  const step = Math.max(...signal.facts.stepMps2);
  const kept = tones.filter(
    (tone) => tone.amplitudeMps2 > Math.max(LEAST_STEP_SHARE * step, LEAST_TONE_SHARE * strongest),
  );
  const resolutionHz = 1 / signal.facts.durationS;
  return withFamilies(
    withoutTwice(
      kept.sort((a, b) => b.amplitudeMps2 - a.amplitudeMps2),
      resolutionHz,
    ),
    resolutionHz,
  );
}

/** Neighbouring bands may both hold a wandering line: the stronger reading is kept. */
function withoutTwice(tones: readonly Tone[], resolutionHz: number): Tone[] {
  return tones.filter((tone, i) =>
    tones.slice(0, i).every((other) => Math.abs(other.frequencyHz - tone.frequencyHz) > resolutionHz),
  );
}

const blockLengthS = (frequencyHz: number): number => Math.max(BLOCK_S, BLOCK_CYCLES / frequencyHz);

/** A steady line is taken out over longer blocks, so that its neighbours lose less. */
const STEADY_BLOCK_S = 2;

function withoutLine(signal: ConditionedSignal, tone: Tone, band: BandNature): ConditionedSignal {
  const signedHz = signedOf(tone.fold, tone.frequencyHz, signal.facts.rateHz);
  const isSteady = band.kind === 'steady' && band.frequenciesHz.length === 1;
  const blockS = Math.max(isSteady ? STEADY_BLOCK_S : 0, blockLengthS(tone.frequencyHz));
  const accelerationMps2 = withoutTone(signal, tone.frequencyHz, signedHz, blockS);
  return { ...signal, accelerationMps2 };
}

/** Amplitude, frequency and fold of one line of a band. */
function toneOf(
  signal: ConditionedSignal,
  rest: ConditionedSignal,
  spectrum: LineSpectrum,
  band: BandNature,
  line: number,
): Tone {
  const apparentHz = band.frequenciesHz[line]!;
  const blockS = blockLengthS(apparentHz);
  const first = measure(rest, band, line, apparentHz, apparentHz, blockS);
  const fold = foldOfTone(rest, {
    frequencyHz: apparentHz,
    direction: first.direction,
    ...(band.kind === 'steady' ? {} : { frequencyDeviationHz: first.deviationHz ?? 0 }),
  });
  const signedHz = signedOf(fold, apparentHz, signal.facts.rateHz);
  const last = signedHz === apparentHz ? first : measure(rest, band, line, apparentHz, signedHz, blockS);
  return {
    frequencyHz: last.frequencyHz,
    ...spreadOf(signal, spectrum, band, last, fold),
    ...(last.deviationHz === undefined ? {} : { frequencyDeviationHz: last.deviationHz }),
    amplitudeMps2: last.amplitudeMps2,
    direction: last.direction,
    nature: band.kind === 'mixed' ? 'mixed' : 'forced',
    fold,
  };
}

/** Share of a wandering line's deviation by which its mean over another minute may differ. Walking with foot switches: 0.3. */
const WANDER_OF_MEAN = 0.3;

/** Standard deviations: noise (Rife & Boorstyn 1974), the clock's own rate where the stamps are late, wandering, random motion. */
function spreadOf(
  signal: ConditionedSignal,
  spectrum: LineSpectrum,
  band: BandNature,
  tone: Measured,
  fold: Fold,
): { readonly frequencySdHz: number; readonly amplitudeSdMps2: number } {
  const { durationS, rateHz, sampleCount, timing } = signal.facts;
  const bin = Math.min(spectrum.height.length - 1, Math.round(tone.frequencyHz / spectrum.stepHz));
  const floorPerHz = tone.direction.reduce((sum, d, a) => sum + d * d * spectrum.floorPerHz[a]![bin]!, 0);
  const amplitudeMps2 = Math.max(tone.amplitudeMps2, 1e-9);
  const noiseHz = Math.sqrt((12 * floorPerHz) / durationS) / (2 * Math.PI * durationS * amplitudeMps2);
  const clockRatio = ((1 - timing.trueShare) * timing.scatterSdS * Math.sqrt(12 / sampleCount)) / durationS;
  const clockHz = clockRatio * (fold.verdict === 'direct' ? tone.frequencyHz : rateHz);
  const wanderHz = band.kind === 'steady' ? 0 : WANDER_OF_MEAN * (tone.deviationHz ?? 0);
  const looks = Math.max(1, band.halfWidthHz * durationS);
  return {
    frequencySdHz: Math.hypot(noiseHz, clockHz, wanderHz),
    amplitudeSdMps2: Math.hypot(
      Math.sqrt((2 * floorPerHz) / durationS),
      (amplitudeMps2 * band.envelopeVariation) / Math.sqrt(looks),
    ),
  };
}

function signedOf(fold: Fold, apparentHz: number, rateHz: number): number {
  if (fold.verdict !== 'folded') return apparentHz;
  const trueHz = fold.candidatesHz[0]!;
  return (
    signedCandidatesHz(apparentHz, rateHz).find((f) => Math.abs(Math.abs(f) - trueHz) < 1e-9) ?? apparentHz
  );
}

interface Measured {
  readonly frequencyHz: number;
  readonly amplitudeMps2: number;
  readonly direction: readonly number[];
  readonly deviationHz?: number;
}

function measure(
  signal: ConditionedSignal,
  band: BandNature,
  line: number,
  apparentHz: number,
  signedHz: number,
  blockS: number,
): Measured {
  const envelope = toneEnvelope(signal, apparentHz, signedHz, blockS);
  const isAlone = band.frequenciesHz.length === 1;
  const direction = isAlone ? envelopeDirection(envelope) : lineDirection(envelope, band, line);
  const { re, im } = envelopeAlong(
    { ...envelope, centreHz: apparentHz, stepS: blockS, startS: 0 },
    direction,
  );
  const noise = (4 * band.floorPerHz) / blockS;
  let power = 0;
  for (let i = 0; i < re.length; i++) power += (re[i]! ** 2 + im[i]! ** 2) / re.length;
  power = Math.max(power - noise, 0);
  if (!isAlone) {
    // Several lines beat in each block: their shares come from the joint fit, the scale from the blocks.
    const share = band.linePowers[line]! / band.linePowers.reduce((sum, p) => sum + p, 0);
    return {
      frequencyHz: apparentHz,
      amplitudeMps2: Math.sqrt(totalPower(envelope, band, blockS) * share),
      direction,
    };
  }
  const amplitudeMps2 = Math.sqrt(power * (band.kind === 'mixed' ? band.lineShare : 1));
  const track =
    noise < 0.3 * power
      ? phaseTrack(envelope.timeS, re, im, noise / (2 * Math.max(power, 1e-30)))
      : undefined;
  return {
    // A steady line's frequency comes from the whole record at once; a wandering one's from its phase.
    frequencyHz: band.kind === 'steady' || !track ? apparentHz : apparentHz + track.offsetHz,
    amplitudeMps2,
    direction,
    ...(track ? { deviationHz: track.deviationHz } : {}),
  };
}

function totalPower(envelope: ReturnType<typeof toneEnvelope>, band: BandNature, blockS: number): number {
  let power = 0;
  envelope.re.forEach((re, a) => {
    for (let i = 0; i < re.length; i++) power += (re[i]! ** 2 + envelope.im[a]![i]! ** 2) / re.length;
  });
  return Math.max(0, power - (4 * band.floorPerHz * envelope.re.length) / blockS);
}

/** Direction of one of several lines: principal direction of its own coherent sum over the record. */
function lineDirection(
  envelope: ReturnType<typeof toneEnvelope>,
  _band: BandNature,
  _line: number,
): readonly number[] {
  const re = envelope.re.map((axis) => Float64Array.of(axis.reduce((sum, v) => sum + v, 0) / axis.length));
  const im = envelope.im.map((axis) => Float64Array.of(axis.reduce((sum, v) => sum + v, 0) / axis.length));
  return envelopeDirection({ re, im });
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

function runningDoubts(bands: readonly BandNature[]): Doubt[] {
  const doubts: Doubt[] = [];
  const beating = bands.find((band) => band.frequenciesHz.length > 1);
  if (beating) {
    const [a, b] = beating.frequenciesHz as readonly [number, number];
    doubts.push({ code: 'beating', facts: { frequencyHz: a, otherHz: b, beatS: 1 / Math.abs(a - b) } });
  }
  return doubts;
}
