import { describe, expect, it } from 'vitest';
import { judge } from '../../src/core/survey/judge.ts';
import {
  firstPick,
  forcingVerdict,
  pairRows,
  pickedIds,
  pickedSeparation,
  pickOf,
} from '../../src/text/pairs.ts';
import { READING_EXAMPLES } from '../support/reading-examples.ts';

const of = (name: string) => {
  const { reading, sources } = READING_EXAMPLES.find((one) => one.name === name)!;
  const judgement = judge(reading.analysis, sources, reading.circumstances);
  return { analysis: reading.analysis, judgement };
};

describe('pairRows', () => {
  it('has one row a forcing, worst first, and leaves none out', () => {
    const { judgement } = of('many');
    const rows = pairRows(judgement);
    expect(new Set(rows.map((row) => row.forcingIndex)).size).toBe(judgement.forcings.length);
    const verdicts = rows.map((row) => forcingVerdict(judgement, row.forcingIndex));
    const firstApart = verdicts.indexOf('apart');
    expect(verdicts[0]).toBe('coincident');
    expect(verdicts.lastIndexOf('coincident')).toBeLessThan(firstApart);
    expect(verdicts.lastIndexOf('close')).toBeLessThan(firstApart);
  });

  it('calls a forcing blind that this recording could not see, never apart', () => {
    const { judgement } = of('stair');
    const blade = judgement.forcings.findIndex((forcing) => forcing.role === 'blade-pass');
    // six blades at 960 r/min are 96 Hz; the recording sees 26 Hz
    expect(forcingVerdict(judgement, blade)).toBe('blind');
  });

  it('says of a running reading that modes were not sought', () => {
    const { judgement } = of('running');
    expect(judgement.forcings.length).toBeGreaterThan(0);
    for (const row of pairRows(judgement)) expect(row.separation).toBeUndefined();
  });
});

describe('picking', () => {
  it('begins with the worst pair, else with the first mode, else with the first tone', () => {
    const stair = of('stair');
    expect(firstPick(stair.judgement, 2, 0)?.kind).toBe('pair');
    const running = of('running');
    expect(firstPick(running.judgement, 0, 3)).toEqual({ kind: 'tone', index: 0 });
    const alone = judge(stair.analysis, []);
    expect(firstPick(alone, 2, 0)).toEqual({ kind: 'mode', index: 0 });
    expect(firstPick(judge(running.analysis, []), 0, 0)).toBeUndefined();
  });

  it('lights up both ends of the pair', () => {
    const { judgement } = of('stair');
    const [worst] = judgement.separations;
    const pick = { kind: 'forcing', index: worst!.forcingIndex } as const;
    expect(pickedSeparation(judgement, pick)).toBe(worst);
    expect(pickedIds(judgement, pick)).toEqual(
      new Set([`forcing-${worst!.forcingIndex}`, `mode-${worst!.modeIndex}`]),
    );
  });

  it('turns the id of a mark back into what it stands for', () => {
    expect(pickOf('forcing-12')).toEqual({ kind: 'forcing', index: 12 });
    expect(pickOf('tone-0')).toEqual({ kind: 'tone', index: 0 });
    expect(pickOf(undefined)).toBeUndefined();
    expect(pickOf('rail')).toBeUndefined();
  });
});
