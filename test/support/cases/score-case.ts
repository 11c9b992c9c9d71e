/** Scores analyses against truth: the definitions of the shared scorer, on analyses in memory. */
import type { Analysis, Fold, Mode, Tone } from '../../../src/core/model/analysis.ts';
import type { CaseTruth, ModeTruth } from './truth.ts';

export type Answer = Pick<Analysis, 'modes' | 'tones'> | { readonly problem: string };

/** A mode counts as found within this of the true frequency... */
const FOUND_WITHIN = 0.03;
/** ...and with a damping ratio within a factor of two. */
const DAMPING_LOG_WITHIN = 0.7;

export interface ModeScore {
  readonly name: string;
  readonly truth: CaseTruth;
  readonly mode: ModeTruth;
  /** The mode taken for it; absent where it failed. */
  readonly found?: Mode;
  readonly failure?: string;
}

export interface RecordScore {
  readonly name: string;
  readonly truth: CaseTruth;
  readonly modes: readonly ModeScore[];
  readonly spuriousCount: number;
  /** Kinds C and TWIN. */
  readonly right?: boolean;
  /** Kinds ALIAS, ALIASL, A1F. */
  readonly fold?: 'right' | 'wrong' | 'undecided' | 'none';
  readonly answered: string;
}

const near = (a: number, b: number, ratio: number): boolean => Math.abs(a / b - 1) <= ratio;

const describeModes = (answer: Answer): string =>
  'problem' in answer
    ? answer.problem
    : `${answer.modes.map((m) => `${m.frequencyHz.toFixed(2)} Hz ${(100 * m.dampingRatio).toFixed(2)} %`).join(', ') || 'no mode'}; tones ${answer.tones.map((t) => `${t.frequencyHz.toFixed(2)} ${t.nature} ${t.fold.verdict}`).join(', ') || 'none'}`;

export function scoreRecord(name: string, truth: CaseTruth, answer: Answer): RecordScore {
  const modes = 'problem' in answer ? [] : answer.modes;
  const tones = 'problem' in answer ? [] : answer.tones;
  const free = [...modes];
  const scored = (truth.modes ?? []).filter((m) => m.crlb_f !== undefined && truth.kind !== 'A1F');
  const modeScores = scored.map((mode): ModeScore => {
    free.sort((a, b) => Math.abs(a.frequencyHz - mode.f_hz) - Math.abs(b.frequencyHz - mode.f_hz));
    const best = free[0];
    const found =
      best &&
      near(best.frequencyHz, mode.f_hz, FOUND_WITHIN) &&
      best.dampingRatio > 0 &&
      Math.abs(Math.log(best.dampingRatio / mode.zeta)) <= DAMPING_LOG_WITHIN;
    if (!found) return { name, truth, mode, failure: describeModes(answer) };
    free.shift();
    return { name, truth, mode, found: best };
  });
  const right = rightness(truth, modes, tones);
  const fold = foldness(truth, modes, tones);
  return {
    name,
    truth,
    modes: modeScores,
    spuriousCount: scored.length ? free.length : 0,
    answered: describeModes(answer),
    ...(right === undefined ? {} : { right }),
    ...(fold === undefined ? {} : { fold }),
  };
}

function rightness(truth: CaseTruth, modes: readonly Mode[], tones: readonly Tone[]): boolean | undefined {
  const modeNear = (hz: number, ratio: number): boolean => modes.some((m) => near(m.frequencyHz, hz, ratio));
  if (truth.kind === 'TWIN') {
    const [first, ...rest] = truth.tones_hz as [number, ...number[]];
    const told = [first, ...rest].every((hz) => tones.some((t) => Math.abs(t.frequencyHz - hz) < 0.04));
    return told && !modeNear(first, 0.08);
  }
  if (truth.kind !== 'C') return undefined;
  const resonanceHz = truth.modes?.[0]?.f_hz ?? 0;
  const toneHz = truth.tone_hz ?? 0;
  const toneNear = tones.some((t) => near(t.frequencyHz, toneHz, 0.02));
  if (truth.sub === 'res')
    return modeNear(resonanceHz, 0.03) && !tones.some((t) => near(t.frequencyHz, resonanceHz, 0.03));
  if (truth.sub === 'tone_on_res')
    return (
      toneNear &&
      (tones.some((t) => near(t.frequencyHz, toneHz, 0.02) && t.nature === 'mixed') ||
        modeNear(resonanceHz, 0.03))
    );
  return toneNear && !modeNear(toneHz, 0.1);
}

function foldness(truth: CaseTruth, modes: readonly Mode[], tones: readonly Tone[]): RecordScore['fold'] {
  if (truth.kind === 'A1F') return foldOf(modes[0], truth.modes?.[0]?.f_hz as number);
  if (truth.kind === 'ALIAS' || truth.kind === 'ALIASL') return foldOf(tones[0], truth.tone_hz as number);
  return undefined;
}

function foldOf(
  item: { readonly frequencyHz: number; readonly fold: Fold } | undefined,
  trueHz: number,
): NonNullable<RecordScore['fold']> {
  if (!item) return 'none';
  if (item.fold.verdict === 'undecided') return 'undecided';
  const said = item.fold.verdict === 'direct' ? item.frequencyHz : (item.fold.candidatesHz[0] ?? NaN);
  return Math.abs(said - trueHz) < 0.02 * trueHz ? 'right' : 'wrong';
}

const rms = (v: readonly number[]): number => Math.sqrt(v.reduce((s, x) => s + x * x, 0) / v.length);
const quantile = (v: readonly number[], q: number): number => {
  const sorted = v.map(Math.abs).sort((a, b) => a - b);
  return sorted[Math.min(sorted.length - 1, Math.floor(q * sorted.length))] ?? NaN;
};
const share = (v: readonly boolean[]): number => v.filter(Boolean).length / v.length;

export type Row = Record<string, number>;

/** One row per kind and stratum: failure share, ratios to the bound, coverage of 95 % intervals, pulls. */
export function scoreTable(records: readonly RecordScore[]): Record<string, Row> {
  const rows: Record<string, Row> = {};
  for (const kind of new Set(records.map((r) => r.truth.kind))) {
    const own = records.filter((r) => r.truth.kind === kind);
    const cvLimit = kind === 'B' ? 0.3 : 0.1;
    const strata: [string, (s: ModeScore) => boolean][] = [
      [
        `step<0.1, cv<${100 * cvLimit}%`,
        (s) => s.truth.device.q < 0.1 && (s.mode.crlb_zeta as number) / s.mode.zeta < cvLimit,
      ],
      ['step<0.1, all', (s) => s.truth.device.q < 0.1],
      ['step 0.1', (s) => s.truth.device.q >= 0.1],
    ];
    for (const [label, keep] of strata) {
      const row = modeRow(own, keep);
      if (row) rows[`${kind} ${label}`] = row;
    }
    for (const sub of new Set(own.map((r) => r.truth.sub ?? ''))) {
      const judged = own.filter((r) => (r.truth.sub ?? '') === sub && r.right !== undefined);
      if (judged.length)
        rows[`${kind} ${sub}`] = { n: judged.length, right: share(judged.map((r) => r.right === true)) };
    }
    const folds = own.filter((r) => r.fold !== undefined);
    if (folds.length)
      rows[kind] = {
        n: folds.length,
        ...Object.fromEntries(
          (['right', 'undecided', 'wrong', 'none'] as const).map((v) => [
            v,
            share(folds.map((r) => r.fold === v)),
          ]),
        ),
      };
  }
  return rows;
}

function modeRow(records: readonly RecordScore[], keep: (score: ModeScore) => boolean): Row | undefined {
  const kept = records.flatMap((r) => r.modes).filter(keep);
  if (!kept.length) return undefined;
  const whole = records.filter((r) => r.modes.length > 0 && r.modes.every(keep));
  const touched = records.filter((r) => r.modes.some(keep));
  const errors = kept.flatMap(({ mode, found }) =>
    found
      ? [
          {
            f: (found.frequencyHz - mode.f_hz) / (mode.crlb_f as number),
            z: (found.dampingRatio - mode.zeta) / (mode.crlb_zeta as number),
            pf: (found.frequencyHz - mode.f_hz) / found.frequencySdHz,
            pz: (found.dampingRatio - mode.zeta) / found.dampingRatioSd,
          },
        ]
      : [],
  );
  const of = (key: 'f' | 'z' | 'pf' | 'pz'): number[] => errors.map((e) => e[key]);
  return {
    n: kept.length,
    fail: 1 - errors.length / kept.length,
    spurious: whole.reduce((sum, r) => sum + r.spuriousCount, 0) / touched.length,
    fRatio: rms(of('f')),
    zRatio: rms(of('z')),
    fMedian: quantile(of('f'), 0.5) / 0.6745,
    zMedian: quantile(of('z'), 0.5) / 0.6745,
    fP95: quantile(of('f'), 0.95) / 1.96,
    zP95: quantile(of('z'), 0.95) / 1.96,
    coverF: share(of('pf').map((p) => Math.abs(p) <= 1.96)),
    coverZ: share(of('pz').map((p) => Math.abs(p) <= 1.96)),
    pullF: rms(of('pf')),
    pullZ: rms(of('pz')),
  };
}
