/** Kinds C, ALIAS, ALIASL, TWIN: steady machines, a resonance, both; tones above half the rate; two near tones. */
import { addAlong, deliver, drawDevice, drawSampleTimes, stillMotion } from './device.ts';
import type { SampleTimes } from './device.ts';
import { randomModeMotion } from './random-motion.ts';
import type { Random } from './random.ts';
import type { CaseKind, CaseTruth, GeneratedCase } from './truth.ts';

const DURATION_S = 60;
/** Tone over resonance in a mixture: the resonance has this share of the tone's rms. */
const MIXED_SHARE = 0.3;

type Truth = Omit<CaseTruth, 'kind' | 'index' | 'seed' | 'device' | 't0_s'>;

/** Slow wander of speed: one period over the record. */
function tonePhase(
  frequencyHz: number,
  driftRel: number,
  startRad: number,
  wanderRad: number,
): (t: number) => number {
  const w = (2 * Math.PI) / DURATION_S;
  return (t) =>
    2 * Math.PI * frequencyHz * (t - (driftRel / w) * (Math.cos(w * t + wanderRad) - Math.cos(wanderRad))) +
    startRad;
}

function steadyMachine(
  random: Random,
  motion: Float64Array[],
  times: SampleTimes,
  rateHz: number,
  sub: NonNullable<CaseTruth['sub']>,
): Truth {
  const toneHz = random.uniform(8, Math.min(0.45 * rateHz, 28));
  const resonanceHz = sub === 'res' ? random.logUniform(4, 20) : toneHz * random.uniform(0.97, 1.03);
  const dampingRatio = random.logUniform(0.003, 0.03);
  const amplitude = random.logUniform(0.1, 0.75);
  const driftRel = random.pick([0, 0.001, 0.01]);
  if (sub !== 'res') {
    const phase = tonePhase(toneHz, driftRel, random.uniform(0, 6.28), random.uniform(0, 6.28));
    const direction = random.direction();
    const orders = sub === 'tone_harm' ? [1, 0.3, 0.15] : [1];
    orders.forEach((share, i) => {
      if ((i + 1) * toneHz * 1.02 < rateHz / 2)
        addAlong(
          motion,
          direction,
          (k) => amplitude * share * Math.cos((i + 1) * phase(times.trueS[k] as number) + 0.7 * i),
        );
    });
    if (sub === 'tone_on_res')
      addResonance(
        random,
        motion,
        times,
        rateHz,
        { frequencyHz: resonanceHz, dampingRatio },
        (MIXED_SHARE * amplitude) / Math.SQRT2,
        direction,
      );
  } else {
    const rms = random.logUniform(0.05, 0.5);
    addResonance(
      random,
      motion,
      times,
      rateHz,
      { frequencyHz: resonanceHz, dampingRatio },
      rms,
      random.direction(),
    );
  }
  return {
    sub,
    ...(sub === 'res' ? {} : { tone_hz: toneHz, drift_rel: driftRel }),
    ...(sub === 'res' || sub === 'tone_on_res' ? { modes: [{ f_hz: resonanceHz, zeta: dampingRatio }] } : {}),
  };
}

function addResonance(
  random: Random,
  motion: Float64Array[],
  times: SampleTimes,
  rateHz: number,
  mode: { frequencyHz: number; dampingRatio: number },
  rmsMps2: number,
  direction: number[],
): void {
  const source = randomModeMotion(random, mode, rmsMps2, rateHz, DURATION_S);
  addAlong(motion, direction, (k) => source.at(times.trueS[k] as number));
}

function foldedTone(
  random: Random,
  motion: Float64Array[],
  times: SampleTimes,
  device: CaseTruth['device'],
): Truth {
  const rateHz = device.fs * (1 + device.rate_err);
  const toneHz = random.chance(0.4) ? random.uniform(4, 28) : random.uniform(32, 56);
  const snrDb = random.uniform(5, 20);
  const amplitude = device.sigma * Math.SQRT2 * 10 ** (snrDb / 20);
  const phase = random.uniform(0, 2 * Math.PI);
  addAlong(
    motion,
    random.direction(),
    (k) => amplitude * Math.cos(2 * Math.PI * toneHz * (times.trueS[k] as number) + phase),
  );
  return {
    tone_hz: toneHz,
    snr_db: snrDb,
    apparent_hz: Math.abs(toneHz - rateHz * Math.round(toneHz / rateHz)),
  };
}

function twinTones(random: Random, motion: Float64Array[], times: SampleTimes): Truth {
  const first = random.uniform(6, 24);
  const tones = [first, first + random.uniform(0.1, 0.5)];
  const amplitude = random.uniform(0.2, 0.75);
  tones.forEach((toneHz, i) => {
    const share = i ? random.uniform(0.6, 1) : 1;
    const phase = random.uniform(0, 2 * Math.PI);
    addAlong(
      motion,
      random.direction(),
      (k) => amplitude * share * Math.cos(2 * Math.PI * toneHz * (times.trueS[k] as number) + phase),
    );
  });
  return { tones_hz: tones };
}

export function runningCase(random: Random, kind: CaseKind, seed: number, index: number): GeneratedCase {
  const name = `${kind}_${String(index).padStart(4, '0')}`;
  const device = drawDevice(random, {
    ...(kind === 'ALIAS' ? { fs: 60 } : {}),
    ...(kind === 'ALIASL' ? { fs: 60, jit: 0, stamp_sd: random.uniform(1e-3, 3e-3) } : {}),
    ...(kind === 'TWIN' && random.chance(0.9) ? { fs: 60 } : {}),
    ...(kind === 'C' ? { fs: random.pick([60, 100]), stamp_sd: random.chance(0.2) ? 1e-3 : 0 } : {}),
    steps: kind === 'C' ? [0, 0.01, 0.1] : [0, 0.01],
  });
  const times = drawSampleTimes(random, device, DURATION_S);
  const motion = stillMotion(times.trueS.length);
  const subs = ['tone', 'tone_on_res', 'res', 'tone_harm'] as const;
  const truth =
    kind === 'C'
      ? steadyMachine(random, motion, times, device.fs, subs[index % 4] as (typeof subs)[number])
      : kind === 'TWIN'
        ? twinTones(random, motion, times)
        : foldedTone(random, motion, times, device);
  return {
    name,
    truth: { kind, index, seed, device, ...truth, t0_s: times.stampS[0] as number },
    recording: deliver(random, device, times, motion, `${name}.csv`),
  };
}
