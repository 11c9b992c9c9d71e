/** Words of the printed report and of the files that go with it. Plain language first; the trade's detail after. */
import type { Procedure } from '../core/model/analysis.ts';
import { INDICATIVE_LINE } from './indicative.ts';

const count = (n: number, one: string, many: string) => `${n} ${n === 1 ? one : many}`;

/** How the numbers came about, by procedure. */
const METHODS: Readonly<Record<Procedure, string>> = {
  tap: 'Taps were found in the samples. From each, the free ring-down after the contact was taken; all of them were fitted jointly as sums of decaying oscillations (nonlinear least squares on the true time stamps, with a background tone where the data ask for one). The uncertainty is the larger of what the noise allows and what the taps show among themselves. Half-power width and logarithmic decrement stand beside it as cross-checks only.',
  running:
    'Steady lines were told from the noise in the spectrum and refined on the true time stamps. Lines of a running machine are called tones, never modes. Velocity and displacement are integrated in the frequency domain within the band that the phone sees, folded and undecided tones left out.',
  ambient:
    'Modes under random excitation were fitted to the averaged spectra by maximum likelihood (Whittle), with standard deviations from the curvature of the likelihood.',
  coastdown:
    'The falling line of the machine was followed; the amplitude and phase along it were fitted with the response of a damped oscillator to a swept excitation, so that the sweep rate is taken into account.',
};

export const reportText = {
  kindOfPaper: 'Vibration survey',
  title: (site: string | undefined) => site ?? 'Vibration survey',
  count: (n: number) => count(n, 'reading', 'readings'),
  made: (at: string) => `Report made ${at}`,
  madeWith: (version: string, commit: string, analysisVersion: number) =>
    `Thrumbook ${version} (${commit}), analysis version ${analysisVersion}`,
  practiceShort: 'Practice.',
  practice: 'Practice: made on a simulated phone, not on a structure.',
  inShort: 'In short',
  lead: 'Each line says at what frequency a spot rings by itself or hums, what shakes it near that frequency, and how far to trust it.',
  specialistLead: 'Call a specialist',
  noSpot: 'No spot named',
  trust: { good: 'Trust good', fair: 'Trust fair', poor: 'Trust poor' },
  verdict: 'What drives it',
  noSources: 'No source of shaking was entered, so nothing is said about what drives it.',
  found: 'What was found',
  mode: (n: number, of: number) => (of === 1 ? 'It rings at' : `Mode ${n}`),
  tone: (n: number) => `Tone ${n}`,
  damping: 'Damping',
  amplification: 'Amplified',
  ladder: 'The ladder',
  ladderNote:
    'Frequency runs upwards. Left: what the structure does; the longer the point, the more it amplifies. Right: what shakes it. Hatched: what this recording could not see.',
  levels: 'How strong the shaking is',
  waysOut: 'What would move it apart',
  doubts: 'Doubts, and what to do about them',
  noDoubts: 'None.',
  notes: 'Notes',
  photo: (n: number, where: string) => `Photo ${n}, ${where}`,
  detail: 'For the engineer',
  modes: 'Modes',
  modeHead: [
    '',
    'Frequency',
    'Damping ratio',
    'Largest',
    'Along gravity',
    'Cross-checks of damping',
    'Appears',
    'Method',
  ],
  halfPower: 'Half-power:',
  logDecrement: 'Log decrement:',
  tones: 'Tones',
  toneHead: ['', 'Frequency', 'Amplitude', 'What fits', 'Appears'],
  pairs: 'Modes against forcings',
  pairHead: ['Verdict', 'Forcing', 'Its frequency and where that comes from', 'Mode', 'Ratio', 'Amplified'],
  morePairs: (n: number) => `${count(n, 'more pair', 'more pairs')}, all apart, left out here.`,
  unpaired: 'Forcings without a mode near',
  spectrum: 'Spectrum',
  spectrumNote: 'Largest of the axes at each frequency. Dashed: modes and tones.',
  ringDown: 'A ring-down and its fit',
  ringDownNote: 'Dots: measured, along the mode. Line: the joint fit of all ring-downs.',
  pass: 'The pass through resonance',
  passNote: 'Dots: measured. Line: fitted.',
  circumstances: 'Circumstances',
  sensor: 'What the sensor gave',
  check: 'Check of the phone',
  checkRows: {
    at: 'Checked',
    sees: 'Band it can see',
    smallest: 'Smallest steady tone',
    rate: 'Samples',
    gravity: 'Gravity as it reads it',
  },
  noCheck: 'This phone had not been checked at rest before the reading.',
  method: 'Method',
  methodOf: (procedure: Procedure) => METHODS[procedure],
  provenance: 'To check this reading',
  provenanceRows: {
    id: 'Reading',
    recorded: 'Recorded',
    samples: 'SHA-256 of the raw samples',
    analysis: 'Analysis',
    app: 'Recorded with',
    settings: 'Settings',
  },
  analysisMade: (version: number, redoneAt: string | undefined) =>
    redoneAt ? `version ${version}, redone ${redoneAt}` : `version ${version}, as first made`,
  howToRead: 'How to read this',
  howTo: [
    'A natural frequency is where a thing shakes by itself when struck; damping says how fast that dies away. A source at that frequency makes it shake much more than its force alone would.',
    'Ratio is forcing frequency over natural frequency. Coincident: the forcing falls on the mode. Close: near enough to matter. Apart: little amplification from this pair. Undecided: the uncertainty spans both. Blind: this recording could not see it.',
    '“No mode found” means none was found here. It never means there is none.',
    'A phone sees a limited band, and its browser rounds. Levels are lower bounds in the band stated, and show compliance with no limit.',
  ],
  opens:
    'This page carries its readings with all raw samples. Open it in Thrumbook (Hand over, Take in) to look into them, or run the analysis command on it: the numbers must come out equal.',
  listOnly: (n: number) =>
    `The packet around this page holds ${count(n, 'reading', 'readings')}; here is their list. Open the packet in Thrumbook to look into them and to print a report of those that matter.`,
  listHead: ['When', 'Where', 'What was found', 'Trust'],
  /** Below a chart that leaves by itself. */
  chartFoot: (isPractice: boolean) => `${isPractice ? 'Practice. ' : ''}${INDICATIVE_LINE}`,
  /** Above the samples of a recording; no words that could be taken for a heading of columns. */
  remarks: (reading: string) => [INDICATIVE_LINE, `${reading} as the sensor gave it with gravity included`],
} as const;
