import { describe, expect, it } from 'vitest';
import { DOUBT_CODES, REFUSAL_CODES } from '../../src/core/model/doubt.ts';
import {
  CAUTION_CODES,
  CRITERIA,
  LEVEL_REASONS,
  MEASURES,
  SPECIALIST_REASONS,
  UNPAIRED_VERDICTS,
  VERDICTS,
  WAY_OUT_KINDS,
} from '../../src/core/model/judgement.ts';
import { NEXT_STEP_KINDS } from '../../src/core/model/asset-verdict.ts';
import { PROBLEM_CODES } from '../../src/core/model/problem.ts';
import { INTERRUPTION_CODES } from '../../src/core/model/recording.ts';
import { FORCING_ROLES, KNOWN_BY, SOURCE_KINDS, type Source } from '../../src/core/model/source.ts';
import { IMPOSSIBLE_REASONS } from '../../src/core/survey/impossible-source.ts';
import { SHAPE_REASONS } from '../../src/core/survey/parse-sources.ts';
import { foldedForcings } from '../../src/core/survey/folded-images.ts';
import { DEFAULT_THRESHOLDS } from '../../src/core/survey/thresholds.ts';
import { thresholdText } from '../../src/text/thresholds.ts';
import type { Thresholds } from '../../src/core/model/thresholds.ts';
import { judge } from '../../src/core/survey/judge.ts';
import { forcingsOf } from '../../src/core/survey/forcings.ts';
import {
  coverageSentence,
  nextStepSentence,
  scatterWords,
  speedSeriesSentence,
  toneOriginSentence,
} from '../../src/text/assets.ts';
import { cautionText } from '../../src/text/cautions.ts';
import { doubtText } from '../../src/text/doubts.ts';
import { INDICATIVE_LINE } from '../../src/text/indicative.ts';
import { interruptionSentence } from '../../src/text/interruptions.ts';
import { criterionName, levelReason, levelSentence, measureName } from '../../src/text/levels.ts';
import { problemSentence } from '../../src/text/problems.ts';
import { refusalSentence } from '../../src/text/refusals.ts';
import { headlineSentence, verdictSentence } from '../../src/text/sentence.ts';
import {
  foldedForcingSentence,
  forcingName,
  forcingOrigin,
  knownByName,
  sourceKindName,
  windSentence,
} from '../../src/text/sources.ts';
import { specialistText } from '../../src/text/specialist.ts';
import { unpairedText, verdictText } from '../../src/text/verdicts.ts';
import { wayOutName, wayOutSentence } from '../../src/text/ways-out.ts';
import { analysisOf, levelsOf, modeAt, toneAt, valueOf } from '../support/survey-analysis.ts';

const SENTENCE = /^[A-Z0-9].*[.]$/s;

describe('every closed code', () => {
  it('has its sentence', () => {
    const sentences = [
      ...PROBLEM_CODES.map((code) => problemSentence({ code, facts: {} })),
      ...REFUSAL_CODES.map(refusalSentence),
      ...INTERRUPTION_CODES.map(interruptionSentence),
      ...DOUBT_CODES.flatMap((code) => [doubtText(code).meaning, doubtText(code).remedy]),
      ...SPECIALIST_REASONS.map(specialistText),
      ...CAUTION_CODES.map((code) => cautionText(code).text),
      ...NEXT_STEP_KINDS.map((kind) => nextStepSentence({ kind })),
      ...VERDICTS.map((verdict) => verdictText(verdict).meaning),
      ...UNPAIRED_VERDICTS.map((verdict) => unpairedText(verdict).meaning),
      INDICATIVE_LINE,
    ];
    expect(sentences.filter((sentence) => !SENTENCE.test(sentence))).toEqual([]);
    const meanings = DOUBT_CODES.map((code) => doubtText(code).meaning);
    expect(new Set(meanings).size).toBe(meanings.length);
  });
  it('has its name', () => {
    const names = [
      ...SOURCE_KINDS.map(sourceKindName),
      ...KNOWN_BY.map(knownByName),
      ...CRITERIA.map(criterionName),
      ...MEASURES.map(measureName),
      ...LEVEL_REASONS.map(levelReason),
      ...WAY_OUT_KINDS.map(wayOutName),
      ...DOUBT_CODES.map((code) => doubtText(code).name),
    ];
    expect(names.every((name) => name.length > 2)).toBe(true);
  });
  it('that the person may set has its origin', () => {
    for (const key of Object.keys(DEFAULT_THRESHOLDS) as (keyof Thresholds)[])
      expect(thresholdText(key).origin).toMatch(SENTENCE);
  });
  it('of a refused source has its own words', () => {
    for (const reason of [...IMPOSSIBLE_REASONS, ...SHAPE_REASONS])
      expect(
        problemSentence({ code: 'bad-source', facts: { row: 1, field: 'speedRpm', reason } }),
      ).not.toContain('cannot be');
  });
  it('never says clear, safe or certified, except to deny it', () => {
    const all = [
      ...VERDICTS.map((verdict) => JSON.stringify(verdictText(verdict))),
      ...UNPAIRED_VERDICTS.map((verdict) => JSON.stringify(unpairedText(verdict))),
    ].join(' ');
    expect(all).not.toMatch(/\bclear\b|\bsafe\b/i);
    expect(INDICATIVE_LINE).toBe('Indicative survey, not a certified measurement.');
  });
});

describe('problems', () => {
  const says = (code: (typeof PROBLEM_CODES)[number], facts: Record<string, string | number>) =>
    problemSentence({ code, facts });
  it('name row, column and reason', () => {
    expect(says('bad-row', { row: 17, column: 3, reason: 'not-a-number', found: 'abc' })).toBe(
      'Row 17: column 3 ("abc") is not a number. Nothing was stored; correct the row or leave it out.',
    );
    expect(says('time-not-increasing', { row: 4 })).toBe(
      'Row 4: time runs backwards here. Nothing was stored; sort the rows by time.',
    );
    expect(says('bad-unit', { row: 1, column: 'ax', unit: 'furlong' })).toMatch(
      /^Row 1: the unit "furlong" of column ax is not known\./,
    );
    expect(says('bad-header', { row: 1, missing: 'time', found: 'a;b' })).toMatch(
      /^Row 1: no time column found\./,
    );
    expect(says('too-short', { durationS: 3.2 })).toMatch(/^Too short: 3\.20 s is not enough/);
    expect(says('too-large', { sampleCount: 9e6, maxCount: 4e6 })).toBe(
      'Too large: more than 4000000 samples. Cut it into shorter recordings.',
    );
  });
});

describe('forcings in words', () => {
  const names = (source: Source) => valueOf(forcingsOf([source])).map(forcingName);
  it('stand inside a sentence', () => {
    expect(names({ name: 'visitors', kind: 'footfall', activity: 'walking' })).toEqual([
      'the sideways push of walking, at half the step rate',
      'the step rate of walking',
      'the second harmonic of walking',
      'the third harmonic of walking',
      'the fourth harmonic of walking',
    ]);
    expect(
      names({ name: 'Pump A', kind: 'machine', speedRpm: 1450, orders: [0.5, 1, 2], bladeCount: 6 }),
    ).toEqual([
      'half the running speed of Pump A',
      'the running speed of Pump A',
      'twice the running speed of Pump A',
      'the blade-pass frequency of Pump A',
    ]);
    expect(names({ name: 'crowd', kind: 'footfall', activity: 'sway' })).toEqual([
      'the sway of people from side to side',
    ]);
  });
  it('have a name for every role', () => {
    const [forcing] = valueOf(forcingsOf([{ name: 'x', kind: 'band', frequencyHz: 3 }]));
    for (const role of FORCING_ROLES) expect(forcingName({ ...forcing!, role }).length).toBeGreaterThan(0);
  });
  it('are told before recording where they would show folded', () => {
    const list = valueOf(
      forcingsOf([
        { name: 'blower', kind: 'machine', speedRpm: 3550, toleranceRatio: 0, bladeCount: 5, orders: [1] },
      ]),
    );
    expect(foldedForcings(list, 60).map(foldedForcingSentence)).toEqual([
      'The running speed of blower lies above what this phone samples: it would show at 0.83 Hz, next to zero, where its size cannot be read.',
      'The blade-pass frequency of blower lies above what this phone samples: it would show at 4.2 Hz.',
    ]);
  });
  it('tell the wind that sheds vortices at a mode', () => {
    expect(windSentence({ criticalSpeedMps: [4.762, 5.556], scrutonRatio: [6.4, 6.4] })).toBe(
      'Vortices shed at this mode in a wind of 4.8 to 5.6 m/s. Scruton number 6.4.',
    );
  });
  it('say to check what is not sure', () => {
    const [road] = valueOf(forcingsOf([{ name: 'street', kind: 'traffic' }]));
    expect(forcingOrigin(road!)).toBe('commonly reported range (check against the standard)');
  });
});

describe('the verdict sentence', () => {
  const mode = modeAt(7.42, 0.011, { frequencySdHz: 0.0153, dampingRatioSd: 0.001 });
  const tap = analysisOf('tap', { modes: [mode] });
  it('reads as the design has it', () => {
    // A pace of up to 2.4 Hz whose fourth harmonic lies above: the third comes nearest.
    const walking: Source = {
      name: 'visitors',
      kind: 'footfall',
      activity: 'walking',
      paceHz: [2.2, 2.4],
      toleranceRatio: 0,
    };
    expect(verdictSentence(tap, judge(tap, [walking]))).toBe(
      'Rings at 7.42 Hz ± 0.03, damping 1.1 % ± 0.2. The third harmonic of walking comes within 3 %: coincident. Trust: good.',
    );
  });
  it('does without sources, and tells r/min when asked', () => {
    expect(verdictSentence(tap)).toBe('Rings at 7.42 Hz ± 0.03, damping 1.1 % ± 0.2. Trust: good.');
    expect(headlineSentence(tap, { frequencyUnit: 'r/min' })).toBe(
      'Rings at 445.2 r/min ± 1.8, damping 1.1 % ± 0.2.',
    );
  });
  it('says how near a close pair lies, of which mode', () => {
    const two = analysisOf('tap', { modes: [modeAt(20, 0.02), mode] });
    const judgement = judge(two, [{ name: 'press', kind: 'band', frequencyHz: 6.4, toleranceRatio: 0 }]);
    expect(verdictSentence(two, judgement)).toContain('Press lies 14 % below the mode at 7.42 Hz: close.');
  });
  it('speaks of a coincidence of the strongest mode before a worse one of another, and of any before a close pair', () => {
    const sources: Source[] = [
      { name: 'press', kind: 'band', frequencyHz: 7.4, toleranceRatio: 0 },
      { name: 'fan', kind: 'band', frequencyHz: 20, toleranceRatio: 0 },
      { name: 'mill', kind: 'band', frequencyHz: 6.3, toleranceRatio: 0 },
    ];
    const two = analysisOf('tap', { modes: [mode, modeAt(20, 0.005)] });
    expect(verdictSentence(two, judge(two, sources))).toContain('Press falls on it: coincident.');
    expect(verdictSentence(two, judge(two, sources.slice(1)))).toContain(
      'Fan falls on the mode at 20.0 Hz: coincident.',
    );
    expect(verdictSentence(two, judge(two, sources.slice(2)))).toContain('Mill lies 15 % below it: close.');
  });
  it('never turns blindness into good news', () => {
    const judgement = judge(tap, [
      { name: 'line', kind: 'mains', supplyHz: 50 },
      { name: 'x', kind: 'band', frequencyHz: 20 },
    ]);
    expect(verdictSentence(tap, judgement)).toContain(
      'No mode found near any source in this reading, and it was blind to one forcing.',
    );
  });
  it('says blows beside the rest', () => {
    const rail = analysisOf('tap', { modes: [modeAt(14.9, 0.01)] });
    const judgement = judge(rail, [
      { name: 'visitors', kind: 'footfall', activity: 'walking' },
      { name: 'x', kind: 'band', frequencyHz: 25 },
    ]);
    expect(verdictSentence(rail, judgement)).toContain(
      'No mode found near any source in this reading. Steps of visitors meet it as single blows that ring out before the next: no resonance verdict applies.',
    );
  });
  it('says undecided, and why when a fold leaves it open', () => {
    const open = analysisOf('tap', {
      modes: [modeAt(15, 0.02, { fold: { verdict: 'undecided', candidatesHz: [15, 45] } })],
    });
    const band: Source = { name: 'press', kind: 'band', frequencyHz: 15.3, toleranceRatio: 0 };
    expect(verdictSentence(open, judge(open, [band]))).toBe(
      'Shows a mode at 15.00 Hz ± 0.03, which may be the folded image of a higher one. Press comes within 2 %, if what is seen is no folded image: undecided. Trust: fair.',
    );
    const wide = analysisOf('tap', { modes: [modeAt(10, 0.01, { frequencySdHz: 1.2 })] });
    expect(verdictSentence(wide, judge(wide, [{ ...band, frequencyHz: 8.8 }]))).toContain(
      'Press may fall on it or lie clear of it: undecided.',
    );
  });
  it('tells a running machine’s tone, never as a mode', () => {
    const running = analysisOf('running', { tones: [toneAt(24.67, 0.42)] });
    const sentence = verdictSentence(
      running,
      judge(running, [{ name: 'Pump A', kind: 'machine', speedRpm: 1480 }]),
    );
    expect(sentence).toBe(
      'Strongest tone at 24.67 Hz ± 0.01, amplitude 0.420 m/s² ± 0.008. It fits the running speed of Pump A. Trust: good.',
    );
    expect(
      verdictSentence(running, judge(running, [{ name: 'Fan', kind: 'machine', speedRpm: 900 }])),
    ).toContain('No source entered here explains it.');
  });
  it('names the likely frequency of what is folded', () => {
    const fold = { fold: { verdict: 'folded' as const, candidatesHz: [45] } };
    expect(headlineSentence(analysisOf('tap', { modes: [modeAt(15, 0.03, fold)] }))).toBe(
      'Rings at about 45.0 Hz, seen folded at 15.00 Hz ± 0.03.',
    );
    expect(headlineSentence(analysisOf('running', { tones: [toneAt(15, 0.3, fold)] }))).toMatch(
      /^Strongest tone at about 45\.0 Hz, seen folded at/,
    );
  });
  it('says when nothing was found', () => {
    expect(verdictSentence(analysisOf('ambient'))).toBe('No mode found in this reading. Trust: good.');
    const ambient = analysisOf('ambient');
    expect(verdictSentence(ambient, judge(ambient, [{ name: 'street', kind: 'traffic' }]))).toBe(
      'No mode found in this reading. Whether a source falls on one stays open. Trust: good.',
    );
    expect(headlineSentence(analysisOf('coastdown'))).toBe(
      'No resonance found in the range that the machine passed through.',
    );
  });
});

describe('levels and ways out in words', () => {
  it('name value, zone, reason, source, certainty and band', () => {
    expect(
      levelSentence({
        criterion: 'iso-20816-3',
        measure: 'velocity-rms',
        value: 0.0031,
        unit: 'm/s',
        grade: 'at-least',
        zone: 'C',
        classOf: 'group 2, rigid support',
        limit: 0.0028,
        beyondLast: false,
        origin: 'ISO 20816-3:2022',
        certain: true,
        bandHz: [10, 1000],
        reasons: ['band-partly-seen'],
      }),
    ).toBe(
      'ISO 20816-3, machine vibration on bearing housings: rms velocity 3.1 mm/s, at least zone C, because the phone sees only part of the band that this criterion needs. Source: ISO 20816-3:2022, group 2, rigid support; needs 10.0 to 1000 Hz.',
    );
  });
  it('name the crowd that a class presumes when it was not there', () => {
    const bridge = analysisOf('ambient', { levels: levelsOf({ verticalPeakMps2: 0.6, bandHz: [0.25, 28] }) });
    const [en] = judge(bridge, [], {}, { place: { kind: 'footbridge' } }).levels;
    expect(levelSentence(en!)).toBe(
      'EN 1990, footbridge comfort: peak vertical acceleration 0.60 m/s², not assessed, because it is not said that the crowd or walker which the criterion presumes was there. The designer’s traffic for the bridge; 0.4 m/s² horizontal for exceptional crowds. Source: EN 1990 A2.4.3.2; needs 1.00 to 5.00 Hz.',
    );
  });
  it('tell whose tone it is and what a series of speeds shows', () => {
    expect(toneOriginSentence({ toneIndex: 0, remainingRatio: 0, whose: 'machine' })).toBe(
      'Gone with the machine off: it is this machine’s.',
    );
    const series = { order: 1, points: [], missingRpm: [] };
    const findings = (['rising', 'falling', 'flat'] as const).map((finding) =>
      speedSeriesSentence({ ...series, finding }),
    );
    expect(findings.every((sentence) => SENTENCE.test(sentence))).toBe(true);
  });
  it('tell a way out with what follows', () => {
    const tap = analysisOf('tap', { modes: [modeAt(7.42, 0.011)] });
    const judgement = judge(tap, [
      { name: 'visitors', kind: 'footfall', activity: 'walking', paceHz: [2.2, 2.4], toleranceRatio: 0 },
    ]);
    const said = judgement.waysOut
      .filter(({ separationIndex }) => separationIndex === 0)
      .map((way) => wayOutSentence(way, judgement));
    expect(said[0]).toMatch(
      /^Stiffness at the spot times 1\.\d\d to 1\.\d\d brings the mode up to 9\.02 Hz\. Then apart, amplified at most 2\.8 times\. But it comes nearer to the fourth harmonic of walking\.$/,
    );
    const modal = {
      massKg: 6,
      massSdKg: 0.2,
      massIntervalKg: [5.6, 6.4] as const,
      stiffnessNPerM: 13e3,
      stiffnessSdNPerM: 400,
      stiffnessIntervalNPerM: [12e3, 14e3] as const,
    };
    const [stiffer, heavier] = judgement.waysOut.filter(({ separationIndex }) => separationIndex === 0);
    expect(wayOutSentence(stiffer!, judgement, modal)).toMatch(
      / That is 5\.7 to 6\.8 N\/mm more there\. Then apart/,
    );
    expect(wayOutSentence(heavier!, judgement, modal)).toMatch(
      / That is 5\.\d to 6\.\d kg there\. Then apart/,
    );
    expect(said[1]).toMatch(
      /^Modal mass at the spot times 1\.\d+ to \d\.\d+ brings the mode down to 5\.27 Hz\. Then apart/,
    );
    expect(said[2]).toMatch(
      /^A damping ratio of [\d.]+ % holds the response down\. Then still coincident, amplified at most 5\.0 times\./,
    );
  });
});

describe('an asset in words', () => {
  const coverage = { spotsRead: [], spotsMissing: [], tapCount: 1 };
  it('says which directions and states its readings cover', () => {
    expect(
      coverageSentence({ ...coverage, directions: ['across', 'up'], hasRunning: true, hasStopped: true }),
    ).toBe('Directions: across, up. Read running and stopped.');
    expect(coverageSentence({ ...coverage, directions: [], hasRunning: false, hasStopped: false })).toBe(
      'No direction was named.',
    );
  });

  it('says how far a mode scatters from reading to reading, where it does', () => {
    expect(scatterWords({ frequencyBetweenHz: 0.031 })).toBe(
      'they differ by 0.031 Hz (standard deviation) beyond their own uncertainty',
    );
    expect(scatterWords({ frequencyBetweenHz: 0 })).toBeUndefined();
  });
});
