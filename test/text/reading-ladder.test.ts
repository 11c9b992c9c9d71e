import { describe, expect, it } from 'vitest';
import { judge } from '../../src/core/survey/judge.ts';
import { allDoubts } from '../../src/text/all-doubts.ts';
import { keptTogether } from '../../src/ui/screens/reading/kept-together.ts';
import { ladderSentence } from '../../src/text/ladder-sentence.ts';
import { readingLadder } from '../../src/text/reading-ladder.ts';
import { likelyDampingRatio, likelyHz, otherCandidatesHz } from '../../src/text/true-frequency.ts';
import { READING_EXAMPLES } from '../support/reading-examples.ts';

const units = { frequency: 'Hz', acceleration: 'm/s²', velocity: 'mm/s', displacement: 'µm' } as const;
const of = (name: string) => {
  const { reading, sources } = READING_EXAMPLES.find((one) => one.name === name)!;
  return { analysis: reading.analysis, judgement: judge(reading.analysis, sources, reading.circumstances) };
};
const foldedMode = {
  ...of('stair').analysis.modes[0]!,
  frequencyHz: 20,
  dampingRatio: 0.02,
  fold: { verdict: 'folded', candidatesHz: [40, 20] },
} as const;

describe('readingLadder', () => {
  it('shows every mode, forcing and tone with its own id', () => {
    for (const { name } of READING_EXAMPLES) {
      const { analysis, judgement } = of(name);
      const ladder = readingLadder(analysis, judgement, units);
      expect(ladder.modes).toHaveLength(analysis.modes.length);
      expect(ladder.forcings).toHaveLength(judgement.forcings.length);
      expect(ladder.tones).toHaveLength(analysis.tones.length);
      const ids = [...ladder.modes, ...ladder.forcings, ...ladder.tones].map((item) => item.id);
      expect(new Set(ids).size).toBe(ids.length);
    }
  });

  it('never draws a mode as sure whose fold is undecided', () => {
    const { analysis, judgement } = of('fold undecided');
    const [mode] = readingLadder(analysis, judgement, units).modes;
    expect(mode!.isUnsure).toBe(true);
    expect(mode!.candidatesHz).toEqual([37.5, 82.3]);
    expect(mode!.detail).not.toContain('%');
  });

  it('marks what moved while a change is tried, and nothing else', () => {
    const before = of('stair');
    const [first, second] = before.analysis.modes;
    const analysis = { ...before.analysis, modes: [{ ...first!, frequencyHz: 9 }, second!] };
    const ladder = readingLadder(analysis, before.judgement, units, before);
    expect(ladder.modes[0]!.beforeHz).toBeCloseTo(7.42, 9);
    expect(ladder.modes[1]!.beforeHz).toBeUndefined();
    expect(ladder.forcings.every((forcing) => forcing.beforeHz === undefined)).toBe(true);
  });
});

describe('a folded mode', () => {
  it('is shown at its most likely true frequency, its damping scaled by apparent over true', () => {
    expect(likelyHz(foldedMode)).toBe(40);
    expect(likelyDampingRatio(foldedMode)).toBeCloseTo(0.01, 9);
    expect(otherCandidatesHz(foldedMode)).toEqual([20]);
  });
});

describe('ladderSentence', () => {
  it('names modes, the worst pair and what was not seen', () => {
    const { analysis, judgement } = of('stair');
    const sentence = ladderSentence(analysis, judgement, units);
    expect(sentence).toContain('7.42 Hz, 16.9 Hz');
    expect(sentence).toContain('8 forcings');
    expect(sentence).toContain('coincident');
    expect(sentence).toContain('blind above 26');
  });

  it('says plainly when there is no mode', () => {
    const { analysis, judgement } = of('no mode');
    expect(ladderSentence(analysis, judgement, units)).toContain('No mode.');
  });
});

describe('allDoubts', () => {
  it('holds each doubt once, those of the modes included', () => {
    const { analysis, judgement } = of('many');
    const codes = allDoubts(analysis, judgement).map((doubt) => doubt.code);
    expect(codes).toContain('band-edge');
    expect(new Set(codes).size).toBe(codes.length);
  });
});

describe('keptTogether', () => {
  it('ties a number to its unit and its ±, and leaves other words alone', () => {
    expect(keptTogether('Rings at 7.42 Hz ± 0.03, damping 1.1 % ± 0.2.')).toBe(
      'Rings at 7.42\u00a0Hz\u00a0±\u00a00.03, damping 1.1\u00a0%\u00a0±\u00a00.2.',
    );
    expect(keptTogether('3 taps in 30 s')).toBe('3 taps in 30 s');
  });
});
