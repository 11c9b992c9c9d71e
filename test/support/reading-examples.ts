/** Invented readings for the reading screen: each shows a state that a person can meet. The scenario is Quay Mill, which does not exist. */
import type { Analysis, Mode, Procedure, RecordingFacts, Tone } from '../../src/core/model/analysis.ts';
import type { EditFact, Entity, ReadingFact, ResultFact } from '../../src/core/model/fact.ts';
import type { AnalysisPictures, RingDown } from '../../src/core/model/pictures.ts';
import type { Recording } from '../../src/core/model/recording.ts';
import type { Source } from '../../src/core/model/source.ts';

export interface ReadingExample {
  readonly name: string;
  readonly reading: ReadingFact;
  readonly recording: Recording;
  readonly entity: Entity;
  readonly results: readonly ResultFact[];
  readonly place: { readonly site?: string; readonly asset?: string; readonly spot?: string };
  readonly sources: readonly Source[];
  readonly history: readonly EditFact[];
  /** Worked out when asked for: slow. */
  readonly pictures: () => AnalysisPictures;
}

const RATE_HZ = 60;

const facts = (durationS: number, part: Partial<RecordingFacts> = {}): RecordingFacts => ({
  sampleCount: Math.round(durationS * RATE_HZ),
  durationS,
  rateHz: 59.94,
  timing: { model: 'stamps', trueShare: 0.93, scatterSdS: 0.0007, gapCount: 0, repeatCount: 0 },
  stepMps2: [0, 0, 0],
  noiseMps2PerRootHz: [0.0021, 0.0022, 0.0029],
  clippedCount: 0,
  usableBandHz: [0.6, 26],
  gravityMps2: 9.79,
  up: [0, 0, 1],
  ...part,
});

const mode = (frequencyHz: number, dampingRatio: number, part: Partial<Mode> = {}): Mode => ({
  frequencyHz,
  frequencySdHz: frequencyHz * dampingRatio * 0.1,
  dampingRatio,
  dampingRatioSd: dampingRatio * 0.08,
  amplitudeMps2: 0.9,
  direction: [0.97, 0.1, 0.22],
  verticalShare: 0.05,
  method: 'ring-down-fit',
  eventCount: 5,
  halfPower: { refusal: 'below-resolution' },
  logDecrement: { dampingRatio: dampingRatio * 1.04 },
  fold: { verdict: 'direct', candidatesHz: [frequencyHz] },
  doubts: [],
  ...part,
});

const tone = (frequencyHz: number, amplitudeMps2: number, part: Partial<Tone> = {}): Tone => ({
  frequencyHz,
  frequencySdHz: 0.002,
  amplitudeMps2,
  amplitudeSdMps2: amplitudeMps2 * 0.01,
  direction: [0, 0.3, 0.95],
  nature: 'forced',
  fold: { verdict: 'direct', candidatesHz: [frequencyHz] },
  ...part,
});

const analysisOf = (procedure: Procedure, part: Partial<Analysis>): Analysis => ({
  version: 1,
  procedure,
  procedureFrom: 'person',
  settings: { procedure, timing: 'auto' },
  recording: facts(30),
  modes: [],
  tones: [],
  broadPeaks: [],
  tapTimesS: [],
  doubts: [],
  trust: 'good',
  ...part,
});

/** A plain linear congruential generator: the same noise on every run. */
const noise = (seed: number) => {
  let state = seed;
  return () => {
    state = (state * 1664525 + 1013904223) % 4294967296;
    return state / 2147483648 - 1;
  };
};

interface Signal {
  readonly timeS: Float64Array;
  readonly axes: readonly Float64Array[];
}

const signalOf = (analysis: Analysis): Signal => {
  const random = noise(7);
  const count = Math.min(3600, analysis.recording.sampleCount);
  const timeS = Float64Array.from({ length: count }, (_, i) => i / analysis.recording.rateHz);
  const shares = [0.9, 0.25, 0.4];
  const axes = shares.map((share) =>
    timeS.map((t) => {
      const rings = analysis.tapTimesS
        .filter((tap) => t >= tap)
        .flatMap((tap) =>
          analysis.modes.map((m, i) => {
            const w = 2 * Math.PI * m.frequencyHz;
            return (
              (m.amplitudeMps2 / (1 + i)) *
              Math.exp(-m.dampingRatio * w * (t - tap)) *
              Math.sin(w * (t - tap))
            );
          }),
        );
      const hums = analysis.tones.map((x) => x.amplitudeMps2 * Math.sin(2 * Math.PI * x.frequencyHz * t));
      return share * [...rings, ...hums].reduce((sum, v) => sum + v, 0) + 0.015 * random();
    }),
  );
  return { timeS, axes };
};

/** Slow Fourier sums on a coarse grid: an example needs no more. */
const spectrumOf = ({ timeS, axes }: Signal): AnalysisPictures['spectrum'] => {
  const stepHz = 0.1;
  const bins = 300;
  const step = Math.max(1, Math.floor(timeS.length / 1200));
  const amplitudes = axes.map((axis) =>
    Float64Array.from({ length: bins }, (_, bin) => {
      let re = 0;
      let im = 0;
      for (let i = 0; i < Math.min(timeS.length, 1800); i += 1) {
        const window = 1 - Math.cos((2 * Math.PI * i) / 1800);
        const phase = 2 * Math.PI * bin * stepHz * timeS[i]!;
        re += axis[i]! * window * Math.cos(phase);
        im += axis[i]! * window * Math.sin(phase);
      }
      return (2 * Math.hypot(re, im)) / 1800 / step ** 0;
    }),
  );
  return {
    stepHz,
    window: 'hann',
    resolutionHz: 0.05,
    averageCount: 4,
    randomErrorRatio: 0.5,
    amplitudeMps2: amplitudes,
    densityMps4PerHz: amplitudes.map((a) => a.map((v) => v * v * 2)),
  };
};

const ringDownsOf = (analysis: Analysis): RingDown[] =>
  analysis.tapTimesS.slice(0, 6).map((tapTimeS, index) => {
    const random = noise(11 + index);
    const [first] = analysis.modes;
    const w = 2 * Math.PI * (first?.frequencyHz ?? 5);
    const timeS = Float64Array.from({ length: 180 }, (_, i) => tapTimeS + 0.05 + i / RATE_HZ);
    const model = (t: number) =>
      (0.9 - index * 0.08) *
      Math.exp(-(first?.dampingRatio ?? 0.01) * w * (t - tapTimeS)) *
      Math.sin(w * (t - tapTimeS));
    const fittedMps2 = timeS.map(model);
    const curveTimeS = Float64Array.from({ length: 900 }, (_, i) => timeS[0]! + (i / 900) * (179 / RATE_HZ));
    return {
      tapTimeS,
      timeS,
      fittedMps2,
      measuredMps2: fittedMps2.map((v) => v + 0.02 * random()),
      curveTimeS,
      curveMps2: curveTimeS.map(model),
    };
  });

const passOf = (analysis: Analysis): AnalysisPictures['pass'] => {
  const [first] = analysis.modes;
  if (analysis.procedure !== 'coastdown' || !first) return undefined;
  const random = noise(5);
  const frequencyHz = Float64Array.from({ length: 140 }, (_, i) => 3 + i * 0.15);
  const fittedMps2 = frequencyHz.map((f) => {
    const r = f / first.frequencyHz;
    return (0.4 * r * r) / Math.hypot(1 - r * r, 2 * first.dampingRatio * r);
  });
  return { frequencyHz, fittedMps2, measuredMps2: fittedMps2.map((v) => Math.abs(v + 0.08 * random())) };
};

const CALM = {
  mounting: 'laid',
  surface: 'tube',
  excitation: 'knuckle',
  machineState: 'none',
  peopleOnIt: 'none',
} as const;

interface Parts {
  readonly analysis: Analysis;
  readonly sources?: readonly Source[];
  readonly place?: ReadingExample['place'];
  readonly reading?: Partial<ReadingFact>;
  readonly entity?: Partial<Entity>;
  readonly results?: readonly ResultFact[];
  readonly history?: readonly EditFact[];
}

function example(name: string, parts: Parts): ReadingExample {
  const { analysis } = parts;
  const id = `reading:01JEXAMPLE${name.replaceAll(/\W/g, '').toUpperCase()}`;
  const signal = signalOf(analysis);
  const sensor = { source: 'accelerometer', practice: false, name: 'Example phone' } as const;
  const pass = passOf(analysis);
  return {
    name,
    place: parts.place ?? { site: 'Quay Mill', asset: 'East stair', spot: 'Upper rail' },
    sources: parts.sources ?? [],
    results: parts.results ?? [],
    history: parts.history ?? [],
    reading: {
      _id: id,
      v: 1,
      kind: 'reading',
      recordedAt: '2026-11-24T09:42:10.000Z',
      timeZone: 'Europe/Lisbon',
      procedure: analysis.procedure,
      practice: false,
      circumstances: CALM,
      phone: { device: 'device-a', userAgent: 'Example browser 130' },
      sensor,
      rawSha256: '0'.repeat(64),
      rawBytes: 43_210,
      analysis,
      app: { version: '0.1.0', commit: 'example' },
      ...parts.reading,
    },
    recording: {
      startedAt: '2026-11-24T09:42:10.000Z',
      sensor: parts.reading?.sensor ?? sensor,
      axes: ['x', 'y', 'z'],
      timeS: signal.timeS,
      accelerationMps2: signal.axes.map((axis) => Float32Array.from(axis)),
    },
    entity: { id, kind: 'reading', fields: {}, conflicts: {}, trashed: false, ...parts.entity },
    pictures: () => ({
      trace: { timeS: signal.timeS, accelerationMps2: signal.axes },
      spectrum: spectrumOf(signal),
      ringDowns: ringDownsOf(analysis),
      ...(pass ? { pass } : {}),
    }),
  };
}

const walking: Source = { name: 'Visitors', kind: 'footfall', activity: 'walking' };
const roofFan: Source = {
  name: 'Roof fan',
  kind: 'machine',
  speedRpm: 960,
  bladeCount: 6,
  knownBy: 'nameplate',
};

const stairAnalysis = analysisOf('tap', {
  recording: facts(32),
  modes: [mode(7.42, 0.011, { amplitudeMps2: 0.9 }), mode(16.9, 0.02, { amplitudeMps2: 0.4 })],
  tapTimesS: [3.1, 8.4, 13.9, 19.2, 25.0],
  levels: {
    peakMps2: 0.94,
    rmsMps2: 0.12,
    velocityRmsMps: 0.0021,
    velocityPeakMps: 0.018,
    bandHz: [0.6, 26],
    leftOutTones: false,
  },
});

const edits: readonly EditFact[] = [
  {
    _id: 'edit:01JE1',
    v: 1,
    kind: 'edit',
    entity: 'reading:01JEXAMPLESTAIR',
    set: { label: 'Upper rail, third post' },
    over: {},
    device: 'device-a',
    at: '2026-11-24T09:44:00.000Z',
  },
  {
    _id: 'edit:01JE2',
    v: 1,
    kind: 'edit',
    entity: 'reading:01JEXAMPLESTAIR',
    set: { notes: 'Bolt at the foot is loose.' },
    over: {},
    device: 'device-b',
    at: '2026-11-25T15:10:00.000Z',
  },
];

const pumpSources: readonly Source[] = [
  {
    name: 'Pump 2',
    kind: 'machine',
    speedRpm: [1380, 1480],
    bladeCount: 5,
    variableSpeed: true,
    knownBy: 'drive-display',
  },
  { name: 'Motor mains', kind: 'mains', supplyHz: 50, poles: 4 },
];

const many: readonly Source[] = [
  walking,
  { name: 'Runners', kind: 'footfall', activity: 'running' },
  { name: 'Air handler', kind: 'machine', speedRpm: 740, bladeCount: 8, orders: [1, 2] },
  { name: 'Old compressor', kind: 'machine', speedRpm: 580, orders: [0.5, 1, 2, 3] },
  {
    name: 'Drive belt of the air handler',
    kind: 'belt',
    speedRpm: 740,
    pulleyDiameterM: 0.16,
    beltLengthM: 1.8,
  },
  { name: 'Quay road', kind: 'traffic', traffic: 'road' },
  { name: 'Wind on the mast', kind: 'wind', widthM: 0.11, speedMps: [2, 9] },
  { name: 'Motor mains', kind: 'mains', supplyHz: 50, poles: 4 },
];

export const READING_EXAMPLES: readonly ReadingExample[] = [
  example('stair', {
    analysis: stairAnalysis,
    sources: [walking, roofFan],
    entity: { fields: { label: 'Upper rail, third post', notes: 'Bolt at the foot is loose.' } },
    history: edits,
  }),
  example('many', {
    analysis: analysisOf('tap', {
      recording: facts(45),
      modes: [
        mode(8.1, 0.008),
        mode(9.3, 0.018, { amplitudeMps2: 0.6 }),
        mode(12.2, 0.03, { amplitudeMps2: 0.3, doubts: ['one-decay-close-modes'] }),
        mode(21, 0.04, { amplitudeMps2: 0.2, doubts: ['band-edge'] }),
      ],
      tapTimesS: [2, 9, 16, 23, 30, 37],
      doubts: [{ code: 'amplitude-dependent' }],
      trust: 'fair',
    }),
    sources: many,
    place: { site: 'Quay Mill', asset: 'Plant room gallery', spot: 'Grating by the air handler' },
    reading: { circumstances: { ...CALM, surface: 'plate', visibleSway: true } },
  }),
  example('no mode', {
    analysis: analysisOf('tap', {
      recording: facts(24),
      tapTimesS: [4, 11],
      doubts: [{ code: 'few-taps' }, { code: 'low-signal' }],
      trust: 'poor',
    }),
    sources: [walking],
    place: {},
  }),
  example('running', {
    analysis: analysisOf('running', {
      recording: facts(45),
      tones: [
        tone(24.13, 1.24),
        tone(1.92, 0.33, { fold: { verdict: 'folded', candidatesHz: [118.0, 1.92] } }),
        tone(12.06, 0.12, { nature: 'mixed' }),
      ],
      broadPeaks: [{ frequencyHz: 15.2, widthHz: 1.8, rmsMps2: 0.05 }],
      levels: {
        peakMps2: 1.7,
        rmsMps2: 0.92,
        velocityRmsMps: 0.0058,
        velocityPeakMps: 0.0088,
        bandHz: [0.6, 26],
        leftOutTones: true,
      },
      doubts: [{ code: 'folded' }, { code: 'mounting-unknown' }],
      trust: 'fair',
    }),
    sources: pumpSources,
    place: { site: 'Quay Mill', asset: 'Pump 2', spot: 'Base, drive end' },
    reading: { circumstances: { ...CALM, surface: 'plate', excitation: 'machine', machineState: 'running' } },
  }),
  example('ambient', {
    analysis: analysisOf('ambient', {
      recording: facts(360),
      modes: [
        mode(3.24, 0.016, {
          method: 'ambient-likelihood',
          amplitudeMps2: 0.011,
          frequencySdHz: 0.012,
          dampingRatioSd: 0.0035,
          eventCount: 0,
          verticalShare: 0.98,
          halfPower: { dampingRatio: 0.019 },
        }),
      ],
      doubts: [{ code: 'short' }],
      trust: 'fair',
    }),
    sources: [walking],
    place: { site: 'Quay Mill', asset: 'Canal footbridge', spot: 'Mid-span' },
  }),
  example('coastdown', {
    analysis: analysisOf('coastdown', {
      recording: facts(50),
      modes: [mode(11.3, 0.032, { method: 'coastdown-fit', eventCount: 1, amplitudeMps2: 2.1 })],
      coastdown: { startHz: 24.2, endHz: 3.1, sweepRateHzPerS: 0.62, sweepSeverityRatio: 1.19 },
      doubts: [{ code: 'sweep-fast' }],
      trust: 'fair',
    }),
    sources: pumpSources,
    place: { site: 'Quay Mill', asset: 'Pump 2', spot: 'Base, drive end' },
    reading: { circumstances: { ...CALM, machineState: 'slowing' } },
  }),
  example('fold undecided', {
    analysis: analysisOf('tap', {
      modes: [
        mode(22.4, 0.006, {
          fold: { verdict: 'undecided', candidatesHz: [22.4, 37.5, 82.3] },
          doubts: ['fold-undecided'],
        }),
      ],
      tapTimesS: [3, 8, 13],
      doubts: [{ code: 'fold-undecided' }],
      trust: 'fair',
    }),
    sources: [{ name: 'Wheel', kind: 'machine', speedRpm: 2240, bladeCount: 6 }],
  }),
  example('practice', {
    analysis: {
      ...stairAnalysis,
      doubts: [
        { code: 'practice' },
        { code: 'coarse-step' },
        { code: 'gaps', facts: { gapCount: 3 } },
        { code: 'interrupted' },
        { code: 'tap-scatter' },
        { code: 'phone-moved' },
      ],
      recording: facts(14, {
        stepMps2: [0.1, 0.1, 0.1],
        timing: { model: 'mixed', trueShare: 0.4, scatterSdS: 0.0042, gapCount: 3, repeatCount: 61 },
      }),
      trust: 'poor',
    },
    sources: [walking],
    reading: {
      practice: true,
      sensor: { source: 'practice', practice: true, name: 'Practice rig', interruption: 'hidden' },
    },
    entity: {
      fields: { label: 'Post 3' },
      conflicts: {
        label: [
          { edit: 'edit:1', value: 'Post 3', device: 'device-a', at: '2026-11-24T10:00:00.000Z' },
          {
            edit: 'edit:2',
            value: 'Third post, canal side',
            device: 'device-b',
            at: '2026-11-24T10:02:00.000Z',
          },
        ],
      },
    },
  }),
  example('trashed and redone', {
    analysis: stairAnalysis,
    sources: [walking],
    entity: { trashed: true },
    results: [
      {
        _id: 'result:01JR1',
        v: 1,
        kind: 'result',
        reading: 'reading:01JEXAMPLETRASHEDANDREDONE',
        analysisVersion: 2,
        settings: { procedure: 'tap', timing: 'clock' },
        analysis: { ...stairAnalysis, version: 2, modes: [mode(7.45, 0.0125), mode(16.8, 0.021)] },
        at: '2026-11-30T08:00:00.000Z',
      },
    ],
  }),
];
