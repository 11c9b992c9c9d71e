import { bandEnvelope, envelopeAlong, envelopeDirection, principalOrbit } from './narrow-band.ts';
import type { BandSource, Envelope } from './narrow-band.ts';
import type { LineSpectrum } from './line-search.ts';
import { fitSteadyLines, type SteadyLines } from './steady-lines.ts';

/** Half width of the band whose envelope is judged: a share of the frequency or so many reciprocal durations (our study of 900 records). */
export const BAND_HALF_SHARE = 0.08;
const BAND_HALF_RESOLUTIONS = 4;
/** Coefficient of variation of the envelope: below a steady machine's line, above random motion (Rayleigh: 0.52); between both. */
export const FORCED_BELOW = 0.12;
export const RANDOM_ABOVE = 0.33;
/** Share of the band's power that steady lines may leave unexplained and still be all there is. */
const LEFT_SHARE = 0.012;
/** Lines closer than this many reciprocal durations are sidebands of one that wanders. */
const LEAST_SPACING = 2.5;
/** A weaker line below this share of the strongest's power is not counted. */
const LEAST_LINE_POWER_SHARE = 0.005;
const MOST_LINES = 3;
/** Power of a line against the floor's power in one resolution: least for one line alone, and for each of several. */
const LEAST_LINE_SNR = 16;
const LEAST_LINES_SNR = 40;
/** Noise above this share of the band's power: the band is narrowed before its envelope is judged. */
const NOISE_SHARE_LIMIT = 0.25;

/** Share of the whole band's power in its line, by the fourth moment, below which the motion is random (Gaussian: 0, by chance 0.5). */
const RANDOM_LINE_SHARE = 0.6;
/** Below this share of signal in the band nothing is said. */
const LEAST_SIGNAL_SHARE = 0.2;
/** Independent looks (band width times duration) that a narrowed band must hold for its envelope to be judged. */
const LEAST_LOOKS = 20;
/** Where the floor is taken, as multiples of the frequency. */
const FLOOR_PLACES = [0.72, 1, 1.28] as const;

export interface BandNature {
  /** `weak`: stands out of the floor, but nothing more can be said. */
  readonly kind: 'steady' | 'wandering' | 'mixed' | 'random' | 'weak';
  /** Frequencies of steady lines, strongest first; one entry (the centre of power) for the other kinds. Hz. */
  readonly frequenciesHz: readonly number[];
  /** Coefficient of variation of the envelope, noise taken off. */
  readonly envelopeVariation: number;
  /** Share of the band's power in the line itself, 0..1, by the fourth moment. */
  readonly lineShare: number;
  readonly halfWidthHz: number;
  readonly direction: readonly number[];
  /** Mean squared envelope along the direction, noise taken off; (m/s²)². */
  readonly power: number;
  /** Squared amplitude of each steady line, summed over axes; same order as the frequencies. */
  readonly linePowers: readonly number[];
  readonly lineDirections: readonly (readonly number[])[];
  /** Floor along the direction, (m/s²)²/Hz. */
  readonly floorPerHz: number;
}

/**
 * Steady, wandering, mixed with random motion, or random: by steady lines first, then by the spread of the envelope.
 * @param roomHz how far the band may reach before it meets a stronger one
 */
export function bandNature(
  source: BandSource,
  spectrum: LineSpectrum,
  centreHz: number,
  roomHz = Infinity,
): BandNature {
  const leastHz = BAND_HALF_RESOLUTIONS / source.durationS;
  const wholeHz = Math.max(BAND_HALF_SHARE * centreHz, leastHz);
  const floors = floorAround(spectrum, centreHz);
  const looks: Look[] = [lookAt(source, floors, centreHz, Math.max(Math.min(wholeHz, roomHz), leastHz))];
  const widest = looks[0]!;
  for (let look = widest; look.noise > NOISE_SHARE_LIMIT * look.power && look.halfWidthHz > leastHz;) {
    look = lookAt(source, floors, centreHz, Math.max(leastHz, look.halfWidthHz / 2));
    looks.push(look);
  }
  const narrowest = looks[looks.length - 1]!;
  const lines = steadyLines(narrowest, floors);
  if (lines)
    return {
      ...describe(narrowest),
      kind: 'steady',
      frequenciesHz: lines.offsetsHz.map((offset) => narrowest.envelope.centreHz + offset),
      linePowers: lines.powers,
      lineDirections: lines.directions,
    };
  const judged = looks.find((look) => look.noise <= NOISE_SHARE_LIMIT * look.power) ?? narrowest;
  const kind = kindOf(judged, wholeHz, source.durationS);
  // Random motion is described by the whole band, a line by the band that shows it.
  return kind === 'weak' && isRandom(widest, wholeHz)
    ? { ...describe(widest), kind: 'random' }
    : { ...describe(kind === 'random' ? widest : judged), kind };
}

/** A band seen through one width. */
interface Look {
  readonly envelope: Envelope;
  readonly halfWidthHz: number;
  readonly direction: readonly number[];
  /** Mean squared envelope along the direction, and what the floor leaves of it. */
  readonly power: number;
  readonly noise: number;
  readonly variation: number;
  readonly lineShare: number;
  /** The same of all power in the band, noise included. */
  readonly rawLineShare: number;
}

function lookAt(source: BandSource, floors: readonly number[], centreHz: number, halfWidthHz: number): Look {
  const envelope = bandEnvelope(source, centreHz, halfWidthHz);
  const direction = envelopeDirection(envelope);
  const orbit = principalOrbit(envelope);
  const noise = orbit.weights.reduce((sum, weight, a) => sum + weight * floors[a]! * 4 * halfWidthHz, 0);
  const moments = momentsOf(orbit);
  const signalPower = Math.max(moments.power - noise, 1e-12);
  const allNoise = floors.reduce((sum, floor) => sum + floor * 4 * halfWidthHz, 0);
  const across = Math.max(0, orbit.acrossPower - (allNoise - noise));
  const along = Math.max(0, moments.variation ** 2 - noise / (2 * Math.max(moments.power, 1e-12)));
  return {
    envelope,
    halfWidthHz,
    direction,
    power: moments.power,
    noise,
    // Random power N beside a line of power A² makes a variation of sqrt(N/2A²), whichever direction it comes from.
    variation: Math.sqrt(along + across / (2 * signalPower)),
    lineShare: Math.min(1, (moments.power * moments.lineShare) / signalPower),
    rawLineShare: moments.lineShare,
  };
}

const describe = (look: Look): Omit<BandNature, 'kind'> => ({
  frequenciesHz: [centreOfPower(look.envelope, look.direction)],
  envelopeVariation: look.variation,
  lineShare: look.lineShare,
  halfWidthHz: look.halfWidthHz,
  direction: look.direction,
  power: Math.max(look.power - look.noise, 1e-12),
  linePowers: [Math.max(look.power - look.noise, 1e-12)],
  lineDirections: [look.direction],
  floorPerHz: look.noise / (4 * look.halfWidthHz),
});

const isRandom = (look: Look, wholeHz: number): boolean =>
  look.halfWidthHz >= wholeHz &&
  look.noise < (1 - LEAST_SIGNAL_SHARE) * look.power &&
  look.rawLineShare < RANDOM_LINE_SHARE;

/** A narrowed band can only show a line that wanders within it; the rest of the motion is outside. */
function kindOf(look: Look, wholeHz: number, durationS: number): BandNature['kind'] {
  const isWhole = look.halfWidthHz >= wholeHz;
  if (look.noise > NOISE_SHARE_LIMIT * look.power) return 'weak';
  if (!isWhole) {
    const isLine = look.variation < FORCED_BELOW && look.rawLineShare > RANDOM_LINE_SHARE;
    return isLine && 2 * look.halfWidthHz * durationS >= LEAST_LOOKS ? 'wandering' : 'weak';
  }
  if (look.rawLineShare < RANDOM_LINE_SHARE) return 'random';
  if (look.variation < FORCED_BELOW) return 'wandering';
  return look.variation < RANDOM_ABOVE ? 'mixed' : 'random';
}

/** Floor per axis, (m/s²)²/Hz: the lowest of here and well outside to both sides, so that a resonance's skirt does not count as noise. */
function floorAround(spectrum: LineSpectrum, centreHz: number): readonly number[] {
  const last = spectrum.height.length - 1;
  const bins = FLOOR_PLACES.map((ratio) => Math.min(last, Math.round((ratio * centreHz) / spectrum.stepHz)));
  return spectrum.floorPerHz.map((floor) =>
    bins.reduce((least, bin) => Math.min(least, floor[bin]!), Infinity),
  );
}

function momentsOf(orbit: { readonly re: Float64Array; readonly im: Float64Array }): {
  readonly power: number;
  readonly variation: number;
  readonly lineShare: number;
} {
  const { re, im } = orbit;
  const n = re.length;
  let first = 0;
  let second = 0;
  let fourth = 0;
  for (let i = 0; i < n; i++) {
    const square = re[i]! ** 2 + im[i]! ** 2;
    first += Math.sqrt(square) / n;
    second += square / n;
    fourth += (square * square) / n;
  }
  if (!(second > 0)) return { power: 0, variation: 1, lineShare: 0 };
  return {
    power: second,
    variation: Math.sqrt(Math.max(0, second - first * first)) / first,
    // Line plus Gaussian: E|z|⁴ = A⁴ + 4A²N + 2N², so A⁴ = 2·P² - E|z|⁴ (Rice 1944).
    lineShare: Math.sqrt(Math.max(0, 2 - fourth / (second * second))),
  };
}

/** Up to three steady lines when they are all there is above the floor; else undefined. */
function steadyLines(look: Look, floors: readonly number[]): SteadyLines | undefined {
  const { envelope, halfWidthHz } = look;
  const noise = floors.reduce((sum, floor) => sum + floor * 4 * halfWidthHz, 0);
  const durationS = envelope.re[0]!.length * envelope.stepS;
  const resolutions = 2 * halfWidthHz * durationS;
  for (let count = 1; count <= MOST_LINES; count++) {
    const fit = fitSteadyLines(envelope, count);
    const allowed =
      LEFT_SHARE * Math.max(0, fit.totalPower - noise) +
      noise * (1 + 3 / Math.sqrt(resolutions * envelope.re.length));
    const strong = fit.powers.every((p) => p > LEAST_LINE_POWER_SHARE * fit.powers[0]!);
    if (count > 1 && !(strong && spacing(fit.offsetsHz) * durationS > LEAST_SPACING)) return undefined;
    if (fit.leftPower > allowed) continue;
    const level = Math.max(noise, fit.leftPower) / resolutions;
    const least = (count > 1 ? LEAST_LINES_SNR : LEAST_LINE_SNR) * level;
    return fit.powers.every((p) => p > least) ? fit : undefined;
  }
  return undefined;
}

function spacing(offsetsHz: readonly number[]): number {
  const sorted = [...offsetsHz].sort((a, b) => a - b);
  return sorted.slice(1).reduce((least, f, i) => Math.min(least, f - sorted[i]!), Infinity);
}

/** Mean frequency weighted by power: mean turn of the envelope's phase. */
function centreOfPower(envelope: Envelope, direction: readonly number[]): number {
  const { re, im } = envelopeAlong(envelope, direction);
  let cross = 0;
  let dot = 0;
  for (let i = 1; i < re.length; i++) {
    dot += re[i]! * re[i - 1]! + im[i]! * im[i - 1]!;
    cross += im[i]! * re[i - 1]! - re[i]! * im[i - 1]!;
  }
  return envelope.centreHz + Math.atan2(cross, dot) / (2 * Math.PI * envelope.stepS);
}
