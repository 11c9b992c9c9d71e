import { describe, it, expect } from 'vitest';
import fc from 'fast-check';
import { Oscillator } from '../../src/capture/oscillator.ts';
import { PracticeRig, type RigSample } from '../../src/capture/practice-rig.ts';
import { parseRigParameters, RIG_PARAMETERS, RIG_PRESETS } from '../../src/capture/rig-parameters.ts';
import { seededChance } from '../../src/capture/seeded-chance.ts';

function samplesOf(query: string, durationS: number, actAtS = 0): readonly RigSample[] {
  const parameters = parseRigParameters(query);
  const rig = new PracticeRig(parameters);
  const samples: RigSample[] = [];
  let hasActed = false;
  for (let i = 0; i < durationS * parameters.rateHz; i += 1) {
    if (!hasActed && i / parameters.rateHz >= actAtS) {
      rig.act();
      hasActed = true;
    }
    const sample = rig.next();
    if (sample !== undefined) samples.push(sample);
  }
  return samples;
}
const QUIET = 'noise=0&ambient=0&jitter=0&handling=0&tilt=0&contact=0';

describe('Oscillator', () => {
  it('decays by its logarithmic decrement per period (Thomson & Dahleh, eq. 2.7-3: 2 pi zeta / sqrt(1 - zeta²))', () => {
    const zeta = 0.02;
    const oscillator = new Oscillator(5, zeta);
    oscillator.strike(0.1);
    const periodS = 1 / (5 * Math.sqrt(1 - zeta ** 2));
    const first = oscillator.restoring(0.03);
    oscillator.advance(periodS, 0);
    expect(Math.log(first / oscillator.restoring(0.03))).toBeCloseTo(
      (2 * Math.PI * zeta) / Math.sqrt(1 - zeta ** 2),
      10,
    );
  });

  it('comes to rest where a constant force meets the spring', () => {
    const oscillator = new Oscillator(5, 0.3);
    for (let i = 0; i < 2000; i += 1) oscillator.advance(0.01, 2);
    expect(oscillator.restoring(0)).toBeCloseTo(-2, 10);
  });

  it('is the same in one step or in many (property)', () => {
    fc.assert(
      fc.property(
        fc.double({ min: 0.2, max: 30, noNaN: true }),
        fc.double({ min: 0.001, max: 0.4, noNaN: true }),
        fc.integer({ min: 1, max: 50 }),
        (f, zeta, count) => {
          const [once, often] = [new Oscillator(f, zeta), new Oscillator(f, zeta)];
          for (const one of [once, often]) one.strike(1);
          once.advance(0.1, 0.5);
          for (let i = 0; i < count; i += 1) often.advance(0.1 / count, 0.5);
          const scale = 1 + Math.abs(once.restoring(0));
          expect(Math.abs(often.restoring(0) - once.restoring(0)) / scale).toBeLessThan(1e-9);
        },
      ),
    );
  });

  it('amplifies a steady force at resonance 1/(2 zeta) times (textbook)', () => {
    const zeta = 0.05;
    const oscillator = new Oscillator(5, zeta);
    const stepS = 1 / 5000;
    let most = 0;
    for (let i = 0; i < 100_000; i += 1) {
      oscillator.advance(stepS, Math.sin(2 * Math.PI * 5 * i * stepS));
      if (i > 80_000) most = Math.max(most, Math.abs(oscillator.restoring(0)));
    }
    // Restoring = stiffness and damper together: 1/(2 zeta) sqrt(1 + (2 zeta)²).
    expect(most / (Math.sqrt(1 + (2 * zeta) ** 2) / (2 * zeta))).toBeCloseTo(1, 2);
  });
});

describe('PracticeRig', () => {
  it('gives the same samples for the same seed, and others for another', () => {
    const query = '?rig=handrail&gaps=20&late=2';
    expect(samplesOf(query, 20)).toEqual(samplesOf(query, 20));
    expect(samplesOf(`${query}&seed=2`, 20)).not.toEqual(samplesOf(query, 20));
  });

  it('rings at the frequency and damping it was told, from the taps it was told', () => {
    const samples = samplesOf(`f=7.4&damping=1.2&taps=1&${QUIET}`, 8);
    const z = samples.map((sample) => sample.z - 9.81);
    const from = z.findIndex((value) => Math.abs(value) > 0.1);
    expect(samples[from]!.stampS).toBeCloseTo(1.5, 1);
    const fitted = decayOf(z.slice(from), 60);
    expect(fitted.frequencyHz).toBeCloseTo(7.4 * Math.sqrt(1 - 0.012 ** 2), 3);
    expect(fitted.dampingRatio).toBeCloseTo(0.012, 4);
  });

  it('gives a contact the impulse of the blow, and a jolt that the sensor may see', () => {
    const levelAfter = (contact: number) => {
      const samples = samplesOf(`f=2&damping=1&taps=1&rate=400&contact=${contact}&${QUIET}`, 4);
      return Math.max(...samples.filter(({ stampS }) => stampS > 1.6).map(({ z }) => Math.abs(z - 9.81)));
    };
    expect(levelAfter(10) / levelAfter(0)).toBeCloseTo(1, 2);
    const jolt = samplesOf(`f=2&damping=1&taps=1&rate=400&contact=10&${QUIET}`, 1.6).map(({ z }) => z - 9.81);
    expect(Math.max(...jolt)).toBeGreaterThan(3 * levelAfter(0));
  });

  it('rounds, clips, scatters, loses and delays as told', () => {
    const stepped = samplesOf('step=0.1&strength=20&range=2&taps=5', 25);
    for (const { z } of stepped) expect(Math.abs(z * 10 - Math.round(z * 10))).toBeLessThan(1e-9);
    expect(Math.max(...stepped.map(({ z }) => z))).toBeLessThanOrEqual(19.7);
    const steady = intervals(samplesOf('jitter=0', 10));
    expect(spread(steady)).toBeLessThan(1e-4);
    expect(spread(intervals(samplesOf('jitter=2', 60)))).toBeCloseTo(0.002 * Math.SQRT2, 3);
    expect(Math.max(...intervals(samplesOf('gaps=10', 60)))).toBeGreaterThan(0.25);
    const late = samplesOf('late=5&jitter=0', 60).map(({ stampS }, i) => stampS - i / 60);
    expect(late.reduce((sum, value) => sum + value, 0) / late.length).toBeCloseTo(0.005, 3);
  });

  it('has stamps that increase, and finite values, for any parameters (property)', () => {
    const queries = fc
      .tuple(
        ...RIG_PARAMETERS.map(({ key }) =>
          fc
            .oneof(fc.double().map(String), fc.string({ maxLength: 6 }), fc.constant(''))
            .map((value) => [key, value] as const),
        ),
      )
      .map((pairs) =>
        new URLSearchParams(pairs.filter(([, value]) => value !== '').map((pair) => [...pair])).toString(),
      );
    fc.assert(
      fc.property(queries, (query) => {
        const samples = samplesOf(`${query}&rate=20`, 3);
        samples.forEach((sample, i) => {
          expect([sample.x, sample.y, sample.z].every(Number.isFinite)).toBe(true);
          if (i > 0) expect(sample.stampS).toBeGreaterThan(samples[i - 1]!.stampS);
        });
      }),
      { numRuns: 40 },
    );
  });

  it('lets a machine run down from the time it is switched off', () => {
    const samples = samplesOf(`rig=fan&coast=10&${QUIET}`, 30);
    const rms = (fromS: number, toS: number) =>
      spread(samples.filter(({ stampS }) => stampS >= fromS && stampS < toS).map(({ z }) => z));
    expect(rms(0, 4)).toBeGreaterThan(0.2);
    expect(rms(20, 30)).toBeLessThan(0.01);
  });

  it('gives the ambient level it was told', () => {
    const samples = samplesOf('f=3&damping=2&taps=0&ambient=0.1&noise=0&handling=0&tilt=0', 600);
    // The mode moves along (0.36, 0.1, 0.93); 600 s of a 2 % mode at 3 Hz: 75 independent stretches, 10 %.
    expect(spread(samples.map(({ z }) => z))).toBeGreaterThan(0.093 * 0.75);
    expect(spread(samples.map(({ z }) => z))).toBeLessThan(0.093 * 1.25);
  });
});

describe('parseRigParameters', () => {
  it('starts from the preset, takes what is given, moves it into bounds', () => {
    expect(parseRigParameters('?rig=footbridge').modes).toHaveLength(2);
    const { modes, rateHz, tapCount } = parseRigParameters('?f=5,6&damping=2&rate=10000&taps=3');
    expect(modes).toEqual([
      { frequencyHz: 5, dampingRatio: 0.02 },
      { frequencyHz: 6, dampingRatio: 0.02 },
    ]);
    expect(rateHz).toBe(400);
    expect(tapCount).toBe(3);
    expect(parseRigParameters('?rig=__proto__')).toEqual(parseRigParameters('?rig=handrail'));
  });

  it('names every parameter that presets use', () => {
    const keys = new Set<string>(RIG_PARAMETERS.map(({ key }) => key));
    for (const preset of Object.values(RIG_PRESETS)) {
      for (const key of Object.keys(preset)) expect(keys.has(key)).toBe(true);
    }
  });
});

describe('seededChance', () => {
  it('is uniform, normal and exponential to a percent', () => {
    const chance = seededChance(3);
    const count = 100_000;
    const draw = (next: () => number) => Array.from({ length: count }, next);
    const mean = (values: readonly number[]) => values.reduce((sum, value) => sum + value / count, 0);
    expect(mean(draw(() => chance.uniform()))).toBeCloseTo(0.5, 2);
    const normal = draw(() => chance.normal());
    expect(mean(normal)).toBeCloseTo(0, 1);
    expect(spread(normal)).toBeCloseTo(1, 1);
    expect(mean(draw(() => chance.exponential()))).toBeCloseTo(1, 1);
  });
});

const intervals = (samples: readonly RigSample[]) =>
  samples.slice(1).map(({ stampS }, i) => stampS - samples[i]!.stampS);

function spread(values: readonly number[]): number {
  const mean = values.reduce((sum, value) => sum + value / values.length, 0);
  return Math.sqrt(values.reduce((sum, value) => sum + (value - mean) ** 2 / values.length, 0));
}

/** Two-term linear prediction of a clean decay: x[n+1] = a x[n] + b x[n-1] (Prony 1795). */
function decayOf(x: readonly number[], rateHz: number) {
  let [s11, s12, s22, t1, t2] = [0, 0, 0, 0, 0];
  for (let i = 2; i < x.length - 1; i += 1) {
    const [p, q, y] = [x[i]!, x[i - 1]!, x[i + 1]!];
    s11 += p * p;
    s12 += p * q;
    s22 += q * q;
    t1 += p * y;
    t2 += q * y;
  }
  const determinant = s11 * s22 - s12 * s12;
  const a = (t1 * s22 - t2 * s12) / determinant;
  const b = (t2 * s11 - t1 * s12) / determinant;
  const radius = Math.sqrt(-b);
  const omegaD = Math.acos(a / (2 * radius)) * rateHz;
  const decay = -Math.log(radius) * rateHz;
  return { frequencyHz: omegaD / (2 * Math.PI), dampingRatio: decay / Math.hypot(decay, omegaD) };
}
