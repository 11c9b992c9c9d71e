import { principalDirection } from '../../signal/linear-algebra.ts';
import { envelopeVariation } from './envelope-variation.ts';
import { expectedModeDensity } from './expected-density.ts';
import { fitRandomModes } from './fit-random-modes.ts';
import type { BandData, RandomBandFit, RandomModeFit, RandomModeStart } from './fit-random-modes.ts';
import { background, strongestRise } from './level-scan.ts';
import type { Rise } from './level-scan.ts';
import { bandCovariance, periodogramAlong, totalPeriodogram } from './record-spectra.ts';
import type { RecordSpectra } from './record-spectra.ts';

/** A peak of a record under random excitation, fitted. */
export interface RandomMode extends RandomModeFit {
  /** Unit vector in sensor axes. */
  readonly direction: readonly number[];
  readonly floorPerHz: number;
  /** Log-likelihood gained by the mode over floor and slope (and the modes beside it). */
  readonly gain: number;
  /** Half-power bandwidths times duration, 2·zeta·f·T: how many independent looks the record had. */
  readonly bandwidthTimesDuration: number;
  /** Coefficient of variation of the envelope; absent where the band is too narrow for it. */
  readonly envelopeVariation?: number;
}

/** Fit band: this many half-power half-widths to either side, at least so many Hz and ordinates. Measured on generated records. */
const BAND_HALF_WIDTHS = 20;
const BAND_LEAST_HZ = 0.6;
const BAND_LEAST_BINS = 12;
/** A rise is looked at when its scan statistic exceeds this (noise alone: below 14 in 99.5 % of records). */
const SCAN_GAIN = 14;
/** A mode is kept when its fit gains at least this log-likelihood: three parameters and the search for the place. */
export const FIT_GAIN = 16;
const MOST_MODES = 8;
const POLISHING_ROUNDS = 2;
const MOST_LOOKS = 24;
/** A mode nearer to a stronger one than this many summed half-widths is taken for a misfit of that one. */
const APART_HALF_WIDTHS = 1.5;
/** A mode this much weaker (density) than one whose fit band it lies in is taken for a misfit of its skirt. */
const SKIRT_RATIO = 1 / 300;
/** The envelope is judged in a band of this share of the frequency to either side, or this many reciprocal durations. */
const ENVELOPE_SHARE = 0.08;
const ENVELOPE_RESOLUTIONS = 4;
/** Prior of the slope at half the rate; far below it nothing bends the band. Sensor low-passes fall by 12 to 24 dB an octave. */
const SLOPE_AT_HALF_RATE = 4;

/**
 * Modes under random excitation, strongest gain first.
 * @param bandHz where to look
 */
export function findRandomModes(spectra: RecordSpectra, bandHz: readonly [number, number]): RandomMode[] {
  const { stepHz } = spectra;
  const first = Math.max(2, Math.ceil(bandHz[0] / stepHz));
  const last = Math.min(spectra.binCount - 2, Math.floor(bandHz[1] / stepHz));
  if (last - first < 4 * BAND_LEAST_BINS) return [];
  const total = totalPeriodogram(spectra);
  const axisCount = spectra.pieces[0]?.length ?? 1;
  const weight = axisCount * spectra.pieces.length;
  let found: RandomMode[] = [];
  const refused: Rise[] = [];
  for (let look = 0; look < MOST_LOOKS && found.length < MOST_MODES; look++) {
    const levels = whitened(spectra, total, found, first, last, axisCount);
    // A window refused is not looked at again, but a narrower peak within it may be.
    const isTaken = (bin: number, half: number): boolean =>
      refused.some(
        (r) =>
          Math.abs(r.scanBin - bin) <= Math.max(r.scanHalfWidthBins, 2) && 2 * half >= r.scanHalfWidthBins,
      );
    const rise = strongestRise(levels, first, last, weight, isTaken);
    if (!rise || rise.logLikelihood < SCAN_GAIN) break;
    const next = withRise(spectra, found, rise, [first, last]);
    if (next) found = next;
    else refused.push(rise);
  }
  return withEnvelopes(spectra, polished(spectra, found, [first, last]));
}

/** Each mode fitted again beside the final ones, so that the order in which they were met leaves no trace. */
function polished(
  spectra: RecordSpectra,
  found: readonly RandomMode[],
  limits: readonly [number, number],
): RandomMode[] {
  let modes = [...found];
  for (let round = 0; round < (found.length > 1 ? POLISHING_ROUNDS : 0); round++)
    modes = modes.map((mode) => {
      const fit = refined(
        spectra,
        mode,
        modes.filter((m) => m !== mode),
        limits,
      );
      return { ...mode, ...fit, bandwidthTimesDuration: timesDuration(spectra, fit) };
    });
  return modes;
}

/** Total over modes already found and the background of what is left. */
function whitened(
  spectra: RecordSpectra,
  total: Float64Array,
  found: readonly RandomMode[],
  first: number,
  last: number,
  axisCount: number,
): Float64Array {
  const model = new Float64Array(total.length);
  const shape = new Float64Array(last - first + 1);
  const floor = axisCount * Math.max(...found.map((m) => m.floorPerHz), 0);
  model.fill(found.length ? floor : 1);
  for (const mode of found) {
    expectedModeDensity(mode.frequencyHz, mode.dampingRatio, spectra, first, last, shape);
    for (let k = first; k <= last; k++)
      model[k] = (model[k] as number) + mode.peakPerHz * (shape[k - first] as number);
  }
  const flat = total.map((v, k) => v / (model[k] as number));
  const rest = background(flat, first, last, spectra.stepHz);
  return flat.map((v, k) => (k >= first && k <= last ? v / (rest[k] as number) : 0));
}

/** The modes with one more where the rise is; undefined when the fit does not bear it out. */
function withRise(
  spectra: RecordSpectra,
  found: readonly RandomMode[],
  rise: Rise,
  limits: readonly [number, number],
): RandomMode[] | undefined {
  const { stepHz } = spectra;
  const frequencyHz = rise.bin * stepHz;
  const halfHz = Math.max(rise.halfWidthBins, 1) * stepHz;
  const direction = principalDirection(bandCovariance(spectra, [frequencyHz - halfHz, frequencyHz + halfHz]));
  const periodogram = periodogramAlong(spectra, direction);
  const start: RandomModeStart = {
    frequencyHz,
    dampingRatio: Math.min(0.1, Math.max(0.0005, halfHz / frequencyHz)),
    peakPerHz: meanOver(periodogram, rise.bin - rise.halfWidthBins, rise.bin + rise.halfWidthBins),
  };
  const band = bandOf(start, limits, stepHz);
  const beside = besideOf(found, band, stepHz, direction);
  const data = bandData(spectra, periodogram, band);
  const floor = quietLevel(periodogram, band);
  const without = fitRandomModes(data, beside, floor);
  const best = bestOf(data, start, beside, floor);
  const gain = without.cost - best.cost;
  const fitted = best.modes[0] as RandomModeFit;
  if (gain < FIT_GAIN || !isPlausible(fitted, beside, best, band, stepHz)) return undefined;
  const refit = refined(spectra, fitted, beside, limits);
  const mode: RandomMode = {
    ...refit,
    gain,
    bandwidthTimesDuration: timesDuration(spectra, refit),
  };
  // Modes beside it are fitted again now that this one is known.
  const others = found.map((m) =>
    beside.some((b) => b.frequencyHz === m.frequencyHz)
      ? { ...m, ...refined(spectra, m, [mode, ...found.filter((o) => o !== m)], limits) }
      : m,
  );
  return [...others, mode];
}

const timesDuration = (spectra: RecordSpectra, fit: RandomModeFit): number =>
  2 * fit.dampingRatio * fit.frequencyHz * spectra.pieceSamples * spectra.periodS * spectra.pieces.length;

/** Starts at several widths: the scan knows the width only roughly. */
function bestOf(
  data: BandData,
  start: RandomModeStart,
  beside: readonly RandomModeStart[],
  floor: number,
): RandomBandFit {
  let best: RandomBandFit | undefined;
  for (const factor of [1, 0.4, 2.5]) {
    const own = {
      ...start,
      dampingRatio: Math.min(0.2, start.dampingRatio * factor),
      peakPerHz: start.peakPerHz / Math.max(1, factor / 2),
    };
    const fit = fitRandomModes(data, [own, ...beside], floor);
    if (!best || fit.cost < best.cost) best = fit;
  }
  return best as RandomBandFit;
}

function isPlausible(
  mode: RandomModeFit,
  beside: readonly RandomModeFit[],
  fit: RandomBandFit,
  band: readonly [number, number],
  stepHz: number,
): boolean {
  const width = mode.dampingRatio * mode.frequencyHz;
  const inside =
    mode.frequencyHz > band[0] * stepHz + 0.5 * width && mode.frequencyHz < band[1] * stepHz - 0.5 * width;
  const apart = beside.every(
    (other) =>
      Math.abs(mode.frequencyHz - other.frequencyHz) >
      APART_HALF_WIDTHS * (width + other.dampingRatio * other.frequencyHz),
  );
  const stands = beside.every((other) => mode.peakPerHz > SKIRT_RATIO * other.peakPerHz);
  return inside && apart && stands && mode.dampingRatio < MOST_DAMPING && mode.peakPerHz > fit.floorPerHz;
}

/** Broader than this is no resonance to warn of (amplification below 3). */
const MOST_DAMPING = 0.17;

/** Direction and band set by the fitted width, then fitted once more. */
function refined(
  spectra: RecordSpectra,
  mode: RandomModeFit,
  others: readonly RandomMode[],
  limits: readonly [number, number],
): RandomModeFit & { direction: readonly number[]; floorPerHz: number } {
  const { stepHz } = spectra;
  const reach = Math.max(1.5 * mode.dampingRatio * mode.frequencyHz, stepHz);
  const direction = principalDirection(
    bandCovariance(spectra, [mode.frequencyHz - reach, mode.frequencyHz + reach]),
  );
  const periodogram = periodogramAlong(spectra, direction);
  const band = bandOf(mode, limits, stepHz);
  const beside = besideOf(others, band, stepHz, direction);
  const data = bandData(spectra, periodogram, band);
  const fit = fitRandomModes(data, [mode, ...beside], quietLevel(periodogram, band));
  return { ...(fit.modes[0] as RandomModeFit), direction, floorPerHz: fit.floorPerHz };
}

/** Modes within the band; those of another direction keep their shape, which their own direction shows far better. */
function besideOf<M extends RandomMode>(
  others: readonly M[],
  band: readonly [number, number],
  stepHz: number,
  direction: readonly number[],
): M[] {
  return others
    .filter((m) => m.frequencyHz > band[0] * stepHz && m.frequencyHz < band[1] * stepHz)
    .map((m) => ({ ...m, isShapeHeld: Math.abs(cosine(m.direction, direction)) < SAME_DIRECTION }));
}

const cosine = (a: readonly number[], b: readonly number[]): number =>
  a.reduce((sum, v, i) => sum + v * (b[i] as number), 0);

/** Cosine of two directions above which modes beside each other are fitted jointly. */
const SAME_DIRECTION = 0.5;

function bandOf(mode: RandomModeStart, limits: readonly [number, number], stepHz: number): [number, number] {
  const reachHz = Math.max(
    BAND_HALF_WIDTHS * mode.dampingRatio * mode.frequencyHz,
    BAND_LEAST_HZ,
    BAND_LEAST_BINS * stepHz,
  );
  return [
    Math.max(limits[0], Math.ceil((mode.frequencyHz - reachHz) / stepHz)),
    Math.min(limits[1], Math.floor((mode.frequencyHz + reachHz) / stepHz)),
  ];
}

function bandData(
  spectra: RecordSpectra,
  periodogram: Float64Array,
  band: readonly [number, number],
): BandData {
  const shareOfHalfRate = 2 * band[1] * spectra.stepHz * spectra.periodS;
  return {
    piece: spectra,
    periodogram,
    pieceCount: spectra.pieces.length,
    first: band[0],
    last: band[1],
    slopePriorSd: SLOPE_AT_HALF_RATE * shareOfHalfRate ** 2,
  };
}

function meanOver(values: Float64Array, first: number, last: number): number {
  let sum = 0;
  for (let k = first; k <= last; k++) sum += values[k] as number;
  return sum / (last - first + 1);
}

/** Lower-quartile level of a band: an exponential's quartile is 0.288 of its mean. */
function quietLevel(values: Float64Array, band: readonly [number, number]): number {
  const sorted = values.slice(band[0], band[1] + 1).sort();
  return Math.max((sorted[sorted.length >> 2] as number) / 0.288, 1e-14);
}

function withEnvelopes(spectra: RecordSpectra, modes: readonly RandomMode[]): RandomMode[] {
  const durationS = spectra.pieceSamples * spectra.periodS;
  return modes
    .map((mode) => {
      const reach = Math.max(ENVELOPE_SHARE * mode.frequencyHz, ENVELOPE_RESOLUTIONS / durationS);
      const band = [mode.frequencyHz - reach, mode.frequencyHz + reach] as const;
      const variation = envelopeVariation(spectra, mode.direction, band);
      return variation === undefined ? mode : { ...mode, envelopeVariation: variation };
    })
    .sort((a, b) => b.gain - a.gain);
}
