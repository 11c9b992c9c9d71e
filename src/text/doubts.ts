/** Reasons not to trust a reading fully: what each means and what to do about it. */
import type { Doubt, DoubtCode } from '../core/model/doubt.ts';
import { formatNumber } from './number.ts';

export interface DoubtText {
  readonly name: string;
  readonly meaning: string;
  readonly remedy: string;
}

const DOUBTS: Readonly<Record<DoubtCode, DoubtText>> = {
  'few-taps': {
    name: 'Few taps',
    meaning: 'With fewer than three taps there is no telling how much one differs from the next.',
    remedy: 'Tap three to eight times and let each ring out.',
  },
  'tap-scatter': {
    name: 'Taps disagree',
    meaning: 'Frequency or damping differs more from tap to tap than noise explains.',
    remedy: 'Tap the same place with the same strength; look for a loose part or a support that lifts.',
  },
  'amplitude-dependent': {
    name: 'Depends on strength',
    meaning: 'It rings lower, or is damped more, when it moves more: joints slip or a support works.',
    remedy: 'Compare readings only at like strength; check bolts, fixings and bearings.',
  },
  'near-resolution': {
    name: 'Near the resolution',
    meaning: 'The record is hardly long enough to show damping this light, or to tell two modes apart.',
    remedy: 'Let it ring longer, or record longer.',
  },
  'methods-disagree': {
    name: 'Methods disagree',
    meaning: 'The ring-down fit and its cross-check give different damping beyond their known bias.',
    remedy: 'Repeat the reading; often two modes lie close together, or the phone rocks.',
  },
  'fold-undecided': {
    name: 'True frequency undecided',
    meaning: 'It may be the folded image of a frequency above half the sampling rate.',
    remedy: 'Repeat with another phone or sampling rate: a folded line moves, a true one stays.',
  },
  folded: {
    name: 'Folded',
    meaning: 'The true frequency lies above half the sampling rate; what is shown is its image.',
    remedy: 'Take the true frequency only as likely. Use an instrument with a higher rate to confirm.',
  },
  'coarse-step': {
    name: 'Coarse rounding',
    meaning: 'The browser rounds the sensor to a step that is large against the motion.',
    remedy: 'Excite it more strongly, or use a browser with a finer step.',
  },
  clipped: {
    name: 'Overdriven',
    meaning: 'The sensor reached the end of its range; the strongest motion is cut off.',
    remedy: 'Tap more gently, or further from the phone.',
  },
  gaps: {
    name: 'Gaps',
    meaning: 'Samples are missing in places; only what lies between was used.',
    remedy: 'Close other programs and repeat.',
  },
  repeats: {
    name: 'Repeated samples',
    meaning: 'The sensor delivered the same value more than once; the repeats were taken out.',
    remedy: 'Nothing, unless there are very many: then try another browser.',
  },
  polled: {
    name: 'Polled sensor',
    meaning:
      'The browser read a sensor that runs on its own clock. Side lines this makes were taken out and the loss of strength made good; no true frequency could be decided.',
    remedy: 'Use a browser that hands over the sensor’s own time stamps, and compare.',
  },
  'late-stamps': {
    name: 'Late time stamps',
    meaning:
      'The time stamps tell when samples arrived, not when they were taken; a steady clock was used instead.',
    remedy: 'Nothing for the frequency. Folded lines cannot be told from true ones here.',
  },
  'phone-moved': {
    name: 'Phone moved',
    meaning: 'The phone turned or slid during the recording.',
    remedy: 'Fix it with putty or a strap and repeat.',
  },
  'tilt-leak': {
    name: 'Tilt may leak in',
    meaning: 'Slow sideways motion and slow tilting look alike to the sensor.',
    remedy: 'Lay the phone where it does not tilt; take slow horizontal motion as an upper bound.',
  },
  'contact-loss': {
    name: 'Contact lost',
    meaning: 'The phone left the surface for moments: it rattled.',
    remedy: 'Fix it with putty, a strap or a clamp, or excite more gently.',
  },
  'mounting-unknown': {
    name: 'Mounting not noted',
    meaning: 'It is not known how the phone was held.',
    remedy: 'Note how it lay: laid, strapped, putty, clamp or magnet.',
  },
  'loose-and-strong': {
    name: 'Loose and strong',
    meaning: 'The phone lay loose while the motion was above what friction holds.',
    remedy: 'Fix it, or excite more gently.',
  },
  rocking: {
    name: 'Phone rocks',
    meaning: 'The phone seems to rock on its camera bump or an uneven surface: that rings too.',
    remedy: 'Lay it face down, or on putty, and repeat.',
  },
  short: {
    name: 'Short record',
    meaning: 'The record is short for so slow or so lightly damped a mode.',
    remedy: 'Record longer; four times as long halves the uncertainty.',
  },
  'low-signal': {
    name: 'Weak signal',
    meaning: 'The motion hardly stands out of the sensor’s noise.',
    remedy: 'Excite more strongly, or move to where it shakes most.',
  },
  'band-edge': {
    name: 'At the edge of what is seen',
    meaning: 'The peak lies at the edge of the band that this phone sees; its size and width may be false.',
    remedy: 'Confirm with another phone or an instrument.',
  },
  beating: {
    name: 'Beating',
    meaning: 'Two lines or modes lie so close together that they beat.',
    remedy: 'Record longer; stop one of two like machines if that is safe and allowed.',
  },
  'poor-fit': {
    name: 'Poor fit',
    meaning: 'What was recorded is not a free ring-down of the modes found; something else is in it.',
    remedy: 'Look at the residual; keep hands and people off, and repeat.',
  },
  'phone-mass': {
    name: 'Weight of the phone',
    meaning: 'The phone is heavy against this part: it rings lower with the phone on it than without.',
    remedy: 'The added-mass test tells by how much; a lighter phone shifts it less.',
  },
  'sweep-fast': {
    name: 'Passed too fast',
    meaning: 'The machine passed the resonance too fast for it to build up: the peak is low, late and wide.',
    remedy: 'If the drive allows it, slow down more gradually; or stop it, lock it out and tap.',
  },
  'gravity-scale': {
    name: 'Scale of the sensor',
    meaning: 'At rest the sensor does not read gravity correctly, so amplitudes are off by as much.',
    remedy: 'Frequency and damping are not touched. Check the phone; recalibrate it if it can be.',
  },
  interrupted: {
    name: 'Interrupted',
    meaning: 'The recording was cut before its end.',
    remedy: 'Repeat if it is too short; keep the screen on and the page in front.',
  },
  stalled: {
    name: 'Phone was busy',
    meaning: 'The phone was busy for a moment, which held samples up or lost some.',
    remedy: 'Close other programs and repeat.',
  },
  'half-power-refused': {
    name: 'No half-power check',
    meaning: 'The half-power width could not be read beside the fit.',
    remedy: 'Nothing: the fit does not need it.',
  },
  'one-decay-close-modes': {
    name: 'Close modes in one decay',
    meaning:
      'Several modes lie so close that their sum dies away faster than any of them: damping reads too high.',
    remedy: 'Tap at several spots and directions, or leave the phone for an ambient reading of ten minutes.',
  },
  'running-resonance': {
    name: 'Found while running',
    meaning:
      'This mode was read from random motion of a running machine; a broad hump of the machine can look the same.',
    remedy: 'Stop the machine if that is safe and allowed, and tap, or take an ambient reading.',
  },
  'other-procedure': {
    name: 'Fits another procedure',
    meaning:
      'The record looks like one taken with another of the four procedures; the numbers may rest on the wrong model.',
    remedy: 'Analyse it again with the procedure named here, or with the choice left to the program.',
  },
  practice: {
    name: 'Practice',
    meaning: 'Made with the practice rig, not measured on a structure.',
    remedy: 'Take a reading with a real sensor.',
  },
};

/** Short figures that make a doubt concrete, where the doubt carries them. */
const FIGURES: Readonly<Partial<Record<string, (value: number) => string>>> = {
  tapCount: (value) => `${value} ${value === 1 ? 'tap' : 'taps'}`,
  gapCount: (value) => `${value} ${value === 1 ? 'gap' : 'gaps'}`,
  repeatCount: (value) => `${value} ${value === 1 ? 'repeat' : 'repeats'}`,
  clippedCount: (value) => `${value} samples`,
  durationS: (value) => `${formatNumber(value, 2)} s`,
  shiftRatio: (value) => `${formatNumber(100 * value, 2)} % on a light rail`,
  sensorRateHz: (value) => `sensor at ${formatNumber(value, 4)} Hz`,
  stepMps2: (value) => `step ${formatNumber(value, 2)} m/s²`,
};

/** Which procedure the record looks like. */
const LOOKS_LIKE: Readonly<Record<string, string>> = {
  tap: 'looks like taps',
  running: 'looks like a running machine',
  ambient: 'looks like ambient shaking',
  coastdown: 'looks like a run-down',
};

/** Name, meaning and remedy of a doubt, with its figures where it has them. */
export function doubtText(doubt: Doubt | DoubtCode): DoubtText {
  const { code, facts = {} } = typeof doubt === 'string' ? { code: doubt } : doubt;
  const figures = Object.entries(facts).flatMap(([key, value]) => {
    if (key === 'procedure') return LOOKS_LIKE[value] ?? [];
    const say = FIGURES[key];
    return say && typeof value === 'number' ? [say(value)] : [];
  });
  const text = DOUBTS[code];
  return figures.length === 0 ? text : { ...text, name: `${text.name} (${figures.join(', ')})` };
}
