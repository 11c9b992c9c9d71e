import type { Fold, Tone } from '../model/analysis.ts';
import type { ConditionedSignal } from '../signal/condition-recording.ts';
import { phaseTrack, toneEnvelope, withoutTone } from '../signal/tone-envelope.ts';
import { foldOfTone, signedCandidatesHz } from './fold.ts';
import type { LineSpectrum } from './line-search.ts';
import { envelopeAlong, envelopeDirection } from './narrow-band.ts';
import type { BandNature } from './tone-nature.ts';

/** Length of the blocks a line's amplitude is taken over, s and cycles. */
const BLOCK_S = 0.3;
const BLOCK_CYCLES = 3;

const blockLengthS = (frequencyHz: number): number => Math.max(BLOCK_S, BLOCK_CYCLES / frequencyHz);

/** A steady line is taken out over longer blocks, so that its neighbours lose less. */
const STEADY_BLOCK_S = 2;

/** The signal without a line, so that a weaker one does not meet it as structured noise. */
export function withoutLine(signal: ConditionedSignal, tone: Tone, band: BandNature): ConditionedSignal {
  const signedHz = signedOf(tone.fold, tone.frequencyHz, signal.facts.rateHz);
  const isSteady = band.kind === 'steady' && band.frequenciesHz.length === 1;
  const blockS = Math.max(isSteady ? STEADY_BLOCK_S : 0, blockLengthS(tone.frequencyHz));
  const accelerationMps2 = withoutTone(signal, tone.frequencyHz, signedHz, blockS);
  return { ...signal, accelerationMps2 };
}

/**
 * Amplitude, frequency and fold of one line of a band, by least squares on the times of the samples.
 * @param rest signal with the stronger lines taken out
 * @param line which of the band's lines
 */
export function toneOf(
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
  const signedHz = signedOf(fold, apparentHz, rest.facts.rateHz);
  const last = signedHz === apparentHz ? first : measure(rest, band, line, apparentHz, signedHz, blockS);
  return {
    frequencyHz: last.frequencyHz,
    ...spreadOf(rest, spectrum, band, last, fold),
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
  // An image appears against the sample clock, whose rate is known to the scatter of the stamps; a true line on true stamps is not.
  const isDirect = fold.verdict === 'direct';
  const lateShare = isDirect ? 1 - timing.trueShare : 1;
  const clockRatio = (lateShare * timing.scatterSdS * Math.sqrt(12 / sampleCount)) / durationS;
  const clockHz = clockRatio * (isDirect ? tone.frequencyHz : rateHz);
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

/** Noise in a block beyond this share of the line's power: its phase cannot be followed from block to block. */
const WEAK_NOISE_SHARE = 0.3;

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
  const direction = isAlone ? envelopeDirection(envelope) : band.lineDirections[line]!;
  const { re, im } = envelopeAlong(
    { ...envelope, centreHz: apparentHz, stepS: blockS, startS: 0 },
    direction,
  );
  // Floor S, one-sided: cosine and sine of a block each have the variance S/block.
  const noise = (2 * band.floorPerHz) / blockS;
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
  if (band.kind === 'steady' && noise > WEAK_NOISE_SHARE * power) {
    // Too weak block by block: the whole record's coherent sum.
    return {
      frequencyHz: apparentHz,
      amplitudeMps2: Math.sqrt(band.linePowers[0]!),
      direction: band.lineDirections[0]!,
    };
  }
  const amplitudeMps2 = Math.sqrt(power * (band.kind === 'mixed' ? band.lineShare : 1));
  const track =
    noise < WEAK_NOISE_SHARE * power
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
  return Math.max(0, power - (2 * band.floorPerHz * envelope.re.length) / blockS);
}
