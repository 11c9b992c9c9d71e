/**
 * Speed and memory against the budgets of the design (medians, this machine); the FFT as a ratio to SciPy's, same run.
 *   npx tsx test/bench/speed.bench.ts [--short] leaves the hour out
 * Each line has processor time beside wall time: on a busy machine only the former means anything.
 */
import { spawnSync } from 'node:child_process';
import { fileURLToPath } from 'node:url';
import { parseArgs } from 'node:util';
import { analyse } from '../../src/core/analyse.ts';
import type { AnalysisSettings, Procedure } from '../../src/core/model/analysis.ts';
import type { Recording } from '../../src/core/model/recording.ts';
import { realTransform } from '../../src/core/signal/fft.ts';
import { ambientCase } from '../support/cases/ambient-case.ts';
import { generateCase } from '../support/cases/generate-case.ts';
import { seededRandom } from '../support/cases/random.ts';
import { longRecording } from './long-recording.ts';

const REPEATS = 7;
const GROWTH_S = [60, 300, 900, 3600];
const FFT_SIZES = [1 << 12, 1 << 16, 1 << 18];

const { values } = parseArgs({
  args: process.argv.slice(2).filter((a) => a !== 'speed' && a !== 'accuracy'),
  allowPositionals: true,
  strict: false,
  options: {
    short: { type: 'boolean', default: false },
    child: { type: 'string' },
    seconds: { type: 'string' },
  },
});

const median = (v: number[]): number => [...v].sort((a, b) => a - b)[v.length >> 1] as number;

interface Timing {
  readonly wallMs: number;
  readonly cpuMs: number;
}

function timed(work: () => unknown): Timing {
  const cpu = process.cpuUsage();
  const from = performance.now();
  work();
  const wallMs = performance.now() - from;
  const used = process.cpuUsage(cpu);
  return { wallMs, cpuMs: (used.user + used.system) / 1000 };
}

function medianOf(work: (repeat: number) => unknown): Timing {
  work(0);
  const all = Array.from({ length: REPEATS }, (_, repeat) => timed(() => work(repeat)));
  return { wallMs: median(all.map((t) => t.wallMs)), cpuMs: median(all.map((t) => t.cpuMs)) };
}

const settingsOf = (procedure: AnalysisSettings['procedure']): AnalysisSettings => ({
  procedure,
  timing: 'auto',
});

/** In its own process: wall time of one analysis, and the peak memory over that of the loaded program. */
function child(procedure: Procedure, seconds: number): void {
  const recording = longRecording(procedure, seconds, 100);
  const { wallMs, cpuMs } = timed(() => analyse(recording, settingsOf(procedure)));
  console.log(JSON.stringify({ wallMs, cpuMs, peakMb: process.resourceUsage().maxRSS / 1024 }));
}

function inChild(procedure: Procedure, seconds: number): { wallMs: number; cpuMs: number; peakMb: number } {
  const file = fileURLToPath(import.meta.url);
  const run = spawnSync(
    process.execPath,
    [...process.execArgv, file, '--child', procedure, '--seconds', String(seconds)],
    {
      encoding: 'utf8',
    },
  );
  if (run.status !== 0) throw new Error(run.stderr);
  return JSON.parse(run.stdout) as { wallMs: number; cpuMs: number; peakMb: number };
}

function row(budgetMs: number, timing: Timing): Record<string, number> {
  return { budgetMs, wallMs: +timing.wallMs.toFixed(0), cpuMs: +timing.cpuMs.toFixed(0) };
}

function shortBudgets(): void {
  const at60 = (kind: 'A1' | 'A2' | 'C' | 'D'): Recording[] => {
    const found: Recording[] = [];
    for (let i = 0; found.length < REPEATS && i < 200; i++) {
      const made = generateCase(kind, 900, i);
      if (made.truth.device.fs === 60 && (made.recording.timeS.at(-1) as number) > 50)
        found.push(made.recording);
    }
    return found;
  };
  const ambient = Array.from(
    { length: REPEATS },
    (_, i) => ambientCase(seededRandom(900, i), 900, i, { durationS: 300 }).recording,
  );
  const table: Record<string, Record<string, number>> = {};
  const add = (
    name: string,
    budgetMs: number,
    records: Recording[],
    procedure: AnalysisSettings['procedure'],
  ): void => {
    table[name] = row(
      budgetMs,
      medianOf((r) => analyse(records[r] as Recording, settingsOf(procedure))),
    );
  };
  add('tap, 50-60 s, 3 axes, 60 Hz', 150, at60('A1'), 'tap');
  add('tap, two modes', 400, at60('A2'), 'tap');
  add('running, 60 s', 100, at60('C'), 'running');
  add('ambient, 5 min', 600, ambient, 'ambient');
  add('coast-down, 60 s (no budget)', NaN, at60('D'), 'coastdown');
  add('ambient, 5 min, procedure recognised (no budget)', NaN, ambient, 'auto');
  console.table(table);
}

function growth(): void {
  const table: Record<string, Record<string, number>> = {};
  for (const procedure of ['ambient', 'running', 'tap'] as const) {
    const runs = GROWTH_S.map((seconds) => ({ seconds, ...inChild(procedure, seconds) }));
    const first = runs[0] as (typeof runs)[number];
    for (const run of runs) {
      const nLogN =
        (run.seconds * Math.log(100 * run.seconds)) / (first.seconds * Math.log(100 * first.seconds));
      table[`${procedure}, ${run.seconds} s at 100 Hz`] = {
        wallMs: +run.wallMs.toFixed(0),
        cpuMs: +run.cpuMs.toFixed(0),
        peakMb: +run.peakMb.toFixed(0),
        overNLogN: +(run.cpuMs / first.cpuMs / nLogN).toFixed(2),
      };
    }
  }
  console.table(table);
  console.log('Budget of the hour: 5000 ms, 300 MB; overNLogN at most about 1.');
}

function fftAgainstScipy(): void {
  const script = `
import json,sys,time
import numpy as np, scipy.fft as f
out=[]
for n in json.loads(sys.argv[1]):
    x=np.random.default_rng(1).standard_normal(n)
    f.rfft(x)
    t=[]
    for _ in range(15):
        a=time.process_time(); [f.rfft(x) for _ in range(8)]; t.append((time.process_time()-a)/8)
    out.append(sorted(t)[7]*1000)
print(json.dumps(out))`;
  const run = spawnSync('python3', ['-c', script, JSON.stringify(FFT_SIZES)], { encoding: 'utf8' });
  if (run.status !== 0) {
    console.log('FFT against SciPy: left out, python3 with scipy is not here');
    return;
  }
  const theirs = JSON.parse(run.stdout) as number[];
  const random = seededRandom(1);
  const table: Record<string, Record<string, number>> = {};
  FFT_SIZES.forEach((n, i) => {
    const x = Float64Array.from({ length: n }, () => random.normal());
    const ours =
      medianOf(() => {
        for (let r = 0; r < 8; r++) realTransform(x);
      }).cpuMs / 8;
    table[`${n} points`] = {
      oursMs: +ours.toFixed(3),
      scipyMs: +(theirs[i] as number).toFixed(3),
      ratio: +(ours / (theirs[i] as number)).toFixed(2),
    };
  });
  console.table(table);
}

if (values.child) child(values.child as Procedure, Number(values.seconds));
else {
  shortBudgets();
  fftAgainstScipy();
  if (!values.short) growth();
}
