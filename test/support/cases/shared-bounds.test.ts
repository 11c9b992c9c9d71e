/** Our bounds against those delivered with the shared cases (skipped where those are absent). */
import { existsSync, readFileSync } from 'node:fs';
import { fileURLToPath } from 'node:url';
import { describe, expect, it } from 'vitest';
import { ambientBounds } from './ambient-case.ts';
import { coastdownBounds, coastdownResponse } from './coastdown-case.ts';
import { inverseMatrix } from './cramer-rao.ts';
import { noiseVariance } from './device.ts';
import { ringDown, tapBounds } from './tap-case.ts';
import type { DrawnMode } from './tap-case.ts';
import type { CaseTruth, ModeTruth } from './truth.ts';

const folder = fileURLToPath(new URL('../../../../shared/cases/', import.meta.url));
const present = existsSync(`${folder}A1_0000.json`);

function load(name: string): { truth: CaseTruth; timeS: Float64Array; axes: Float64Array[] } {
  const truth = JSON.parse(readFileSync(`${folder}${name}.json`, 'utf8')) as CaseTruth;
  const rows = readFileSync(`${folder}${name}.csv`, 'utf8').trim().split('\n').slice(1);
  const table = rows.map((row) => row.split(',').map(Number));
  const column = (i: number): Float64Array => Float64Array.from(table, (row) => row[i] as number);
  return { truth, timeS: column(0).map((t) => t + truth.t0_s), axes: [1, 2, 3].map(column) };
}

/** Least-squares coefficients [axis][column]. */
function coefficients(
  columns: Float64Array[],
  axes: Float64Array[],
  keep: (i: number) => boolean,
): number[][] {
  const dot = (a: Float64Array, b: Float64Array): number =>
    a.reduce((sum, v, i) => (keep(i) ? sum + v * (b[i] as number) : sum), 0);
  const inverse = inverseMatrix(columns.map((a) => columns.map((b) => dot(a, b))));
  return axes.map((axis) => {
    const right = columns.map((c) => dot(c, axis));
    return inverse.map((row) => row.reduce((sum, v, i) => sum + v * (right[i] as number), 0));
  });
}

function tapRatios(name: string): number[] {
  const { truth, timeS, axes } = load(name);
  const taps = truth.taps_s as number[];
  const truths = truth.modes as ModeTruth[];
  const shapes = truths.map((m) => ({ frequencyHz: m.f_hz, dampingRatio: m.zeta }));
  const columns = [timeS.map(() => 1)];
  for (const shape of shapes)
    for (const tap of taps)
      for (const p of [0, Math.PI / 2]) columns.push(timeS.map((t) => ringDown(shape, t - tap, p)));
  if (truth.tone_hz) {
    const w = 2 * Math.PI * truth.tone_hz;
    columns.push(
      timeS.map((t) => Math.cos(w * t)),
      timeS.map((t) => Math.sin(w * t)),
    );
  }
  const clear = (i: number): boolean =>
    taps.every((tap) => (timeS[i] as number) < tap - 0.002 || (timeS[i] as number) > tap + 0.05);
  const found = coefficients(columns, axes, clear);
  const modes: DrawnMode[] = shapes.map((shape, m) => {
    const at = (j: number): number => 1 + 2 * (m * taps.length + j);
    const strongest = taps.reduce(
      (best, _, j) =>
        Math.hypot(...found.map((c) => c[at(j)] as number)) >
        Math.hypot(...found.map((c) => c[at(best)] as number))
          ? j
          : best,
      0,
    );
    const raw = found.map((c) => c[at(strongest)] as number);
    const direction = raw.map((v) => v / Math.hypot(...raw));
    const along = (k: number): number =>
      found.reduce((sum, c, i) => sum + (c[k] as number) * (direction[i] as number), 0);
    return {
      ...shape,
      direction,
      amplitudes: taps.map((_, j) => Math.hypot(along(at(j)), along(at(j) + 1))),
      phases: taps.map((_, j) => Math.atan2(along(at(j) + 1), along(at(j)))),
    };
  });
  const bounds = tapBounds(modes, timeS, taps, truth.tone_hz, noiseVariance(truth.device));
  return truths.flatMap((m, i) => [
    (bounds[2 * i] as number) / (m.crlb_f as number),
    (bounds[2 * i + 1] as number) / (m.crlb_zeta as number),
  ]);
}

function coastdownRatios(name: string): number[] {
  const { truth, timeS, axes } = load(name);
  const mode = truth.modes?.[0] as ModeTruth;
  const sweep = truth.speed_hz as { start: number; rate: number; curve: number };
  const model = { frequencyHz: mode.f_hz, dampingRatio: mode.zeta, ...sweep };
  const { re, im } = coastdownResponse(model, timeS, true);
  const found = coefficients([timeS.map(() => 1), re, im], axes, () => true);
  const size = (k: number): number => Math.hypot(...found.map((c) => c[k] as number));
  const sign = Math.sign(found.reduce((sum, c) => sum + (c[1] as number) * (c[2] as number), 0));
  const bounds = coastdownBounds(
    model,
    timeS,
    true,
    Math.hypot(size(1), size(2)),
    Math.atan2(-sign * size(2), size(1)),
    noiseVariance(truth.device),
  );
  return [
    (bounds[0] as number) / (mode.crlb_f as number),
    (bounds[1] as number) / (mode.crlb_zeta as number),
  ];
}

function ambientRatios(name: string): number[] {
  const { truth, timeS } = load(name);
  const mode = truth.modes?.[0] as ModeTruth;
  const tail = ((mode.rms_mps2 as number) ** 2 * 4 * mode.zeta) / (Math.PI * mode.f_hz);
  const shape = { frequencyHz: mode.f_hz, dampingRatio: mode.zeta };
  const bounds = ambientBounds(
    shape,
    tail,
    noiseVariance(truth.device),
    truth.device.fs,
    timeS.at(-1) as number,
  );
  return [bounds.crlb_f / (mode.crlb_f as number), bounds.crlb_zeta / (mode.crlb_zeta as number)];
}

describe.skipIf(!present)('bounds of the generator against the delivered ones', () => {
  it.each(['A1_0000', 'A1_0003', 'A1_0009', 'A1F_0001', 'A2_0001', 'A2c_0003', 'A3_0000', 'A3_0008'])(
    '%s',
    (name) => {
      for (const ratio of tapRatios(name))
        expect(ratio).toSatisfy((r: number) => Math.abs(r - 1) < 0.15, `ratio ${ratio}`);
    },
  );
  it.each(['B_0000', 'B_0001', 'B_0002', 'B_0003', 'B_0004', 'B_0005', 'B_0007', 'B_0009', 'B_0011'])(
    '%s',
    (name) => {
      for (const ratio of ambientRatios(name))
        expect(ratio).toSatisfy((r: number) => Math.abs(r - 1) < 0.15, `ratio ${ratio}`);
    },
  );
  it.each(['D_0000', 'D_0002', 'D_0005', 'D_0008', 'D_0011'])('%s', (name) => {
    for (const ratio of coastdownRatios(name))
      expect(ratio).toSatisfy((r: number) => Math.abs(r - 1) < 0.15, `ratio ${ratio}`);
  });
});
