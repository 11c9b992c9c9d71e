import type { FoldedForcing } from '../core/model/folded-forcing.ts';
import type { Separation } from '../core/model/judgement.ts';
import type { FootfallActivity, Forcing, KnownBy, SourceKind } from '../core/model/source.ts';
import { formatInterval } from './number.ts';
import { formatFrequencyRange } from './quantity.ts';

const ORDINALS = ['zeroth', 'first', 'second', 'third', 'fourth', 'fifth', 'sixth', 'seventh', 'eighth'];
export const ordinalWord = (order: number): string => ORDINALS[order] ?? `${order}th`;

const ACTIVITIES: Readonly<Record<FootfallActivity, string>> = {
  walking: 'walking',
  running: 'running',
  stairs: 'walking on stairs',
  jumping: 'jumping',
  dancing: 'dancing',
  sway: 'swaying people',
};
export const activityWord = (activity: FootfallActivity): string => ACTIVITIES[activity];

const KINDS: Readonly<Record<SourceKind, string>> = {
  machine: 'rotating or reciprocating machine',
  belt: 'belt drive',
  mains: 'electric motor on the mains',
  footfall: 'people',
  wind: 'wind',
  traffic: 'traffic',
  band: 'frequency or band',
};
export const sourceKindName = (kind: SourceKind): string => KINDS[kind];

const UNNAMED: Readonly<Record<SourceKind, string>> = {
  machine: 'Machine',
  belt: 'Belt drive',
  mains: 'Motor',
  footfall: 'People',
  wind: 'Wind',
  traffic: 'Traffic',
  band: 'Known frequency',
};
/** What a source is called that nobody named: short, since it stands in sentences and beside the ladder. */
export const unnamedSource = (kind: SourceKind): string => UNNAMED[kind];

export const isUnnamed = ({ source, sourceKind }: Forcing): boolean => source === UNNAMED[sourceKind];

const KNOWN: Readonly<Record<KnownBy, string>> = {
  nameplate: 'read from the nameplate',
  'drive-display': 'read from the drive display',
  tachometer: 'measured with a tachometer',
  strobe: 'measured with a strobe lamp',
  counted: 'counted',
  estimate: 'an estimate',
  unknown: 'not known how',
};
export const knownByName = (knownBy: KnownBy): string => KNOWN[knownBy];

const TIMES: Readonly<Record<string, string>> = {
  '0.5': 'half',
  '2': 'twice',
  '3': 'three times',
  '4': 'four times',
};
const timesSpeed = (order: number): string => TIMES[order] ?? `${Number(order.toFixed(2))} times`;

function footfallName(forcing: Forcing): string {
  const activity = activityWord(forcing.activity ?? 'walking');
  if (forcing.role === 'sway') return 'the sway of people from side to side';
  if (forcing.order < 1) return `the sideways push of ${activity}, at half the step rate`;
  return forcing.order === 1
    ? `the step rate of ${activity}`
    : `the ${ordinalWord(forcing.order)} harmonic of ${activity}`;
}

/** The forcing in words, to stand inside a sentence: "the third harmonic of walking", "the running speed of Pump A". */
export function forcingName(forcing: Forcing): string {
  const of = isUnnamed(forcing) ? `the ${forcing.source.toLowerCase()}` : forcing.source;
  switch (forcing.role) {
    case 'shaft':
      return `the running speed of ${of}`;
    case 'shaft-order':
      return `${timesSpeed(forcing.order)} the running speed of ${of}`;
    case 'blade-pass':
      return `the blade-pass frequency of ${of}`;
    case 'gear-mesh':
      return `the gear-mesh frequency of ${of}`;
    case 'firing':
      return `the firing frequency of ${of}`;
    case 'bearing-outer':
      return `the outer-race frequency of the bearing of ${of}`;
    case 'bearing-inner':
      return `the inner-race frequency of the bearing of ${of}`;
    case 'bearing-cage':
      return `the cage frequency of the bearing of ${of}`;
    case 'bearing-ball':
      return `the ball frequency of the bearing of ${of}`;
    case 'belt-pass':
      return `the belt frequency of ${of}`;
    case 'belt-pass-second':
      return `twice the belt frequency of ${of}`;
    case 'twice-line':
      return `twice the supply frequency at ${of}`;
    case 'motor-shaft':
      return `the shaft speed of ${of}`;
    case 'pole-pass':
      return `the pole-pass frequency of ${of}`;
    case 'step':
    case 'sway':
      return footfallName(forcing);
    case 'vortex':
      return isUnnamed(forcing) ? 'vortex shedding in the wind' : `vortex shedding in the wind (${of})`;
    case 'road-traffic':
      return isUnnamed(forcing) ? 'road traffic' : `road traffic (${of})`;
    case 'rail-traffic':
      return isUnnamed(forcing) ? 'rail traffic' : `rail traffic (${of})`;
    case 'band':
      return forcing.order === 1 ? of : `the ${ordinalWord(forcing.order)} harmonic of ${of}`;
  }
}

const EDGES: Readonly<Record<FoldedForcing['edge'], string>> = {
  'half-rate': ', at half the sampling rate, where its size cannot be read',
  zero: ', next to zero, where its size cannot be read',
  none: '',
};

/** Told before recording: what this phone would show in the wrong place. */
export function foldedForcingSentence(folded: FoldedForcing): string {
  const name = forcingName(folded.forcing);
  const where = formatFrequencyRange(folded.imageHz, 'Hz', 2);
  return `${name.charAt(0).toUpperCase()}${name.slice(1)} lies above what this phone samples: it would show at ${where}${EDGES[folded.edge]}.`;
}

/** Vortex shedding at a mode: the wind speed that does it, and the Scruton number where the mass is known. */
export function windSentence(wind: NonNullable<Separation['wind']>): string {
  const speed = `Vortices shed at this mode in a wind of ${formatInterval(wind.criticalSpeedMps, 2)} m/s.`;
  return wind.scrutonRatio ? `${speed} Scruton number ${formatInterval(wind.scrutonRatio, 2)}.` : speed;
}

/** Where its numbers come from, with the warning where they are less than sure. */
export const forcingOrigin = (forcing: Forcing): string =>
  forcing.certain ? forcing.origin : `${forcing.origin} (${CHECK_THE_STANDARD})`;

/** Follows every published value that is not sure. */
export const CHECK_THE_STANDARD = 'check against the standard';
