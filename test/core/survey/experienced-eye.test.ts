/** Cases that an experienced eye knows the answer to. Invented sites; the physics of each is computed here, independently. */
import { describe, expect, it } from 'vitest';
import type { Source } from '../../../src/core/model/source.ts';
import {
  addedMassTest,
  frequencyWithoutPhoneHz,
  massForFactor,
  massShiftRatio,
  stiffnessForFactor,
} from '../../../src/core/survey/added-mass.ts';
import { foldedForcings } from '../../../src/core/survey/folded-images.ts';
import { forcingsOf } from '../../../src/core/survey/forcings.ts';
import { judge } from '../../../src/core/survey/judge.ts';
import { doubtText } from '../../../src/text/doubts.ts';
import { levelSentence } from '../../../src/text/levels.ts';
import { verdictSentence } from '../../../src/text/sentence.ts';
import { wayOutSentence } from '../../../src/text/ways-out.ts';
import { analysisOf, levelsOf, modeAt, toneAt, valueOf } from '../../support/survey-analysis.ts';

/** Guard rail: posts of 48.3 × 3.2 mm tube, 1.1 m high and 1.5 m apart on a rigid base, rail of the same tube. */
const guardRail = (() => {
  const [outer, wall, height, spacing, youngPa, density] = [0.0483, 0.0032, 1.1, 1.5, 210e9, 7850];
  const inner = outer - 2 * wall;
  const inertia = (Math.PI / 64) * (outer ** 4 - inner ** 4);
  const perLength = density * (Math.PI / 4) * (outer ** 2 - inner ** 2);
  // Post as a cantilever with the rail of one bay on top: 33/140 of the post moves with it (Rayleigh).
  const massKg = perLength * (spacing + (33 / 140) * height);
  const stiffness = (3 * youngPa * inertia) / height ** 3;
  const hz = (extraKg: number) => Math.sqrt(stiffness / (massKg + extraKg)) / (2 * Math.PI);
  return { massKg, stiffness, hz };
})();

describe('guard rail', () => {
  it('is 14.9 Hz with a modal mass of 6.3 kg, and 0.5 kg on top lowers it by 3.8 %', () => {
    expect(guardRail.hz(0)).toBeCloseTo(14.9, 1);
    expect(guardRail.massKg).toBeCloseTo(6.3, 1);
    expect(massShiftRatio(0.5, guardRail.massKg)).toBeCloseTo(-0.038, 3);
    expect(guardRail.hz(0.5) / guardRail.hz(0) - 1).toBeCloseTo(massShiftRatio(0.5, guardRail.massKg), 9);
  });

  it('gives its modal mass and stiffness by the added-mass test, and factors in kg and N/m', () => {
    const at = (extraKg: number) => ({ frequencyHz: guardRail.hz(extraKg), frequencySdHz: 0.005 });
    const modal = valueOf(addedMassTest(at(0), at(0.5), 0.5));
    expect(modal.massKg).toBeCloseTo(guardRail.massKg, 6);
    expect(modal.stiffnessNPerM / guardRail.stiffness).toBeCloseTo(1, 6);
    expect(modal.massIntervalKg[0]).toBeLessThan(guardRail.massKg);
    expect(modal.massIntervalKg[1]).toBeGreaterThan(guardRail.massKg);
    expect(massForFactor(modal, 1.5)).toBeCloseTo(0.5 * guardRail.massKg, 6);
    expect(stiffnessForFactor(modal, 1.2)).toBeCloseTo(0.2 * guardRail.stiffness, 2);
  });

  it('takes the phone out: 0.2 kg on 3 kg is -3.2 %', () => {
    expect(massShiftRatio(0.2, 3)).toBeCloseTo(-0.032, 3);
    const withPhone = guardRail.hz(0.2);
    expect(frequencyWithoutPhoneHz(withPhone, 0.2, guardRail.massKg + 0.2)).toBeCloseTo(guardRail.hz(0), 9);
  });

  it('refuses a modal mass that the shift does not show', () => {
    const rough = (extraKg: number) => ({ frequencyHz: guardRail.hz(extraKg), frequencySdHz: 0.2 });
    expect(addedMassTest(rough(0), rough(0.5), 0.5)).toMatchObject({
      ok: false,
      problem: { code: 'mass-shift-unclear' },
    });
    expect(addedMassTest(rough(0.5), rough(0), 0.5)).toMatchObject({ ok: false });
  });

  it('is met by walkers as blows, doubts the phone’s weight and warns of leaning on it', () => {
    const walking: Source = { name: 'visitors', kind: 'footfall', activity: 'walking' };
    const analysis = analysisOf('tap', { modes: [modeAt(14.9, 0.006)] });
    const judgement = judge(
      analysis,
      [walking],
      { mounting: 'strapped', surface: 'tube' },
      { place: { kind: 'handrail' } },
    );
    expect(judgement.impulsive).toHaveLength(1);
    expect(judgement.doubts.map(({ code }) => code)).toEqual(['phone-mass']);
    expect(doubtText(judgement.doubts[0]!).name).toBe('Weight of the phone (−3.2 % on a light rail)');
    expect(judgement.cautions).toContain('do-not-lean-on-rail');
    expect(verdictSentence(analysis, judgement)).toBe(
      'Rings at 14.90 Hz ± 0.03, damping 0.60 % ± 0.06. Steps of visitors meet it as single blows that ring out before the next: no resonance verdict applies. Trust: good.',
    );
  });
});

describe('2-pole motor at 3550 r/min and 1 mm/s, sampled at 60 Hz', () => {
  const motor: Source = {
    name: 'blower',
    kind: 'machine',
    speedRpm: 3550,
    knownBy: 'tachometer',
    orders: [1],
  };
  const trueHz = 3550 / 60;
  const velocityMps = 0.001;
  const accelerationMps2 = 2 * Math.PI * trueHz * velocityMps;
  const seenHz = 60 - trueHz;
  it('is named before recording as folded to 0.83 Hz, next to zero', () => {
    const [named] = foldedForcings(valueOf(forcingsOf([motor])), 60);
    expect(named).toMatchObject({ edge: 'zero' });
    expect((named!.imageHz[0] + named!.imageHz[1]) / 2).toBeCloseTo(0.83, 1);
  });
  it('is matched through its image, and is never read as 71 mm/s', () => {
    // Integrated where it appears it would be 71 mm/s: the trap.
    expect((1000 * accelerationMps2) / (2 * Math.PI * seenHz)).toBeCloseTo(71, 0);
    const tone = toneAt(seenHz, accelerationMps2 * Math.SQRT2, {
      fold: { verdict: 'undecided', candidatesHz: [seenHz, trueHz] },
    });
    const analysis = analysisOf('running', {
      tones: [tone],
      levels: levelsOf({ velocityRmsMps: 0.0002, peakMps2: 0.53, leftOutTones: true }),
    });
    const housing = { kind: 'bearing-housing', machine: { ratedPowerW: 30_000, support: 'rigid' } } as const;
    const judgement = judge(analysis, [motor], { machineState: 'running' }, { place: housing });
    expect(judgement.toneMatches[0]).toMatchObject({ folded: true, forcing: { source: 'blower' } });
    for (const finding of judgement.levels)
      expect(finding).toMatchObject({ grade: 'not-assessed', beyondLast: false });
    expect(levelSentence(judgement.levels[0]!)).toContain('folded or undecided tones were left out');
    expect(verdictSentence(analysis, judgement)).toContain(
      'It fits the folded image of the running speed of blower.',
    );
  });
});

describe('twin pumps at 1485 and 1479 r/min', () => {
  const twins: Source[] = [
    { name: 'pump A', kind: 'machine', speedRpm: 1485, knownBy: 'tachometer', toleranceRatio: 0.0005 },
    { name: 'pump B', kind: 'machine', speedRpm: 1479, knownBy: 'tachometer', toleranceRatio: 0.0005 },
  ];
  it('are told apart by their tones, and both drive a base mode at 25 Hz', () => {
    const running = analysisOf('running', { tones: [toneAt(24.75, 0.4), toneAt(24.65, 0.35)] });
    const matches = judge(running, twins).toneMatches.map(({ forcing }) => forcing?.source);
    expect(matches).toEqual(['pump A', 'pump B']);
    const base = judge(analysisOf('tap', { modes: [modeAt(25, 0.02)] }), twins, { machineState: 'off' });
    const near = base.separations.filter(({ verdict }) => verdict === 'coincident');
    expect(near.map(({ source }) => source).sort()).toEqual(['pump A', 'pump B']);
    expect(base.specialist).toContain('coincident-machine');
    expect(wayOutSentence(base.waysOut[0]!, base)).toMatch(
      /^Keep out of 743 to 985, 1142 to 1970 r\/min\. The nearest speed that is apart is 11\d\d r\/min\. Then apart/,
    );
  });
});

describe('office bay with modes at 4.9, 5.2 and 5.5 Hz at 2.5 %', () => {
  /** Amplitude of the sum of the three decays, equal and in phase at the heel drop; where it has fallen by e gives what one decay reads. */
  const apparentDamping = (() => {
    const modes = [4.9, 5.2, 5.5].map((hz) => ({ w: 2 * Math.PI * hz, decay: 2 * Math.PI * hz * 0.025 }));
    const envelope = (t: number) => {
      const parts = modes.map(({ w, decay }) => ({
        re: Math.exp(-decay * t) * Math.cos(w * t),
        im: Math.exp(-decay * t) * Math.sin(w * t),
      }));
      return (
        Math.hypot(
          parts.reduce((sum, { re }) => sum + re, 0),
          parts.reduce((sum, { im }) => sum + im, 0),
        ) / 3
      );
    };
    let t = 0;
    while (envelope(t) > 1 / Math.E) t += 0.001;
    return 1 / (2 * Math.PI * 5.2 * t);
  })();
  it('dies away nearly twice as fast as any of its modes', () => {
    expect(apparentDamping).toBeGreaterThan(0.04);
  });
  it('is not trusted as one mode of so much damping from one decay alone', () => {
    const one = analysisOf('tap', { modes: [modeAt(5.2, apparentDamping, { dampingRatioSd: 0.002 })] });
    const heelDrop = { mounting: 'laid', surface: 'floor', excitation: 'heel-drop' } as const;
    const judgement = judge(one, [], heelDrop, { place: { kind: 'floor', floorUse: 'office' } });
    expect(judgement.doubts.map(({ code }) => code)).toEqual(['one-decay-close-modes']);
    expect(judgement.trust).toBe('poor');
    expect(judge(one, [], heelDrop).trust).toBe('poor');
  });
  it('is trusted at the 2.5 % that each of them has', () => {
    const modes = [4.9, 5.2, 5.5].map((hz) => modeAt(hz, 0.025));
    const judgement = judge(
      analysisOf('ambient', { modes }),
      [],
      { surface: 'floor' },
      { place: { kind: 'floor' } },
    );
    expect(judgement.trust).toBe('good');
  });
});

describe('pump room', () => {
  it('gives the technician the worst pair first, with what to keep out of', () => {
    const sources: Source[] = [
      {
        name: 'Pump 2',
        kind: 'machine',
        speedRpm: [900, 1480],
        variableSpeed: true,
        knownBy: 'drive-display',
        bladeCount: 6,
      },
      { name: 'supply', kind: 'mains', supplyHz: 50 },
    ];
    const analysis = analysisOf('tap', {
      modes: [modeAt(21.3, 0.018), modeAt(33, 0.03)],
      recording: { usableBandHz: [0.5, 45], rateHz: 100 },
    });
    const judgement = judge(
      analysis,
      sources,
      { machineState: 'off', mounting: 'magnet' },
      { place: { kind: 'machine-base' } },
    );
    expect(judgement.separations[0]).toMatchObject({
      forcing: '1×',
      verdict: 'coincident',
      modeIndex: 0,
      stoppedAgainstRunning: true,
    });
    expect(judgement.unpaired.map(({ forcing, verdict }) => [forcing.label, verdict])).toContainEqual([
      'twice line',
      'blind',
    ]);
    expect(judgement.cautions).toEqual([
      'local-rules-first',
      'isolate-and-lock-out',
      'stand-by-may-start',
      'live-parts',
    ]);
    expect(verdictSentence(analysis, judgement)).toBe(
      'Rings at 21.30 Hz ± 0.04, damping 1.80 % ± 0.18. The running speed of Pump 2 falls on it: coincident. Trust: good.',
    );
  });
});
