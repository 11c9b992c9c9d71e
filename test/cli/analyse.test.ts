import { spawnSync } from 'node:child_process';
import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterAll, describe, expect, it } from 'vitest';
import { tappedStructureAt } from '../support/tapped-structure.ts';

const folder = mkdtempSync(join(tmpdir(), 'thrumbook-analyse-'));
afterAll(() => rmSync(folder, { recursive: true }));

function file(name: string, text: string): string {
  writeFileSync(join(folder, name), text);
  return join(folder, name);
}

/** Runs the command as npm does. */
function analyse(...args: string[]) {
  const run = spawnSync(process.execPath, ['--import', 'tsx', 'src/cli/analyse.ts', ...args], {
    encoding: 'utf8',
  });
  const lines = run.stdout.split('\n').filter((line) => line !== '');
  return { status: run.status, lines: lines.map((line) => JSON.parse(line)), stderr: run.stderr };
}

const RAIL = {
  rateHz: 100,
  durationS: 24,
  frequencyHz: 7.4,
  dampingRatio: 0.012,
  tapTimesS: [2.005, 9.005, 16.005],
  amplitudeMps2: 1,
};

/** Stamps scatter by some milliseconds, as real ones do: that is what tells 7.4 Hz from its folded images. */
function handrail(unitPerMps2 = 1, header = 't_s,ax_mps2,ay_mps2,az_mps2'): string {
  const noise = chance();
  const rows = Array.from({ length: RAIL.rateHz * RAIL.durationS }, (_, i) => {
    const timeS = (i + 0.3 * noise()) / RAIL.rateHz;
    const sample = tappedStructureAt(RAIL, timeS).map((value) => (value + 0.02 * noise()) * unitPerMps2);
    return [timeS, ...sample].map((value) => value.toFixed(6)).join(',');
  });
  return [header, ...rows].join('\n');
}

/** Uniform in (-1, 1), the same in every run (Park & Miller 1988). */
function chance(): () => number {
  let state = 20_260;
  return () => {
    state = (state * 48_271) % 2_147_483_647;
    return (state / 2_147_483_647) * 2 - 1;
  };
}

describe('the analysis command', () => {
  it('prints one line of JSON per file with frequency and damping, and a problem where there is one', () => {
    const good = file('rail.csv', handrail());
    const bad = file('bad.csv', 't,x\n0,1\n0.01,oops\n');
    const { status, lines } = analyse('--procedure', 'tap', good, bad, join(folder, 'none.csv'));
    expect(status).toBe(3);
    expect(lines).toHaveLength(3);
    expect(lines[0].file).toBe(good);
    const [mode] = lines[0].analysis.modes;
    expect(Math.abs(mode.frequencyHz / 7.4 - 1)).toBeLessThan(0.002);
    expect(Math.abs(mode.dampingRatio / 0.012 - 1)).toBeLessThan(0.05);
    expect(mode.frequencySdHz).toBeGreaterThan(0);
    expect(lines[0].analysis).toMatchObject({ procedure: 'tap', separations: [] });
    expect(lines[1].problem).toMatchObject({
      code: 'bad-row',
      row: 3,
      message: expect.stringContaining('3'),
    });
    expect(lines[2].problem).toMatchObject({ code: 'unreadable-file', message: expect.stringMatching(/\w/) });
  });

  it('reads g by the header or by the option to the same numbers', () => {
    const inG = file('g.csv', handrail(1 / 9.80665, 't,ax (g),ay (g),az (g)'));
    const bare = file('bare.csv', handrail(1 / 9.80665, 't,x,y,z'));
    const byHeader = analyse('--procedure=tap', inG);
    const byOption = analyse('--procedure=tap', '--unit=g', bare);
    expect([byHeader.status, byOption.status]).toEqual([0, 0]);
    expect(byHeader.lines[0].analysis.modes).toEqual(byOption.lines[0].analysis.modes);
    expect(byHeader.lines[0].analysis.recording.gravityMps2).toBeCloseTo(9.81, 1);
  });

  it('judges every mode against the sources of a file', () => {
    const sources = [
      { name: 'Fan', kind: 'machine', speedRpm: 444, toleranceRatio: 0.001, knownBy: 'tachometer' },
    ];
    const { status, lines } = analyse(
      '--procedure',
      'tap',
      '--sources',
      file('sources.json', JSON.stringify(sources)),
      file('rail.csv', handrail()),
    );
    expect(status).toBe(0);
    // 444 r/min is 7.4 Hz: the mode itself.
    const separation = lines[0].analysis.separations.find(
      (s: { forcingHz: number[] }) => s.forcingHz[0]! < 8,
    );
    expect(separation).toMatchObject({ source: 'Fan', modeIndex: 0, verdict: 'coincident' });
  });

  it('says what is wrong with its use on the error stream and ends with 2', () => {
    expect(analyse()).toMatchObject({
      status: 2,
      lines: [],
      stderr: expect.stringContaining('at least one file'),
    });
    const broken = file('broken.json', '[{ "name": ');
    const { status, lines, stderr } = analyse('--sources', broken, file('rail.csv', handrail()));
    expect([status, lines, stderr.length > 0]).toEqual([2, [], true]);
  });
});
