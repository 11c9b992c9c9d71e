/*
 * What the practice rig can be told, as a query: ?rig=handrail&f=7.4&damping=1.2&taps=5&step=0.1
 * The same table serves the address bar, tests and a panel of sliders.
 */

export interface RigParameter {
  readonly key: string;
  readonly unit: string;
  readonly meaning: string;
  readonly least: number;
  readonly most: number;
}

const parameter = (
  key: string,
  unit: string,
  least: number,
  most: number,
  meaning: string,
): RigParameter => ({
  key,
  unit,
  meaning,
  least,
  most,
});

/** Every number that can be set, with bounds. `f` and `damping` take lists for several modes: 7.4,11.2 */
export const RIG_PARAMETERS = [
  parameter('f', 'Hz', 0.1, 200, 'natural frequency of each mode'),
  parameter('damping', '%', 0.05, 50, 'damping ratio of each mode'),
  parameter('taps', '', 0, 1000, 'taps given once recording starts'),
  parameter('every', 's', 0.5, 60, 'time between taps'),
  parameter('strength', 'm/s²', 0, 50, 'acceleration of the first mode right after a tap'),
  parameter('contact', 'ms', 0, 30, 'how long a tap touches; 0: a perfect blow'),
  parameter('speed', 'rpm', 0, 60_000, 'shaft speed of a machine on it'),
  parameter('unbalance', 'm/s²', 0, 50, 'excitation by the machine at that speed'),
  parameter('coast', 's', 0, 600, 'time the machine needs to stop; 0: it keeps running'),
  parameter('ambient', 'm/s²', 0, 10, 'random excitation: rms of the first mode'),
  parameter('noise', 'm/s²', 0, 1, 'sensor noise, rms of each sample'),
  parameter('step', 'm/s²', 0, 1, 'rounding step of the sensor'),
  parameter('range', 'g', 1, 32, 'full scale of the sensor'),
  parameter('rate', '/s', 5, 400, 'samples a second'),
  parameter('jitter', 'ms', 0, 10, 'true scatter of the sampling'),
  parameter('late', 'ms', 0, 20, 'lateness of the stamps, on average'),
  parameter('gaps', '/min', 0, 60, 'losses of samples, 0.3 s each'),
  parameter('handling', 's', 0, 30, 'how long the laying down shakes it'),
  parameter('tilt', 'deg', 0, 90, 'how far the phone lies out of level'),
  parameter('fail', 's', 0, 3600, 'time until the sensor fails; 0: never'),
  parameter('pace', '', 0.1, 200, 'how many times faster than real time'),
  parameter('seed', '', 0, 4_294_967_295, 'number that fixes all chance'),
] as const satisfies readonly RigParameter[];

export interface RigParameters {
  readonly modes: readonly { readonly frequencyHz: number; readonly dampingRatio: number }[];
  readonly tapCount: number;
  readonly tapIntervalS: number;
  readonly tapStrengthMps2: number;
  readonly contactS: number;
  readonly speedRpm: number;
  readonly unbalanceMps2: number;
  readonly coastS: number;
  readonly ambientMps2: number;
  readonly noiseMps2: number;
  readonly stepMps2: number;
  readonly rangeMps2: number;
  readonly rateHz: number;
  readonly jitterS: number;
  readonly lateS: number;
  readonly gapsPerMinute: number;
  readonly handlingS: number;
  readonly tiltRad: number;
  readonly failS: number;
  readonly paceRatio: number;
  readonly seed: number;
}

const ORDINARY = {
  f: '7.4',
  damping: '1.2',
  taps: '5',
  every: '4',
  strength: '1.5',
  contact: '8',
  speed: '0',
  unbalance: '0',
  coast: '0',
  ambient: '0.004',
  noise: '0.02',
  step: '0',
  range: '8',
  rate: '60',
  jitter: '1',
  late: '0',
  gaps: '0',
  handling: '1.5',
  tilt: '2',
  fail: '0',
  pace: '1',
  seed: '1',
} as const;

/** Invented structures, each showing one procedure. */
export const RIG_PRESETS = {
  handrail: { f: '7.4,11.9', damping: '1.2,1.6' },
  pump: {
    f: '18.6,23.5',
    damping: '2.5,2',
    taps: '0',
    speed: '970',
    unbalance: '0.4',
    noise: '0.03',
    handling: '2',
  },
  footbridge: { f: '2.1,4.7', damping: '0.7,1.1', taps: '0', ambient: '0.05', noise: '0.012', handling: '1' },
  fan: {
    f: '11.3',
    damping: '1.8',
    taps: '0',
    speed: '1380',
    unbalance: '0.5',
    coast: '40',
    ambient: '0.01',
  },
} as const satisfies Readonly<Record<string, Partial<Record<keyof typeof ORDINARY, string>>>>;
export type RigName = keyof typeof RIG_PRESETS;

/** Parameters of a rig from a query; what is missing comes from the preset, what is out of bounds is moved inside. */
export function parseRigParameters(query: string): RigParameters {
  const given = new URLSearchParams(query);
  const name = given.get('rig') ?? 'handrail';
  const preset: Partial<Record<string, string>> = Object.hasOwn(RIG_PRESETS, name)
    ? RIG_PRESETS[name as RigName]
    : RIG_PRESETS.handrail;
  const list = (key: keyof typeof ORDINARY): readonly number[] => {
    const texts = [given.get(key), preset[key], ORDINARY[key]];
    return texts.map((text) => numbersIn(text, key)).find((numbers) => numbers.length > 0) ?? [0];
  };
  const one = (key: keyof typeof ORDINARY): number => list(key)[0]!;
  const dampings = list('damping');
  return {
    modes: list('f').map((frequencyHz, i) => ({
      frequencyHz,
      dampingRatio: (dampings[i] ?? dampings.at(-1)!) / 100,
    })),
    tapCount: Math.round(one('taps')),
    tapIntervalS: one('every'),
    tapStrengthMps2: one('strength'),
    contactS: one('contact') / 1000,
    speedRpm: one('speed'),
    unbalanceMps2: one('unbalance'),
    coastS: one('coast'),
    ambientMps2: one('ambient'),
    noiseMps2: one('noise'),
    stepMps2: one('step'),
    rangeMps2: one('range') * 9.80665,
    rateHz: one('rate'),
    jitterS: one('jitter') / 1000,
    lateS: one('late') / 1000,
    gapsPerMinute: one('gaps'),
    handlingS: one('handling'),
    tiltRad: (one('tilt') * Math.PI) / 180,
    failS: one('fail'),
    paceRatio: one('pace'),
    seed: Math.round(one('seed')),
  };
}

function numbersIn(text: string | null | undefined, key: string): readonly number[] {
  const bounds = RIG_PARAMETERS.find((one) => one.key === key)!;
  return (text ?? '')
    .split(',')
    .filter((part) => part.trim() !== '')
    .map(Number)
    .filter(Number.isFinite)
    .slice(0, 6)
    .map((value) => Math.min(bounds.most, Math.max(bounds.least, value)));
}
