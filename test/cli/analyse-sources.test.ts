import { spawnSync } from 'node:child_process';
import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterAll, describe, expect, it } from 'vitest';
import type { Analysis } from '../../src/core/model/analysis.ts';
import type { PrintedJudgement } from '../../src/cli/printed-judgement.ts';
import type { Separation } from '../../src/core/model/judgement.ts';
import type { Recording } from '../../src/core/model/recording.ts';
import type { Source } from '../../src/core/model/source.ts';
import { ringingRecording, type Ringing } from '../support/ringing-recording.ts';

const folder = mkdtempSync(join(tmpdir(), 'thrumbook-sources-'));
afterAll(() => rmSync(folder, { recursive: true }));

function file(name: string, text: string): string {
  writeFileSync(join(folder, name), text);
  return join(folder, name);
}

function csv({ timeS, accelerationMps2 }: Recording): string {
  const rows = Array.from(timeS, (t, i) =>
    [t, ...accelerationMps2.map((axis) => axis[i]!)].map((v) => v.toFixed(6)).join(','),
  );
  return ['t_s,ax_mps2,ay_mps2,az_mps2', ...rows].join('\n');
}

/** An invented site: what was tapped there, and what shakes it. The separations that the command prints. */
function separationsOf(
  name: string,
  ringing: Partial<Ringing>,
  sources: readonly Source[],
): readonly Separation[] {
  const recording = ringingRecording({
    frequencyHz: 7.42,
    dampingRatio: 0.011,
    tapTimesS: [3, 10, 17, 24],
    durationS: 32,
    rateHz: 100,
    scatterS: 0.001,
    ...ringing,
  });
  const run = spawnSync(
    process.execPath,
    [
      '--import',
      'tsx',
      'src/cli/analyse.ts',
      '--procedure=tap',
      `--sources=${file(`${name}.json`, JSON.stringify(sources))}`,
      file(`${name}.csv`, csv(recording)),
    ],
    { encoding: 'utf8' },
  );
  expect(run.status, run.stderr).toBe(0);
  return (JSON.parse(run.stdout) as { analysis: { separations: Separation[] } }).analysis.separations;
}

describe('analyse --sources', () => {
  it('holds the rail of an invented quay stair against walkers', () => {
    const separations = separationsOf('quay-stair', {}, [
      { name: 'visitors', kind: 'footfall', activity: 'walking', paceHz: [2.2, 2.4], toleranceRatio: 0 },
    ]);
    expect(separations).toHaveLength(5);
    const [worst] = separations;
    expect(worst).toMatchObject({
      source: 'visitors',
      forcing: 'walking 3rd',
      modeIndex: 0,
      verdict: 'coincident',
    });
    expect(worst!.amplification.kind).toBe('force');
    // 7.2 Hz over 7.42 Hz: 0.970, amplified about 16 times.
    expect(worst!.ratio[1]).toBeCloseTo(0.97, 2);
    expect(worst!.amplification.interval[1]).toBeGreaterThan(13);
    expect(worst!.amplification.interval[1]).toBeLessThan(22);
    expect(separations.find(({ forcing }) => forcing === 'walking 1st')!.verdict).toBe('apart');
  });

  it('holds the pump base of an invented pump room against its machines, and is blind above its band', () => {
    const separations = separationsOf('pump-room', { frequencyHz: 22.6, dampingRatio: 0.02 }, [
      {
        name: 'Pump 2',
        kind: 'machine',
        speedRpm: [900, 1480],
        variableSpeed: true,
        knownBy: 'drive-display',
        bladeCount: 6,
      },
      { name: 'supply', kind: 'mains', supplyHz: 50 },
    ]);
    const of = (forcing: string) => separations.find((separation) => separation.forcing === forcing)!;
    expect(of('1×')).toMatchObject({
      verdict: 'coincident',
      stoppedAgainstRunning: true,
      amplification: { kind: 'unbalance' },
    });
    expect(of('blade pass 6×').verdict).toBe('blind');
    expect(of('twice line').verdict).toBe('blind');
  });

  it('prints the rest of the judgement beside the analysis, and levels where the spot is told', () => {
    const timesS = Array.from({ length: 60 * 45 }, (_, i) => i / 60 + 0.0012 * Math.sin(i * i));
    const rows = timesS.map((t) => {
      // 2 mm/s rms at 24.2 Hz: above the first boundary of a small pump, below the last (ISO 20816-3, group 2, rigid).
      const tone = 2e-3 * Math.SQRT2 * 2 * Math.PI * 24.2 * Math.sin(2 * Math.PI * 24.2 * t);
      return [t, 0, tone, 9.81 + 0.01 * Math.sin(1e5 * t)].map((value) => value.toFixed(6)).join(',');
    });
    const sources: Source[] = [
      { name: 'Pump 1', kind: 'machine', speedRpm: 1452, toleranceRatio: 0.003 },
      { name: 'supply', kind: 'mains', supplyHz: 50 },
    ];
    const spot = { kind: 'bearing-housing', machine: { ratedPowerW: 30_000, support: 'rigid' } };
    const run = spawnSync(
      process.execPath,
      [
        ...['--import', 'tsx', 'src/cli/analyse.ts', '--procedure=running'],
        `--sources=${file('pump.json', JSON.stringify(sources))}`,
        `--spot=${file('spot.json', JSON.stringify(spot))}`,
        file('pump.csv', ['t_s,ax_mps2,ay_mps2,az_mps2', ...rows].join('\n')),
      ],
      { encoding: 'utf8' },
    );
    expect(run.status, run.stderr).toBe(0);
    const { analysis, judgement } = JSON.parse(run.stdout) as {
      analysis: Analysis;
      judgement: PrintedJudgement;
    };
    expect(analysis.tones[0]!.frequencyHz).toBeCloseTo(24.2, 1);
    expect(judgement.toneMatches[0]).toMatchObject({ toneIndex: 0, source: 'Pump 1', forcing: '1×' });
    expect(judgement.verdict).toContain('It fits the running speed of Pump 1.');
    expect(judgement.unpaired).toContainEqual(
      expect.objectContaining({ source: 'supply', verdict: 'not-sought' }),
    );
    expect(judgement.forcings).toHaveLength(judgement.unpaired.length);
    expect(judgement.levels[0]).toMatchObject({ criterion: 'iso-20816-3', measure: 'velocity-rms' });
    // Only part of 10 to 1000 Hz is seen: a lower bound, never a pass.
    expect(judgement.levels.map(({ grade }) => grade)).not.toContain('within');
    expect(judgement.trust).toBe(analysis.trust);
  });
});
