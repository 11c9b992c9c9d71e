/** Samples with their decided times and the steady clock; see `condition-recording`. */
export interface TimedSamples {
  readonly timeS: Float64Array;
  readonly clockS: Float64Array;
  readonly accelerationMps2: readonly Float64Array[];
}

/** Fewest samples in a block: two unknowns per axis and enough left over. */
const FEWEST_SAMPLES = 6;

/** Amplitude and phase of a line block by block, on the decided times: x(t) = Re(z·exp(i·phase(t))) in each block. */
export interface ToneEnvelope {
  readonly blockS: number;
  /** Centre of each block, s. */
  readonly timeS: Float64Array;
  /** One array per axis, m/s² peak. */
  readonly re: readonly Float64Array[];
  readonly im: readonly Float64Array[];
}

/**
 * Least squares of a cosine and a sine per block on the times of the samples (no resampling, no bridging of gaps).
 * @param frequencyHz where the line appears on the clock
 * @param signedHz its true signed frequency: the phase advances with it over the true part of the scatter (see `fold`)
 */
export function toneEnvelope(
  signal: TimedSamples,
  frequencyHz: number,
  signedHz: number,
  blockS: number,
): ToneEnvelope {
  const { timeS, clockS, accelerationMps2 } = signal;
  const n = timeS.length;
  const axes = accelerationMps2.length;
  const times: number[] = [];
  const re = accelerationMps2.map((): number[] => []);
  const im = accelerationMps2.map((): number[] => []);
  const xc = new Float64Array(axes);
  const xs = new Float64Array(axes);
  for (let first = 0; first < n;) {
    const stop = clockS[first]! + blockS;
    let cc = 0;
    let cs = 0;
    let ss = 0;
    let centre = 0;
    xc.fill(0);
    xs.fill(0);
    let i = first;
    for (; i < n && clockS[i]! < stop; i++) {
      const phase = 2 * Math.PI * (frequencyHz * clockS[i]! + signedHz * (timeS[i]! - clockS[i]!));
      const c = Math.cos(phase);
      const s = Math.sin(phase);
      cc += c * c;
      cs += c * s;
      ss += s * s;
      centre += clockS[i]!;
      for (let a = 0; a < axes; a++) {
        xc[a]! += c * accelerationMps2[a]![i]!;
        xs[a]! += s * accelerationMps2[a]![i]!;
      }
    }
    const size = i - first;
    const det = cc * ss - cs * cs;
    if (size >= FEWEST_SAMPLES && det > 0.01 * size * size) {
      times.push(centre / size);
      for (let a = 0; a < axes; a++) {
        re[a]!.push((xc[a]! * ss - xs[a]! * cs) / det);
        im[a]!.push(-(xs[a]! * cc - xc[a]! * cs) / det);
      }
    }
    first = Math.max(i, first + 1);
  }
  return {
    blockS,
    timeS: Float64Array.from(times),
    re: re.map((v) => Float64Array.from(v)),
    im: im.map((v) => Float64Array.from(v)),
  };
}

/** The axes without a line: each block's own cosine and sine taken out. Same conventions as `toneEnvelope`. */
export function withoutTone(
  signal: TimedSamples,
  frequencyHz: number,
  signedHz: number,
  blockS: number,
): Float64Array[] {
  const { timeS, clockS } = signal;
  const envelope = toneEnvelope(signal, frequencyHz, signedHz, blockS);
  const rest = signal.accelerationMps2.map((axis) => Float64Array.from(axis));
  let block = 0;
  for (let i = 0; i < timeS.length && envelope.timeS.length > 0; i++) {
    while (
      block < envelope.timeS.length - 1 &&
      Math.abs(envelope.timeS[block + 1]! - clockS[i]!) < Math.abs(envelope.timeS[block]! - clockS[i]!)
    )
      block++;
    const phase = 2 * Math.PI * (frequencyHz * clockS[i]! + signedHz * (timeS[i]! - clockS[i]!));
    const c = Math.cos(phase);
    const s = Math.sin(phase);
    for (let a = 0; a < rest.length; a++)
      rest[a]![i]! -= envelope.re[a]![block]! * c - envelope.im[a]![block]! * s;
  }
  return rest;
}

export interface PhaseTrack {
  /** Mean frequency against the one assumed, Hz. */
  readonly offsetHz: number;
  /** Standard deviation of the block-to-block frequency about the mean, noise taken off, Hz. */
  readonly deviationHz: number;
}

/**
 * Mean frequency and its variation from the phase of an envelope.
 * @param noiseShare variance of one block's phase from noise, rad²
 */
export function phaseTrack(
  timeS: Float64Array,
  re: Float64Array,
  im: Float64Array,
  noiseShare: number,
): PhaseTrack | undefined {
  const n = timeS.length;
  if (n < 4) return undefined;
  const phase = new Float64Array(n);
  for (let i = 1; i < n; i++) {
    const cross = im[i]! * re[i - 1]! - re[i]! * im[i - 1]!;
    const dot = re[i]! * re[i - 1]! + im[i]! * im[i - 1]!;
    phase[i] = phase[i - 1]! + Math.atan2(cross, dot);
  }
  // Ends against each other: unlike a fitted slope this is the mean even of a line that wanders.
  const tenth = Math.max(1, Math.floor(n / 10));
  let turn = 0;
  let time = 0;
  for (let i = 0; i < tenth; i++) {
    turn += phase[n - 1 - i]! - phase[i]!;
    time += timeS[n - 1 - i]! - timeS[i]!;
  }
  const slope = turn / time;
  let spread = 0;
  let noise = 0;
  for (let i = 1; i < n; i++) {
    const step = timeS[i]! - timeS[i - 1]!;
    spread += ((phase[i]! - phase[i - 1]!) / step - slope) ** 2 / (n - 1);
    noise += (2 * noiseShare) / (step * step) / (n - 1);
  }
  return {
    offsetHz: slope / (2 * Math.PI),
    deviationHz: Math.sqrt(Math.max(0, spread - noise)) / (2 * Math.PI),
  };
}
