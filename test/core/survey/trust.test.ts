import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { DOUBT_CODES } from '../../../src/core/model/doubt.ts';
import { judge } from '../../../src/core/survey/judge.ts';
import { cautionsFor } from '../../../src/core/survey/cautions.ts';
import { combineTrust, DOUBT_WEIGHTS, trustOfMode, worseTrust } from '../../../src/core/survey/trust.ts';
import { analysisOf, levelsOf, modeAt } from '../../support/survey-analysis.ts';

const doubts = (...codes: (typeof DOUBT_CODES)[number][]) => codes.map((code) => ({ code }));

describe('trust', () => {
  it('is good without doubts, fair with a moderate one, poor with a grave one or many', () => {
    const modes = [modeAt(7, 0.01)];
    expect(combineTrust([], modes)).toBe('good');
    expect(combineTrust(doubts('gaps', 'repeats'), modes)).toBe('good');
    expect(combineTrust(doubts('gaps', 'repeats', 'late-stamps'), modes)).toBe('fair');
    expect(combineTrust(doubts('few-taps'), modes)).toBe('fair');
    expect(combineTrust(doubts('few-taps', 'short', 'clipped', 'beating'), modes)).toBe('poor');
    expect(combineTrust(doubts('phone-moved'), modes)).toBe('poor');
    expect(combineTrust(doubts('practice', 'half-power-refused'), modes)).toBe('good');
  });
  it('counts the doubts of the strongest mode, once', () => {
    expect(combineTrust(doubts('few-taps'), [modeAt(7, 0.01, { doubts: ['few-taps'] })])).toBe('fair');
    expect(combineTrust([], [modeAt(7, 0.01), modeAt(9, 0.01, { doubts: ['poor-fit'] })])).toBe('good');
    expect(trustOfMode(modeAt(9, 0.01, { doubts: ['poor-fit'] }))).toBe('poor');
  });
  it('never calls a mode that is not direct good', () => {
    for (const verdict of ['folded', 'undecided'] as const)
      expect(combineTrust([], [modeAt(7, 0.01, { fold: { verdict, candidatesHz: [53] } })])).toBe('fair');
  });
  it('falls with the spread of frequency and damping', () => {
    expect(combineTrust([], [modeAt(7, 0.01, { dampingRatioSd: 0.0025 })])).toBe('fair');
    expect(combineTrust([], [modeAt(7, 0.01, { dampingRatioSd: 0.006 })])).toBe('poor');
    expect(combineTrust([], [modeAt(7, 0.01, { frequencySdHz: 0.08 })])).toBe('fair');
    expect(combineTrust([], [modeAt(7, 0.01, { frequencySdHz: 0.2 })])).toBe('poor');
  });
  it('never rises when a doubt is added', () => {
    const list = fc.uniqueArray(fc.constantFrom(...DOUBT_CODES));
    fc.assert(
      fc.property(list, list, (some, more) => {
        const few = combineTrust(doubts(...some), []);
        const all = combineTrust(doubts(...some, ...more), []);
        expect(worseTrust(few, all)).toBe(all);
      }),
    );
  });
  it('weighs every doubt of the closed list', () => {
    expect(Object.keys(DOUBT_WEIGHTS).sort()).toEqual([...DOUBT_CODES].sort());
  });
});

describe('call a specialist', () => {
  const walking = { name: 'visitors', kind: 'footfall', activity: 'walking' } as const;
  const calm = analysisOf('tap', { modes: [modeAt(20, 0.02)] });
  it('for what was seen', () => {
    expect(judge(calm, [], { visibleSway: true, cracksOrLooseParts: true }).specialist).toEqual([
      'visible-sway',
      'cracks-or-loose',
    ]);
    expect(judge(calm, []).specialist).toEqual([]);
  });
  it('for a level beyond the last boundary, even as a lower bound', () => {
    const loud = analysisOf('running', { levels: levelsOf({ velocityRmsFrom10HzMps: 0.006 }) });
    const place = { kind: 'bearing-housing', machine: { ratedPowerW: 45e3, support: 'rigid' } } as const;
    expect(judge(loud, [], {}, { place }).specialist).toEqual(['level-beyond']);
  });
  it('for a strong coincidence with people or a machine, not for a weak one', () => {
    const light = analysisOf('tap', { modes: [modeAt(2, 0.01)] });
    const damped = analysisOf('tap', { modes: [modeAt(2, 0.2)] });
    // Amplified 25 times, but only by the fourth harmonic's 7 %.
    const fitted = analysisOf('tap', { modes: [modeAt(8.5, 0.02)] });
    expect(judge(fitted, [walking]).separations[0]!.verdict).toBe('coincident');
    expect(judge(fitted, [walking]).specialist).toEqual([]);
    expect(judge(light, [walking]).specialist).toEqual(['coincident-people']);
    expect(judge(damped, [walking]).specialist).toEqual([]);
    const press = { name: 'press', kind: 'machine', speedRpm: 1200 } as const;
    expect(judge(calm, [press]).specialist).toEqual(['coincident-machine']);
    expect(
      judge(calm, [press], {}, { thresholds: { specialistAmplificationRatio: 100 } }).specialist,
    ).toEqual([]);
  });
  it('for poor trust only where something is at stake', () => {
    const poor = { doubts: doubts('poor-fit') };
    expect(judge(analysisOf('tap', { modes: [modeAt(20, 0.02)], ...poor }), [walking]).specialist).toEqual(
      [],
    );
    expect(judge(analysisOf('tap', { modes: [modeAt(2, 0.2)], ...poor }), [walking]).specialist).toEqual([
      'poor-trust-serious',
    ]);
  });
});

describe('cautions', () => {
  it('fit the procedure and the spot', () => {
    expect(cautionsFor({ procedure: 'tap', spotKind: 'handrail' })).toEqual([
      'local-rules-first',
      'do-not-lean-on-rail',
      'heights',
    ]);
    expect(cautionsFor({ procedure: 'tap', spotKind: 'pipe' })).toContain('no-tapping-pressurised-pipe');
    expect(cautionsFor({ procedure: 'tap', spotKind: 'pipe' })).toContain('isolate-and-lock-out');
    expect(cautionsFor({ procedure: 'tap', sourceKinds: ['machine'], machineState: 'off' })).toContain(
      'stand-by-may-start',
    );
    expect(cautionsFor({ procedure: 'running', spotKind: 'fan-frame' })).toContain(
      'no-loose-phone-near-moving-parts',
    );
    expect(cautionsFor({ procedure: 'running', spotKind: 'fan-frame' })).not.toContain(
      'isolate-and-lock-out',
    );
    expect(cautionsFor({ procedure: 'coastdown' })).toContain('stay-clear-while-slowing');
    expect(cautionsFor({ procedure: 'ambient', spotKind: 'floor', machineState: 'none' })).toEqual([
      'local-rules-first',
    ]);
    expect(cautionsFor({ procedure: 'ambient', visibleSway: true })[1]).toBe('leave-when-it-sways');
  });
});
