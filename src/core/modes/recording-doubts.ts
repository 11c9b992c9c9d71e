import type { Mode, Tone } from '../model/analysis.ts';
import type { Doubt } from '../model/doubt.ts';
import type { ConditionedSignal } from '../signal/condition-recording.ts';
import { median } from '../signal/sample-counter.ts';
import { verticalShare } from './direction.ts';

/** Stamps later than this (standard deviation, s) with less than half of it true are called late. */
export const LATE_STAMPS_S = 5e-4;
/** Lost or repeated samples beyond this share, or one loss this long, are worth a word. */
export const GAP_SHARE = 0.005;
export const LONG_GAP_S = 0.25;
export const REPEAT_SHARE = 0.01;
/** A gap this long means the phone was busy. */
export const STALL_S = 0.5;
/** Noise below this share of the step does not dither it (our study, section 8: harmless above 0.3 step). */
export const DITHER_SHARE = 0.3;
/** A coarse step matters for motion weaker than this many steps (rms). */
export const COARSE_STEPS = 5;
/** Lasting change of the slow part (gravity in sensor axes), m/s²: about 2 degrees of tilt. */
export const MOVED_MPS2 = 0.35;
/** At rest phones read 9.2 to 10.2; gravity on Earth is 9.76 to 9.83. */
export const GRAVITY_MPS2 = 9.80665;
export const GRAVITY_TOLERANCE_RATIO = 0.03;
/** Total acceleration below this, twice in a row: nothing holds the phone (free flight). */
export const FREE_FLIGHT_MPS2 = 2;
/** Slow horizontal motion below this is not told from tilt. Common practice, no source. */
export const TILT_LEAK_HZ = 1;
/** Rocking: this many there-and-back changes of tilt between two rest positions, m/s² apart at least. */
export const ROCKING_TURNS = 2;
export const ROCKING_MPS2 = 0.08;
const ROCKING_BLOCK_S = 0.5;

/** Doubts that come from the recording itself, each at most once. Doubts of single modes stay with the modes. */
export function recordingDoubts(
  signal: ConditionedSignal,
  modes: readonly Mode[],
  tones: readonly Tone[],
): Doubt[] {
  return [
    ...timingDoubts(signal),
    ...sensorDoubts(signal),
    ...phoneDoubts(signal),
    ...toneDoubts(signal, tones),
    ...tiltDoubts(signal, modes, tones),
  ];
}

function timingDoubts(signal: ConditionedSignal): Doubt[] {
  const { facts, sensor } = signal;
  const { timing, sampleCount } = facts;
  const doubts: Doubt[] = [];
  if (timing.trueShare < 0.5 && timing.scatterSdS > LATE_STAMPS_S)
    doubts.push({ code: 'late-stamps', facts: { scatterSdS: timing.scatterSdS } });
  const longestS = longestGapS(signal);
  if (signal.lostCount > GAP_SHARE * sampleCount || longestS > LONG_GAP_S)
    doubts.push({ code: 'gaps', facts: { gapCount: timing.gapCount, longestS } });
  if (timing.repeatCount > REPEAT_SHARE * sampleCount)
    doubts.push({ code: 'repeats', facts: { repeatCount: timing.repeatCount } });
  if (sensor.interruption === 'main-thread-stall' || longestS > STALL_S)
    doubts.push({ code: 'stalled', facts: { longestS } });
  if (sensor.interruption !== undefined && sensor.interruption !== 'main-thread-stall')
    doubts.push({ code: 'interrupted', facts: { reason: sensor.interruption } });
  if (sensor.practice) doubts.push({ code: 'practice' });
  return doubts;
}

function longestGapS(signal: ConditionedSignal): number {
  return signal.segments
    .slice(1)
    .reduce((longest, [first]) => Math.max(longest, signal.timeS[first]! - signal.timeS[first - 1]!), 0);
}

function sensorDoubts(signal: ConditionedSignal): Doubt[] {
  const { facts, accelerationMps2 } = signal;
  const doubts: Doubt[] = [];
  if (facts.clippedCount > 0) doubts.push({ code: 'clipped', facts: { clippedCount: facts.clippedCount } });
  const strengths = accelerationMps2.map((axis) =>
    Math.sqrt(axis.reduce((s, v) => s + v * v, 0) / axis.length),
  );
  const strongest = strengths.indexOf(Math.max(...strengths));
  const step = facts.stepMps2[strongest]!;
  // The floor holds the rounding's own step²/12; what dithers is the rest.
  const floor = facts.noiseMps2PerRootHz[strongest]! * Math.sqrt(facts.rateHz / 2);
  const dither = Math.sqrt(Math.max(0, floor * floor - (step * step) / 12));
  if (step > 0 && dither < DITHER_SHARE * step && strengths[strongest]! < COARSE_STEPS * step)
    doubts.push({ code: 'coarse-step', facts: { stepMps2: step } });
  const gravity = facts.gravityMps2;
  if (gravity !== undefined && Math.abs(gravity / GRAVITY_MPS2 - 1) > GRAVITY_TOLERANCE_RATIO)
    doubts.push({ code: 'gravity-scale', facts: { gravityMps2: gravity } });
  return doubts;
}

function phoneDoubts(signal: ConditionedSignal): Doubt[] {
  if (signal.facts.up === undefined) return [];
  const doubts: Doubt[] = [];
  const movedMps2 = largestShift(signal.slowMps2);
  if (movedMps2 > MOVED_MPS2) doubts.push({ code: 'phone-moved', facts: { movedMps2 } });
  if (flightCount(signal) > 0)
    doubts.push({ code: 'contact-loss', facts: { sampleCount: flightCount(signal) } });
  const turns = rockingTurns(signal);
  if (turns >= ROCKING_TURNS && movedMps2 <= MOVED_MPS2)
    doubts.push({ code: 'rocking', facts: { turnCount: turns } });
  return doubts;
}

/** Largest distance of the slow part from its median, m/s². */
function largestShift(slow: readonly Float64Array[]): number {
  const n = slow[0]!.length;
  const stride = Math.max(1, Math.floor(n / 500));
  const centre = slow.map((axis) => median(axis.filter((_, i) => i % stride === 0)));
  let largest = 0;
  for (let i = 0; i < n; i += stride)
    largest = Math.max(largest, Math.hypot(...slow.map((axis, a) => axis[i]! - centre[a]!)));
  return largest;
}

/** Samples in free flight, counted where at least two follow each other. */
function flightCount(signal: ConditionedSignal): number {
  const { accelerationMps2, slowMps2 } = signal;
  let count = 0;
  let run = 0;
  for (let i = 0; i < accelerationMps2[0]!.length; i++) {
    const total = Math.hypot(...accelerationMps2.map((axis, a) => axis[i]! + slowMps2[a]![i]!));
    run = total < FREE_FLIGHT_MPS2 ? run + 1 : 0;
    if (run >= 2) count += run === 2 ? 2 : 1;
  }
  return count;
}

/** There-and-back changes between two rest positions: a phone on three points settles on either side. */
function rockingTurns(signal: ConditionedSignal): number {
  const { accelerationMps2, slowMps2, periodS } = signal;
  const width = Math.max(4, Math.round(ROCKING_BLOCK_S / periodS));
  const blocks = Math.floor(accelerationMps2[0]!.length / width);
  const levels = Array.from({ length: blocks }, (_, b) =>
    accelerationMps2.map((axis, a) => {
      const block = axis.subarray(b * width, (b + 1) * width);
      return median(block.map((v, i) => v + slowMps2[a]![b * width + i]!));
    }),
  );
  const distance = (p: readonly number[], q: readonly number[]): number =>
    Math.hypot(...p.map((v, a) => v - q[a]!));
  // Rest positions: a level that two blocks in a row share.
  const rests = levels.filter((level, b) => b > 0 && distance(level, levels[b - 1]!) < ROCKING_MPS2 / 4);
  if (rests.length < levels.length / 2) return 0;
  let turns = 0;
  let home = rests[0]!;
  let away: readonly number[] | undefined;
  for (const rest of rests) {
    if (distance(rest, home) < ROCKING_MPS2 / 2) {
      if (away) turns++;
      away = undefined;
    } else if (distance(rest, home) > ROCKING_MPS2) away = rest;
    else home = rest;
  }
  return turns;
}

function toneDoubts(signal: ConditionedSignal, tones: readonly Tone[]): Doubt[] {
  const doubts: Doubt[] = [];
  const folded = tones.find((tone) => tone.fold.verdict === 'folded');
  const undecided = tones.find((tone) => tone.fold.verdict === 'undecided');
  const edge = tones.find((tone) => tone.frequencyHz > signal.facts.usableBandHz[1]);
  if (folded)
    doubts.push({
      code: 'folded',
      facts: { frequencyHz: folded.frequencyHz, trueHz: folded.fold.candidatesHz[0]! },
    });
  if (undecided) doubts.push({ code: 'fold-undecided', facts: { frequencyHz: undecided.frequencyHz } });
  if (edge) doubts.push({ code: 'band-edge', facts: { frequencyHz: edge.frequencyHz } });
  return doubts;
}

function tiltDoubts(signal: ConditionedSignal, modes: readonly Mode[], tones: readonly Tone[]): Doubt[] {
  const slow = [...modes, ...tones].find(
    (item) => item.frequencyHz < TILT_LEAK_HZ && (verticalShare(item.direction, signal.facts.up) ?? 0) < 0.5,
  );
  return slow ? [{ code: 'tilt-leak', facts: { frequencyHz: slow.frequencyHz } }] : [];
}
