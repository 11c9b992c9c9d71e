import type { LadderContent, LadderForcing } from '../../src/core/picture/ladder-content.ts';

const words: LadderContent['words'] = {
  blindAbove: 'blind above 26 Hz on this phone',
  blindBelow: 'blind below 0.6 Hz',
  noMode: 'No mode found here. That does not mean there is none.',
  structure: 'structure',
  sources: 'sources',
  unit: 'Hz',
  amplification: 'amplification of a steady force',
};

const stair: LadderContent = {
  words,
  seenHz: [0.6, 26],
  rateHz: 60,
  modes: [
    {
      id: 'm0',
      frequencyHz: 7.42,
      frequencySdHz: 0.015,
      dampingRatio: 0.011,
      title: '7.42 Hz ± 0.03',
      detail: '1.1 % ± 0.2',
    },
    {
      id: 'm1',
      frequencyHz: 16.9,
      frequencySdHz: 0.3,
      dampingRatio: 0.02,
      title: '16.9 Hz ± 0.6',
      detail: '2.0 % ± 0.5',
    },
  ],
  forcings: [
    { id: 'f0', label: 'walking 1st', frequencyHz: [1.6, 2.4], verdict: 'apart', modeId: 'm0' },
    { id: 'f1', label: 'walking 2nd', frequencyHz: [3.2, 4.8], verdict: 'apart', modeId: 'm0' },
    { id: 'f2', label: 'walking 3rd', frequencyHz: [4.8, 7.2], verdict: 'coincident', modeId: 'm0' },
    { id: 'f3', label: 'roof fan 1×', frequencyHz: [15.8, 16.2], verdict: 'close', modeId: 'm1' },
    { id: 'f4', label: 'roof fan 3×', frequencyHz: [47.4, 48.6], verdict: 'blind' },
  ],
  tones: [],
  broadPeaks: [],
};

const verdicts = ['apart', 'close', 'coincident', 'undecided', 'apart'] as const;
const plant: LadderContent = {
  words,
  seenHz: [0.6, 26],
  rateHz: 60,
  modes: [8.1, 9.3, 12.2, 21].map((frequencyHz, i) => ({
    id: `m${i}`,
    frequencyHz,
    frequencySdHz: 0.02 + i * 0.05,
    dampingRatio: 0.008 + i * 0.012,
    title: `${frequencyHz.toFixed(1)} Hz ± 0.${i + 1}`,
    detail: `${(0.8 + 1.2 * i).toFixed(1)} % ± 0.${i + 2}`,
  })),
  forcings: Array.from({ length: 20 }, (_, i): LadderForcing => {
    const frequencyHz = 1.5 * 1.21 ** i;
    const verdict = frequencyHz > 26 ? 'blind' : verdicts[i % 5]!;
    return {
      id: `f${i}`,
      label: `${['walking', 'pump', 'air handler', 'roof fan'][i % 4]} ${(i % 6) + 1}×`,
      frequencyHz: [frequencyHz * 0.96, frequencyHz * (i % 4 === 0 ? 1.3 : 1.02)],
      verdict,
      modeId: 'm0',
    };
  }),
  tones: [],
  broadPeaks: [],
};

const running: LadderContent = {
  words: { ...words, noMode: 'A running machine shows its own lines. Stop it and tap to find modes.' },
  seenHz: [0.6, 26],
  rateHz: 60,
  modes: [],
  forcings: [
    { id: 'f0', label: 'pump 1×', frequencyHz: [23.8, 24.8] },
    { id: 'f1', label: 'pump vanes 5×', frequencyHz: [119, 124], verdict: 'blind' },
    { id: 'f2', label: 'motor twice mains', frequencyHz: [99.9, 100.1], verdict: 'blind' },
  ],
  tones: [
    { id: 't0', label: '24.3 Hz, 1.2 m/s²', frequencyHz: 24.3 },
    { id: 't1', label: '20.1 Hz, folded', frequencyHz: 20.1 },
  ],
  broadPeaks: [{ frequencyHz: 13, widthHz: 2.2 }],
};

const trying: LadderContent = {
  ...stair,
  modes: [
    { ...stair.modes[0]!, frequencyHz: 9.2, title: '9.20 Hz', beforeHz: 7.42 },
    { ...stair.modes[1]!, frequencyHz: 20.9, title: '20.9 Hz', beforeHz: 16.9 },
  ],
  forcings: stair.forcings.map((f) => ({ ...f, verdict: f.verdict === 'blind' ? 'blind' : 'apart' })),
};

const folded: LadderContent = {
  ...stair,
  modes: [
    {
      id: 'm0',
      frequencyHz: 22.4,
      frequencySdHz: 0.02,
      dampingRatio: 0.006,
      title: '22.4 Hz or 37.6',
      detail: 'fold undecided',
      isUnsure: true,
      candidatesHz: [37.6, 82.4],
    },
  ],
  forcings: [
    { id: 'f0', label: 'fan 1×', frequencyHz: [36, 38], verdict: 'undecided', modeId: 'm0' },
    { id: 'f1', label: 'fan blades', frequencyHz: [215, 225], verdict: 'blind' },
  ],
};

export const LADDER_EXAMPLES: readonly { name: string; content: LadderContent; first: readonly string[] }[] =
  [
    { name: 'stair', content: stair, first: ['m0', 'f2'] },
    { name: 'plant with twenty forcings', content: plant, first: [] },
    { name: 'running pump', content: running, first: [] },
    { name: 'stiffer stair', content: trying, first: [] },
    { name: 'folded', content: folded, first: ['m0', 'f0'] },
    {
      name: 'sources only',
      content: {
        words,
        forcings: stair.forcings.map(({ verdict: _, ...f }) => f),
        modes: [],
        tones: [],
        broadPeaks: [],
      },
      first: [],
    },
  ];
