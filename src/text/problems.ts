/** Why a recording, file or source cannot be answered, and what to do. */
import type { Problem, ProblemCode } from '../core/model/problem.ts';
import { formatNumber } from './number.ts';

type Facts = Problem['facts'];
const text = (facts: Facts, key: string): string => String(facts[key] ?? '');
const number = (facts: Facts, key: string): string | undefined =>
  typeof facts[key] === 'number' ? formatNumber(facts[key], 3) : undefined;
const whole = (facts: Facts, key: string): string | undefined =>
  typeof facts[key] === 'number' ? String(Math.round(facts[key])) : undefined;
const row = (facts: Facts): string => (whole(facts, 'row') ? `Row ${whole(facts, 'row')}: ` : '');
const capital = (sentence: string): string => sentence.charAt(0).toUpperCase() + sentence.slice(1);

const UNREADABLE: Readonly<Record<string, string>> = {
  'not-text': 'This file holds no text that could be read as a table.',
  'not-json': 'This file is not valid JSON.',
  missing: 'There is no file of this name.',
  'not-found': 'There is no file of this name.',
  'no-permission': 'This file may not be read: check its permissions.',
  directory: 'This is a folder, not a file.',
  'no-such-file': 'There is no file of this name.',
  'is-a-folder': 'This is a folder, not a file.',
  'not-allowed': 'This file may not be read: check its permissions.',
  'no-packet': 'This is no packet and carries none.',
};

function badHeader(facts: Facts): string {
  const missing = facts['missing'];
  if (missing === 'time')
    return `${row(facts)}no time column found. Name one "time" with its unit, for example "time (s)".`;
  if (missing === 'acceleration')
    return `${row(facts)}no acceleration column found. Name them x, y, z or "ax (m/s²)".`;
  return `${row(facts)}the heading could not be understood. It needs a time column and one to three acceleration columns.`;
}

const CELL: Readonly<Record<string, string>> = {
  'not-a-number': 'is not a number',
  'not-a-time': 'is not a time',
  'surplus-cell': 'is one cell too many',
  'missing-cell': 'is missing',
};

function badRow(facts: Facts): string {
  const found = facts['found'] === undefined || facts['found'] === '' ? '' : ` ("${text(facts, 'found')}")`;
  const cell = `column ${text(facts, 'column')}${found} ${CELL[text(facts, 'reason')] ?? 'cannot be read'}`;
  return `${row(facts)}${cell}. Nothing was stored; correct the row or leave it out.`;
}

const FIELD_NAMES: Readonly<Record<string, string>> = {
  speedRpm: 'the speed',
  frequencyHz: 'the frequency',
  paceHz: 'the pace',
  toleranceRatio: 'the tolerance',
  bladeCount: 'the number of blades',
  toothCount: 'the number of teeth',
  ballCount: 'the number of balls',
  cylinders: 'the number of cylinders',
  orders: 'the orders',
  diameterRatio: 'ball diameter over pitch diameter',
  pulleyDiameterM: 'the pulley diameter',
  beltLengthM: 'the belt length',
  speedMps: 'the wind speed',
  widthM: 'the width',
  depthM: 'the depth',
  massPerLengthKgPerM: 'the mass per length',
  strouhalRatio: 'the Strouhal number',
  stepCount: 'the number of steps',
  peopleCount: 'the number of people',
  harmonics: 'the number of harmonics',
};

/** Why a source cannot be; after the name of the field. */
const SOURCE_REASONS: Readonly<Record<string, string>> = {
  'not-positive': 'must be above zero',
  'too-large': 'is too large',
  'range-reversed': 'has its lower end above its upper end',
  'not-whole': 'must be a whole number',
  'pace-impossible': 'is not one that people can keep (0.2 to 6 Hz)',
  'above-synchronous': 'is above the synchronous speed of this motor: check poles and supply',
  'tolerance-out-of-range': 'must lie between 0 and a half',
  'belt-shorter-than-pulley': 'is too short to go round the pulley',
  'ratio-out-of-range': 'must lie between 0 and 1',
  'strouhal-needed': 'is needed for a shape of your own',
  'not-a-list': 'must be a list of sources',
  'not-an-object': 'must be a source with name and kind',
  missing: 'is missing',
  'not-text': 'must be a short text',
  'not-a-number': 'must be a number',
  'not-a-number-or-range': 'must be a number, or a range of two numbers',
  'not-yes-or-no': 'must be true or false',
  'not-a-list-of-numbers': 'must be a list of numbers',
  'unknown-word': 'is not one of the known words',
  'unknown-field': 'is not a field of this kind of source',
  'too-many': 'holds too many sources',
};

function badSource(facts: Facts): string {
  const field = text(facts, 'field');
  if (field === '') return 'This source cannot be used.';
  const where = facts['name'] === undefined ? '' : `${text(facts, 'name')}: `;
  const source =
    whole(facts, 'row') === undefined || facts['row'] === 0 ? '' : `Source ${whole(facts, 'row')}: `;
  const bound = number(facts, 'bound');
  const limit = bound === undefined ? '' : ` (limit ${bound})`;
  const what = FIELD_NAMES[field] ?? `"${field}"`;
  const why = SOURCE_REASONS[text(facts, 'reason')] ?? 'cannot be';
  const body = `${what} ${why}${limit}.`;
  const head = `${source}${where}`;
  return head === '' ? capital(body) : `${head}${body}`;
}

const seconds = (facts: Facts): string =>
  number(facts, 'durationS') ? `${number(facts, 'durationS')} s` : 'this';

const SENTENCES: Readonly<Record<ProblemCode, (facts: Facts) => string>> = {
  'unreadable-file': (facts) => UNREADABLE[text(facts, 'reason')] ?? 'This file could not be read.',
  'no-samples': () => 'There are no samples in it.',
  'too-short': (facts) =>
    `Too short: ${seconds(facts)} is not enough for an answer. Record at least 20 s, longer for slow or lightly damped things.`,
  'irregular-sampling': () =>
    'The samples came too irregularly to be used. Close other programs and pages, then record again.',
  'no-motion': () =>
    'Nothing moved beyond the sensor’s own noise. Tap harder, or lay the phone nearer to where it shakes most.',
  'no-taps': () => 'No taps were found. Tap three to eight times, each clearly, and let each ring out.',
  'no-decay': () =>
    'There were taps but nothing rang after them. It may be too well damped, too stiff for this phone, or the phone lay loose.',
  'no-mode': () =>
    'No mode could be told from the noise. Record longer, at a quieter time or nearer to the middle.',
  'no-tone': () =>
    'No steady tone was found. Check that the machine was running and that the phone lay firmly on it.',
  'no-pass': () =>
    'No falling line of a machine slowing down was found. Start recording before it is switched off.',
  'pass-incomplete': () =>
    'The machine did not pass right through a resonance while recording. Start earlier, and record until it stands still.',
  'clipped-throughout': () =>
    'The sensor was overdriven most of the time. Tap more gently, or move to a quieter spot.',
  'no-resolution': () =>
    'The sensor’s rounding step is larger than the motion. Excite it more strongly, or use a phone or browser with a finer step.',
  'folded-sweep': () =>
    'The run-down began above half the sampling rate and could not be unfolded. Start recording at a lower speed.',
  'bad-header': badHeader,
  'bad-row': badRow,
  'bad-unit': (facts) =>
    `${row(facts)}the unit "${text(facts, 'unit')}" of column ${text(facts, 'column')} is not known. Use s, ms, µs or ns for time; m/s², g or mg for acceleration.`,
  'time-not-increasing': (facts) =>
    `${row(facts)}time runs backwards here. Nothing was stored; sort the rows by time.`,
  'too-large': (facts) => {
    const largest = whole(facts, 'maxCount');
    return `Too large${largest ? `: more than ${largest} samples` : ''}. Cut it into shorter recordings.`;
  },
  'newer-version': () => 'This was written by a newer version of Thrumbook. Update, then open it again.',
  damaged: () =>
    'It is damaged: what it says about itself does not fit what is in it. Nothing was taken from it.',
  cancelled: () => 'Cancelled. Nothing was changed.',
  'bad-source': badSource,
  'mass-shift-unclear': () =>
    'The added mass did not lower the frequency by clearly more than its uncertainty. Use a heavier mass, fixed firmly, or more taps.',
  'too-few-readings': (facts) =>
    `Too few readings for this: ${whole(facts, 'count') ?? 'these'} of at least ${whole(facts, 'needed') ?? 'two'}.`,
};

/** Which procedure would fit, where the analysis recognised one. */
const FITTING: Readonly<Record<string, string>> = {
  tap: ' The record looks like taps: analyse it as a tap test.',
  running: ' The record looks like a running machine: analyse it as one.',
  coastdown: ' The record looks like a machine slowing down: analyse it as a coast-down.',
};

/** One to three sentences: what is wrong, and what to do. */
export const problemSentence = ({ code, facts }: Problem): string =>
  `${capital(SENTENCES[code](facts))}${FITTING[text(facts, 'fitting')] ?? ''}`;
