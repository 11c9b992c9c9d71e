/** Kind D: an unbalanced machine slows down through a resonance. */
import { addAlong, deliver, drawDevice, drawSampleTimes, noiseVariance, stillMotion } from './device.ts';
import { signalBounds } from './cramer-rao.ts';
import type { Random } from './random.ts';
import type { GeneratedCase } from './truth.ts';

/** Longest step of the integration, s. */
const STEP_S = 0.5e-3;

export interface Sweep {
  /** Speed start - rate·t + curve·t², Hz. */
  readonly start: number;
  readonly rate: number;
  readonly curve: number;
}

export interface CoastdownModel extends Sweep {
  readonly frequencyHz: number;
  readonly dampingRatio: number;
}

/**
 * Complex acceleration of the mode driven by a rotating unbalance (force as speed squared), Runge-Kutta 4.
 * @param timeS increasing sample times, s
 * @param settled true: running steadily before the record; false: at rest until then
 * @returns re and im at the sample times, in units of unbalance acceleration at the natural frequency
 */
export function coastdownResponse(
  model: CoastdownModel,
  timeS: Float64Array,
  settled: boolean,
): { re: Float64Array; im: Float64Array } {
  const w0 = 2 * Math.PI * model.frequencyHz;
  const damping = 2 * model.dampingRatio * w0;
  const speed = (t: number): number => model.start - model.rate * t + model.curve * t * t;
  const phase = (t: number): number =>
    2 * Math.PI * (model.start * t - (model.rate * t * t) / 2 + (model.curve * t ** 3) / 3);
  const force = (t: number, out: { re: number; im: number }): void => {
    const size = (speed(t) / model.frequencyHz) ** 2;
    const p = phase(t);
    out.re = size * Math.cos(p);
    out.im = size * Math.sin(p);
  };
  const f0 = { re: 0, im: 0 };
  const fm = { re: 0, im: 0 };
  const f1 = { re: 0, im: 0 };
  let t = Math.min(timeS[0] as number, 0);
  force(t, f0);
  let x = [0, 0];
  let v = [0, 0];
  if (settled) {
    const w = 2 * Math.PI * speed(t);
    const re = w0 * w0 - w * w;
    const im = damping * w;
    const d = re * re + im * im;
    x = [(f0.re * re + f0.im * im) / d, (f0.im * re - f0.re * im) / d];
    v = [-w * (x[1] as number), w * (x[0] as number)];
  }
  const outRe = new Float64Array(timeS.length);
  const outIm = new Float64Array(timeS.length);
  const stiff = w0 * w0;
  const component = (h: number, c: 0 | 1, a: number, m: number, b: number): void => {
    const x0 = x[c] as number;
    const v0 = v[c] as number;
    const k1 = a - damping * v0 - stiff * x0;
    const v2 = v0 + (h / 2) * k1;
    const k2 = m - damping * v2 - stiff * (x0 + (h / 2) * v0);
    const v3 = v0 + (h / 2) * k2;
    const k3 = m - damping * v3 - stiff * (x0 + (h / 2) * v2);
    const v4 = v0 + h * k3;
    const k4 = b - damping * v4 - stiff * (x0 + h * v3);
    x[c] = x0 + (h / 6) * (v0 + 2 * v2 + 2 * v3 + v4);
    v[c] = v0 + (h / 6) * (k1 + 2 * k2 + 2 * k3 + k4);
  };
  for (let i = 0; i < timeS.length; i++) {
    const to = timeS[i] as number;
    const steps = Math.max(1, Math.ceil((to - t) / STEP_S));
    const h = (to - t) / steps;
    for (let s = 0; s < steps; s++) {
      const at = t + s * h;
      force(at + h / 2, fm);
      force(at + h, f1);
      component(h, 0, f0.re, fm.re, f1.re);
      component(h, 1, f0.im, fm.im, f1.im);
      f0.re = f1.re;
      f0.im = f1.im;
    }
    t = to;
    outRe[i] = f0.re - damping * (v[0] as number) - stiff * (x[0] as number);
    outIm[i] = f0.im - damping * (v[1] as number) - stiff * (x[1] as number);
  }
  return { re: outRe, im: outIm };
}

/** Bounds with frequency, damping and sweep unknown, complex amplitude and offset free on each axis. */
export function coastdownBounds(
  model: CoastdownModel,
  timeS: Float64Array,
  settled: boolean,
  amplitude: number,
  phaseRad: number,
  variance: number,
): number[] {
  const { re, im } = coastdownResponse(model, timeS, settled);
  const linear = [new Float64Array(timeS.length).fill(1), re, im];
  const keys = ['frequencyHz', 'dampingRatio', 'start', 'rate', 'curve'] as const;
  const derivatives = keys.map((key) => {
    const h = Math.max(Math.abs(model[key]), 1e-3) * 1e-6;
    const up = coastdownResponse({ ...model, [key]: model[key] + h }, timeS, settled);
    const down = coastdownResponse({ ...model, [key]: model[key] - h }, timeS, settled);
    return [
      up.re.map(
        (_, i) =>
          (amplitude *
            (Math.cos(phaseRad) * ((up.re[i] as number) - (down.re[i] as number)) -
              Math.sin(phaseRad) * ((up.im[i] as number) - (down.im[i] as number)))) /
          (2 * h),
      ),
    ];
  });
  return signalBounds(derivatives, linear, variance);
}

export function coastdownCase(
  random: Random,
  seed: number,
  index: number,
  choice: Partial<CoastdownModel & { durationS: number }> = {},
): GeneratedCase {
  const name = `D_${String(index).padStart(4, '0')}`;
  const device = drawDevice(random, { fs: random.chance(0.75) ? 60 : 100 });
  const durationS = choice.durationS ?? random.pick([20, 30, 60, 60]);
  const frequencyHz = choice.frequencyHz ?? random.uniform(7, 14.5);
  const dampingRatio = choice.dampingRatio ?? random.logUniform(0.005, 0.035);
  const start = choice.start ?? frequencyHz * random.uniform(1.5, 1.9);
  const end = frequencyHz * random.uniform(0.32, 0.52);
  // curve·T/rate between a straight line and a strong run-down that still falls at the end
  const bend = random.uniform(0.005, 0.44);
  const rate = choice.rate ?? (start - end) / (durationS * (1 - bend));
  const curve = choice.curve ?? (bend * rate) / durationS;
  const model: CoastdownModel = { frequencyHz, dampingRatio, start, rate, curve };
  const settled = random.chance(0.5);
  const times = drawSampleTimes(random, device, durationS);
  const { re, im } = coastdownResponse(model, times.trueS, settled);
  const largest = re.reduce((most, v, i) => Math.max(most, Math.hypot(v, im[i] as number)), 0);
  const amplitude = (device.sigma * random.logUniform(6.5, 170)) / largest;
  const phaseRad = random.uniform(0, 2 * Math.PI);
  const motion = stillMotion(times.trueS.length);
  addAlong(
    motion,
    random.direction(),
    (k) => amplitude * (Math.cos(phaseRad) * (re[k] as number) - Math.sin(phaseRad) * (im[k] as number)),
  );
  const bounds = coastdownBounds(model, times.trueS, settled, amplitude, phaseRad, noiseVariance(device));
  return {
    name,
    truth: {
      kind: 'D',
      index,
      seed,
      device,
      modes: [
        {
          f_hz: frequencyHz,
          zeta: dampingRatio,
          crlb_f: bounds[0] as number,
          crlb_zeta: bounds[1] as number,
        },
      ],
      speed_hz: { start, rate, curve },
      t0_s: times.stampS[0] as number,
    },
    recording: deliver(random, device, times, motion, `${name}.csv`),
  };
}
