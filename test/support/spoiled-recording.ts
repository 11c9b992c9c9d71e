import type { Recording } from '../../src/core/model/recording.ts';
import type { Random } from './cases/random.ts';

/** One fault of measured files: stamps and axes may be changed in place or replaced. */
interface Rows {
  timeS: Float64Array;
  accelerationMps2: Float32Array[];
}
type Fault = (rows: Rows, random: Random) => Rows;

const onAxes = (rows: Rows, change: (value: number, i: number, axis: number) => number): Rows => ({
  ...rows,
  accelerationMps2: rows.accelerationMps2.map((axis, a) => axis.map((v, i) => change(v, i, a))),
});

const keepRows = (rows: Rows, keep: (i: number) => boolean): Rows => ({
  timeS: rows.timeS.filter((_, i) => keep(i)),
  accelerationMps2: rows.accelerationMps2.map((axis) => axis.filter((_, i) => keep(i))),
});

/** Faults of measured files, each by its name. */
export const FAULTS: Readonly<Record<string, Fault>> = {
  'DC step': (rows, random) => {
    const at = random.uniform(0.1, 0.9) * rows.timeS.length;
    const jump = random.uniform(-5, 5);
    return onAxes(rows, (v, i, a) => (i > at && a === 0 ? v + jump : v));
  },
  'one-sided clipping': (rows, random) => {
    const rail = (rows.accelerationMps2[0]?.[0] ?? 0) + random.uniform(0.05, 0.5);
    return onAxes(rows, (v, _, a) => (a === 0 ? Math.min(v, rail) : v));
  },
  'full scale 16 g': (rows, random) => {
    const gain = random.uniform(10, 400);
    return onAxes(rows, (v) => Math.max(-156.9, Math.min(156.9, gain * v)));
  },
  dropouts: (rows, random) => {
    const gaps = Array.from({ length: 3 }, () => [
      random.uniform(0, rows.timeS.at(-1) ?? 0),
      random.uniform(0.5, 2),
    ]);
    return keepRows(rows, (i) => gaps.every(([at, length]) => Math.abs(rows.timeS[i]! - at!) > length! / 2));
  },
  'leading zero rows': (rows, random) => {
    const count = random.integer(1, 40);
    return onAxes(rows, (v, i) => (i < count ? 0 : v));
  },
  'epoch stamps': (rows) => ({ ...rows, timeS: rows.timeS.map((t) => 1_764_600_000.123 + t) }),
  'stamps of whole milliseconds': (rows) => ({
    ...rows,
    timeS: rows.timeS.map((t) => Math.round(t * 1000) / 1000),
  }),
  'late bursts': (rows, random) => {
    let heldS = -Infinity;
    return {
      ...rows,
      timeS: rows.timeS.map((t) => {
        if (random.chance(0.01)) heldS = t + random.uniform(0.05, 0.4);
        return Math.max(t, heldS);
      }),
    };
  },
  'a constant axis': (rows) => onAxes(rows, (v, _, a) => (a === 1 ? 0.25 : v)),
  'all constant': (rows) => onAxes(rows, (_, __, a) => [0, 0, 9.8][a]!),
  'no gravity': (rows) => {
    const means = rows.accelerationMps2.map(
      (axis) => axis.reduce((s, v) => s + v, 0) / Math.max(1, axis.length),
    );
    return onAxes(rows, (v, _, a) => v - means[a]!);
  },
  'one axis': (rows) => ({ ...rows, accelerationMps2: rows.accelerationMps2.slice(2) }),
  'two axes': (rows) => ({ ...rows, accelerationMps2: rows.accelerationMps2.slice(1) }),
  'values that are not finite': (rows, random) =>
    onAxes(rows, (v) => (random.chance(0.01) ? random.pick([Number.NaN, Infinity]) : v)),
  'coarse rounding': (rows, random) => {
    const step = random.pick([0.1, 0.5, 2]);
    return onAxes(rows, (v) => step * Math.round(v / step));
  },
  'spikes of a loose phone': (rows, random) =>
    onAxes(rows, (v) => (random.chance(0.003) ? v + random.uniform(-80, 80) : v)),
  'faint: a ten-thousandth': (rows) => onAxes(rows, (v) => v * 1e-4),
  'cut to 2 s': (rows) => keepRows(rows, (i) => rows.timeS[i]! < 2),
  'a few samples': (rows, random) => {
    const most = random.integer(0, 70);
    return keepRows(rows, (i) => i < most);
  },
  '25 Hz file': (rows) => keepRows(rows, (i) => i % 3 === 0),
  'fast file (stamps pressed together)': (rows, random) => {
    const factor = random.pick([5, 10, 17]);
    return { ...rows, timeS: rows.timeS.map((t) => t / factor) };
  },
  'wildly irregular stamps': (rows, random) => ({
    ...rows,
    timeS: rows.timeS.map((t) => t + random.uniform(-0.05, 0.05)).sort(),
  }),
  'every row twice': (rows) => ({
    timeS: Float64Array.from({ length: 2 * rows.timeS.length }, (_, i) => rows.timeS[i >> 1]!),
    accelerationMps2: rows.accelerationMps2.map((axis) =>
      Float32Array.from({ length: 2 * axis.length }, (_, i) => axis[i >> 1]!),
    ),
  }),
};

/** The recording with the named faults done to it one after the other. */
export function spoiledRecording(recording: Recording, faults: readonly string[], random: Random): Recording {
  let rows: Rows = { timeS: recording.timeS, accelerationMps2: [...recording.accelerationMps2] };
  for (const name of faults) rows = FAULTS[name]!(rows, random);
  return {
    ...recording,
    ...rows,
    axes: recording.axes.slice(recording.axes.length - rows.accelerationMps2.length),
  };
}

/** Where in a value a number is not finite: a path such as `analysis.modes.0.frequencyHz`; undefined where all are. */
export function notFinite(value: unknown, path = ''): string | undefined {
  if (typeof value === 'number') return Number.isFinite(value) ? undefined : path;
  if (typeof value !== 'object' || value === null) return undefined;
  for (const [key, inner] of Object.entries(value)) {
    const found = notFinite(inner, `${path}.${key}`);
    if (found !== undefined) return found;
  }
  return undefined;
}
