/** Kinds A1, A1F, A2, A2c, A3: taps, each with a contact pulse, ringing one or two modes; A3 with a machine's tone. */
import { addAlong, deliver, drawDevice, drawSampleTimes, noiseVariance, stillMotion } from './device.ts';
import { signalBounds } from './cramer-rao.ts';
import type { Random } from './random.ts';
import type { CaseKind, CaseTruth, GeneratedCase, ModeTruth } from './truth.ts';

const CONTACT_S = 0.02;
/** Samples this long after a tap count for nothing in the bound (matches the delivered bounds within 2 %). */
const LEFT_OUT_S = 0.035;
const PHASE_SCATTER_RAD = 0.3;

export interface DrawnMode {
  readonly frequencyHz: number;
  readonly dampingRatio: number;
  readonly direction: number[];
  /** Of each tap. */
  readonly amplitudes: number[];
  readonly phases: number[];
}

export interface TapShape {
  readonly frequencyHz: number;
  readonly dampingRatio: number;
}

function drawShapes(random: Random, kind: CaseKind): TapShape[] {
  if (kind === 'A1')
    return [{ frequencyHz: random.logUniform(2, 24), dampingRatio: random.logUniform(0.003, 0.08) }];
  if (kind === 'A1F') {
    const frequencyHz = random.chance(0.5) ? random.uniform(6, 24) : random.uniform(33, 55);
    return [{ frequencyHz, dampingRatio: random.logUniform(0.004, 0.017) }];
  }
  if (kind === 'A2c') {
    const frequencyHz = random.logUniform(3, 14);
    return [frequencyHz, 1.03 * frequencyHz].map((f) => ({
      frequencyHz: f,
      dampingRatio: random.logUniform(0.003, 0.02),
    }));
  }
  const first = { frequencyHz: random.logUniform(3, 15), dampingRatio: random.logUniform(0.003, 0.035) };
  if (kind === 'A3') return [first];
  const second = first.frequencyHz * random.uniform(1.1, 1.6);
  return [first, { frequencyHz: second, dampingRatio: random.logUniform(0.003, 0.035) }];
}

export const ringDown = (mode: TapShape, sinceS: number, phaseRad: number): number => {
  if (sinceS < 0) return 0;
  const w = 2 * Math.PI * mode.frequencyHz;
  return (
    Math.exp(-mode.dampingRatio * w * sinceS) *
    Math.sin(w * Math.sqrt(1 - mode.dampingRatio ** 2) * sinceS + phaseRad)
  );
};

function drawMode(random: Random, shape: TapShape, tapCount: number, peak: number): DrawnMode {
  const raw = Array.from({ length: tapCount }, () => random.uniform(0.5, 1));
  const largest = Math.max(...raw);
  const sign = random.pick([1, -1]);
  return {
    ...shape,
    direction: random.direction().map((d) => sign * d),
    amplitudes: raw.map((a) => (peak * a) / largest),
    phases: raw.map(() => PHASE_SCATTER_RAD * random.normal()),
  };
}

function motionOf(mode: DrawnMode, timeS: Float64Array, taps: readonly number[]): Float64Array {
  return timeS.map((t) =>
    taps.reduce(
      (sum, tap, j) =>
        t < tap
          ? sum
          : sum + (mode.amplitudes[j] as number) * ringDown(mode, t - tap, mode.phases[j] as number),
      0,
    ),
  );
}

/** Bounds of every mode's frequency and damping with true onsets, amplitudes and phases free on each tap and axis; samples under the contact left out. */
export function tapBounds(
  modes: readonly DrawnMode[],
  allTimesS: Float64Array,
  taps: readonly number[],
  toneHz: number | undefined,
  variance: number,
): number[] {
  const timeS = allTimesS.filter((t) => taps.every((tap) => t < tap || t >= tap + LEFT_OUT_S));
  const linear: Float64Array[] = [new Float64Array(timeS.length).fill(1)];
  for (const mode of modes)
    for (const tap of taps)
      for (const phase of [0, Math.PI / 2]) linear.push(timeS.map((t) => ringDown(mode, t - tap, phase)));
  const derivatives: Float64Array[][] = [];
  const along = (values: Float64Array, direction: readonly number[]): Float64Array[] =>
    direction.map((d) => values.map((v) => v * d));
  for (const mode of modes)
    for (const key of ['frequencyHz', 'dampingRatio'] as const) {
      const h = mode[key] * 1e-6;
      const up = motionOf({ ...mode, [key]: mode[key] + h }, timeS, taps);
      const down = motionOf({ ...mode, [key]: mode[key] - h }, timeS, taps);
      derivatives.push(
        along(
          up.map((u, i) => (u - (down[i] as number)) / (2 * h)),
          mode.direction,
        ),
      );
    }
  if (toneHz !== undefined) {
    for (const phase of [0, Math.PI / 2])
      linear.push(timeS.map((t) => Math.sin(2 * Math.PI * toneHz * t + phase)));
    derivatives.push(
      along(
        timeS.map((t) => t * Math.cos(2 * Math.PI * toneHz * t)),
        [1, 0, 0],
      ),
    );
  }
  return signalBounds(derivatives, linear, variance);
}

export function tapCase(random: Random, kind: CaseKind, seed: number, index: number): GeneratedCase {
  const name = `${kind}_${String(index).padStart(4, '0')}`;
  const device = drawDevice(random, {
    ...(kind === 'A1F' ? { fs: 60 } : {}),
    steps: kind === 'A1' ? [0, 0.01, 0.01, 0.1] : [0, 0.01],
  });
  const durationS = random.uniform(30, 60);
  const tapCount = kind === 'A1' ? random.integer(1, 8) : random.integer(2, 7);
  const spacing = (durationS - 2) / tapCount;
  const taps = Array.from({ length: tapCount }, (_, j) => 2 + j * spacing + random.uniform(-0.3, 0.3));
  const times = drawSampleTimes(random, device, durationS);
  const peak = kind === 'A1F' ? random.logUniform(0.9, 4) : random.logUniform(0.3, 4);
  const modes = drawShapes(random, kind).map((shape, i) =>
    drawMode(random, shape, tapCount, i ? peak * random.uniform(0.35, 1) : peak),
  );
  const motion = stillMotion(times.trueS.length);
  for (const mode of modes) {
    const values = motionOf(mode, times.trueS, taps);
    addAlong(motion, mode.direction, (k) => values[k] as number);
  }
  const main = modes[0] as DrawnMode;
  if (random.chance(0.6)) addContact(random, motion, times.trueS, taps, main.amplitudes);
  let toneHz: number | undefined;
  if (kind === 'A3') {
    toneHz = main.frequencyHz * (random.chance(0.35) ? random.uniform(0.7, 0.95) : random.uniform(1.05, 1.8));
    const amplitude = peak * random.uniform(0.14, 0.7);
    const phase = random.uniform(0, 2 * Math.PI);
    const omega = 2 * Math.PI * toneHz;
    addAlong(
      motion,
      random.direction(),
      (k) => amplitude * Math.sin(omega * (times.trueS[k] as number) + phase),
    );
  }
  const bounds = tapBounds(modes, times.trueS, taps, toneHz, noiseVariance(device));
  const modeTruth: ModeTruth[] = modes.map((mode, i) => ({
    f_hz: mode.frequencyHz,
    zeta: mode.dampingRatio,
    crlb_f: bounds[2 * i] as number,
    crlb_zeta: bounds[2 * i + 1] as number,
    peak_mps2: Math.max(...mode.amplitudes),
  }));
  const truth: CaseTruth = {
    kind,
    index,
    seed,
    device,
    ...(toneHz === undefined ? {} : { tone_hz: toneHz }),
    taps_s: taps,
    modes: modeTruth,
    t0_s: times.stampS[0] as number,
  };
  return { name, truth, recording: deliver(random, device, times, motion, `${name}.csv`) };
}

/** Half-sine pulse of the knuckle on the phone's neighbourhood, in its own direction. */
function addContact(
  random: Random,
  motion: Float64Array[],
  timeS: Float64Array,
  taps: readonly number[],
  amplitudes: readonly number[],
): void {
  const share = random.uniform(0.45, 2);
  const direction = random.direction();
  addAlong(motion, direction, (k) => {
    const t = timeS[k] as number;
    const j = taps.findIndex((tap) => t >= tap && t < tap + CONTACT_S);
    if (j < 0) return 0;
    return share * (amplitudes[j] as number) * Math.sin((Math.PI * (t - (taps[j] as number))) / CONTACT_S);
  });
}
