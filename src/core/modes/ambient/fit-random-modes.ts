import { symmetricInverse } from '../../signal/linear-algebra.ts';
import { expectedModeDensity } from './expected-density.ts';
import type { PieceShape } from './expected-density.ts';

/**
 * Maximum likelihood in the frequency domain (Whittle 1953) of modes under white force over a floor, against the expected
 * periodogram (Sykulski et al. 2019), by Fisher scoring. The band may be bent by the sensor's low-pass: a slope with a
 * prior that is tight far below half the rate takes that up.
 * Misleads when the force is not white across the half-power band (a pump's broad hump reads as a mode), and when the
 * mode wanders during the record (reads as damping).
 */
export interface RandomModeStart {
  readonly frequencyHz: number;
  readonly dampingRatio: number;
  /** Density at the resonance, (m/s²)²/Hz. */
  readonly peakPerHz: number;
  /** Frequency and damping are known from elsewhere (a mode of another direction showing through): only its height is fitted. */
  readonly isShapeHeld?: boolean;
}

export interface RandomModeFit extends RandomModeStart {
  readonly frequencySdHz: number;
  /** Standard deviation of ln(dampingRatio) (Fisher information). */
  readonly dampingLogSd: number;
}

export interface RandomBandFit {
  readonly modes: readonly RandomModeFit[];
  readonly floorPerHz: number;
  readonly slope: number;
  /** Minus log-likelihood, prior included. */
  readonly cost: number;
  readonly converged: boolean;
}

export interface BandData {
  readonly piece: PieceShape;
  /** One-sided periodogram, averaged over `pieceCount` pieces, all bins. */
  readonly periodogram: Float64Array;
  readonly pieceCount: number;
  readonly first: number;
  readonly last: number;
  /** Standard deviation of the prior of the slope d ln S / d ln f about 0; 0 holds it at 0. */
  readonly slopePriorSd: number;
}

/** Damping ratios outside are not searched: below nothing rings out in a recording, above there is no resonance to speak of. */
const LEAST_DAMPING = 1e-4;
const MOST_DAMPING = 0.35;
const MOST_STEPS = 30;
/** Prior of the slope of the floor: real backgrounds fall or rise by 6 dB an octave within a band, seldom more. */
const FLOOR_SLOPE_SD = 2;
/** The floor is not followed further down than e to this below its start: there it no longer shows. */
const FLOOR_DEPTH = 6;
/** Scoring ends when a step changes the cost by less than this. */
const COST_TOLERANCE = 1e-4;

interface Point {
  /** Of each mode: ln f, ln zeta, ln peak; then ln floor, slope of the modes, slope of the floor. */
  readonly theta: Float64Array;
  readonly cost: number;
}

/** @param starts may be empty: then only floor and slope are fitted */
export function fitRandomModes(
  data: BandData,
  starts: readonly RandomModeStart[],
  floorPerHz: number,
): RandomBandFit {
  const size = 3 * starts.length + 3;
  const theta = new Float64Array(size);
  starts.forEach((mode, i) => {
    theta[3 * i] = Math.log(mode.frequencyHz);
    theta[3 * i + 1] = Math.log(mode.dampingRatio);
    theta[3 * i + 2] = Math.log(mode.peakPerHz);
  });
  theta[size - 3] = Math.log(floorPerHz);
  const work = workspace(data, starts);
  let at: Point = { theta, cost: costAt(data, work, theta) };
  const leastFloor = Math.log(floorPerHz) - FLOOR_DEPTH;
  let damping = 1e-3;
  let converged = false;
  for (let step = 0; step < MOST_STEPS && !converged; step++) {
    const { score, fisher } = scoreAndFisher(data, work, at.theta);
    let accepted = false;
    for (let attempt = 0; attempt < 8 && !accepted; attempt++) {
      const next = stepped(at.theta, score, fisher, damping, data, leastFloor);
      const cost = next ? costAt(data, work, next) : Infinity;
      if (next && cost < at.cost) {
        converged = at.cost - cost < COST_TOLERANCE;
        at = { theta: next, cost };
        damping = Math.max(1e-9, damping / 8);
        accepted = true;
      } else damping = Math.max(1e-4, damping * 8);
    }
    if (!accepted) converged = true;
  }
  return described(data, work, at, starts.length, converged);
}

interface Workspace {
  readonly shapes: readonly Float64Array[];
  readonly isHeld: readonly boolean[];
  readonly shifted: Float64Array;
  readonly slopes: readonly Float64Array[];
  readonly density: Float64Array;
  readonly logRatio: Float64Array;
  readonly bend: Float64Array;
  readonly floor: Float64Array;
}

function workspace(data: BandData, starts: readonly RandomModeStart[]): Workspace {
  const modeCount = starts.length;
  const length = data.last - data.first + 1;
  const array = (): Float64Array => new Float64Array(length);
  const centre = (data.first + data.last) / 2;
  return {
    shapes: Array.from({ length: modeCount }, array),
    isHeld: starts.map((mode) => mode.isShapeHeld === true),
    shifted: array(),
    slopes: Array.from({ length: 3 * modeCount + 3 }, array),
    density: array(),
    bend: array(),
    floor: array(),
    logRatio: Float64Array.from({ length }, (_, i) => Math.log((data.first + i) / centre)),
  };
}

function fillDensity(data: BandData, work: Workspace, theta: Float64Array): void {
  const { density, logRatio, shapes, bend, floor } = work;
  const modeCount = shapes.length;
  const level = Math.exp(theta[3 * modeCount] as number);
  const slope = theta[3 * modeCount + 1] as number;
  const tilt = theta[3 * modeCount + 2] as number;
  density.fill(0);
  shapes.forEach((shape, i) => {
    const peak = Math.exp(theta[3 * i + 2] as number);
    expectedModeDensity(
      Math.exp(theta[3 * i] as number),
      Math.exp(theta[3 * i + 1] as number),
      data.piece,
      data.first,
      data.last,
      shape,
    );
    for (let k = 0; k < density.length; k++)
      density[k] = (density[k] as number) + peak * (shape[k] as number);
  });
  for (let k = 0; k < density.length; k++) {
    bend[k] = slope === 0 ? 1 : Math.exp(slope * (logRatio[k] as number));
    floor[k] = level * Math.exp(tilt * (logRatio[k] as number));
    density[k] = (bend[k] as number) * (density[k] as number) + (floor[k] as number);
  }
}

function costAt(data: BandData, work: Workspace, theta: Float64Array): number {
  fillDensity(data, work, theta);
  let cost = 0;
  for (let k = 0; k < work.density.length; k++) {
    const m = work.density[k] as number;
    cost += Math.log(m) + (data.periodogram[data.first + k] as number) / m;
  }
  let prior = 0;
  priors(data, theta.length).forEach(
    ({ index, sd }) => (prior += 0.5 * ((theta[index] as number) / sd) ** 2),
  );
  return data.pieceCount * cost + prior;
}

/** Normal priors about 0 of the two slopes; a slope that is held gets a very narrow one. */
function priors(data: BandData, size: number): { index: number; sd: number }[] {
  return [
    { index: size - 2, sd: Math.max(data.slopePriorSd, 1e-3) },
    { index: size - 1, sd: FLOOR_SLOPE_SD },
  ];
}

function scoreAndFisher(
  data: BandData,
  work: Workspace,
  theta: Float64Array,
): { score: Float64Array; fisher: Float64Array } {
  const size = theta.length;
  const modeCount = work.shapes.length;
  fillDensity(data, work, theta);
  const { density, slopes, shapes, shifted, logRatio, bend } = work;
  for (let i = 0; i < modeCount; i++) {
    const peak = Math.exp(theta[3 * i + 2] as number);
    const shape = shapes[i] as Float64Array;
    const f = Math.exp(theta[3 * i] as number);
    const z = Math.exp(theta[3 * i + 1] as number);
    if (work.isHeld[i]) {
      slopes[3 * i]?.fill(0);
      slopes[3 * i + 1]?.fill(0);
    }
    // Steps small against the half-power width (f) and against the damping itself (zeta).
    for (const [which, h] of [
      [0, 0.02 * Math.max(z, 1e-4)],
      [1, 0.02],
    ] as const) {
      if (work.isHeld[i]) continue;
      const moved = which === 0 ? [f * Math.exp(h), z] : [f, z * Math.exp(h)];
      expectedModeDensity(moved[0] as number, moved[1] as number, data.piece, data.first, data.last, shifted);
      const out = slopes[3 * i + which] as Float64Array;
      for (let k = 0; k < out.length; k++)
        out[k] =
          (peak * (bend[k] as number) * ((shifted[k] as number) - (shape[k] as number))) /
          (h * (density[k] as number));
    }
    const out = slopes[3 * i + 2] as Float64Array;
    for (let k = 0; k < out.length; k++)
      out[k] = (peak * (bend[k] as number) * (shape[k] as number)) / (density[k] as number);
  }
  const onFloor = slopes[size - 3] as Float64Array;
  const onSlope = slopes[size - 2] as Float64Array;
  const onTilt = slopes[size - 1] as Float64Array;
  for (let k = 0; k < density.length; k++) {
    const share = (work.floor[k] as number) / (density[k] as number);
    onFloor[k] = share;
    onSlope[k] = (1 - share) * (logRatio[k] as number);
    onTilt[k] = share * (logRatio[k] as number);
  }
  return accumulated(data, work, theta);
}

function accumulated(
  data: BandData,
  work: Workspace,
  theta: Float64Array,
): { score: Float64Array; fisher: Float64Array } {
  const size = theta.length;
  const score = new Float64Array(size);
  const fisher = new Float64Array(size * size);
  const { density, slopes } = work;
  for (let i = 0; i < size; i++) {
    const a = slopes[i] as Float64Array;
    let sum = 0;
    for (let k = 0; k < density.length; k++)
      sum += (a[k] as number) * ((data.periodogram[data.first + k] as number) / (density[k] as number) - 1);
    score[i] = data.pieceCount * sum;
    for (let j = 0; j <= i; j++) {
      const b = slopes[j] as Float64Array;
      let product = 0;
      for (let k = 0; k < density.length; k++) product += (a[k] as number) * (b[k] as number);
      fisher[i * size + j] = data.pieceCount * product;
      fisher[j * size + i] = data.pieceCount * product;
    }
  }
  work.isHeld.forEach((held, i) => {
    if (!held) return;
    for (const index of [3 * i, 3 * i + 1]) fisher[index * size + index] = 1;
  });
  for (const { index, sd } of priors(data, size)) {
    score[index] = (score[index] as number) - (theta[index] as number) / sd ** 2;
    fisher[index * size + index] = (fisher[index * size + index] as number) + 1 / sd ** 2;
  }
  return { score, fisher };
}

function stepped(
  theta: Float64Array,
  score: Float64Array,
  fisher: Float64Array,
  damping: number,
  data: BandData,
  leastFloor: number,
): Float64Array | undefined {
  const size = theta.length;
  const raised = fisher.slice();
  for (let i = 0; i < size; i++)
    raised[i * size + i] = (raised[i * size + i] as number) * (1 + damping) + 1e-12;
  const inverse = symmetricInverse(raised, size);
  if (!inverse) return undefined;
  const next = theta.slice();
  for (let i = 0; i < size; i++) {
    let step = 0;
    for (let j = 0; j < size; j++) step += (inverse[i * size + j] as number) * (score[j] as number);
    next[i] = (next[i] as number) + Math.max(-1, Math.min(1, step));
  }
  next[size - 3] = Math.max(leastFloor, next[size - 3] as number);
  const lowHz = data.first * data.piece.stepHz;
  const highHz = data.last * data.piece.stepHz;
  for (let i = 0; 3 * i + 3 < size; i++) {
    next[3 * i] = Math.min(Math.log(highHz), Math.max(Math.log(lowHz), next[3 * i] as number));
    next[3 * i + 1] = Math.min(
      Math.log(MOST_DAMPING),
      Math.max(Math.log(LEAST_DAMPING), next[3 * i + 1] as number),
    );
  }
  return next;
}

function described(
  data: BandData,
  work: Workspace,
  at: Point,
  modeCount: number,
  converged: boolean,
): RandomBandFit {
  const size = at.theta.length;
  const { fisher } = scoreAndFisher(data, work, at.theta);
  const inverse = symmetricInverse(fisher, size);
  const sd = (i: number): number =>
    inverse ? Math.sqrt(Math.max(0, inverse[i * size + i] as number)) : Infinity;
  const modes = Array.from({ length: modeCount }, (_, i) => {
    const frequencyHz = Math.exp(at.theta[3 * i] as number);
    return {
      frequencyHz,
      frequencySdHz: frequencyHz * sd(3 * i),
      dampingRatio: Math.exp(at.theta[3 * i + 1] as number),
      dampingLogSd: sd(3 * i + 1),
      peakPerHz: Math.exp(at.theta[3 * i + 2] as number),
    };
  });
  return {
    modes,
    floorPerHz: Math.exp(at.theta[size - 3] as number),
    slope: at.theta[size - 2] as number,
    cost: at.cost,
    converged,
  };
}
