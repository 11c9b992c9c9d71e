import type { Criterion, LevelFinding, LevelReason, Measure } from '../core/model/judgement.ts';
import { formatInterval, formatNumber } from './number.ts';
import { CHECK_THE_STANDARD } from './sources.ts';

const CRITERIA: Readonly<Record<Criterion, string>> = {
  'iso-20816-3': 'ISO 20816-3, machine vibration on bearing housings',
  'iso-10816-1': 'ISO 10816-1, small machines',
  'iso-10816-7': 'ISO 10816-7, pumps',
  'din-4150-3': 'DIN 4150-3, buildings, short-term',
  'din-4150-3-long-term': 'DIN 4150-3, buildings, long-term',
  'bs-7385-2': 'BS 7385-2, cosmetic damage to buildings',
  'iso-2631-1': 'ISO 2631-1, comfort',
  'iso-10137': 'ISO 10137, people in buildings',
  'en-1990': 'EN 1990, footbridge comfort',
  hivoss: 'HIVOSS, footbridge comfort classes',
  setra: 'Sétra, footbridge comfort',
  'aisc-dg11': 'AISC design guide 11, floors',
};
export const criterionName = (criterion: Criterion): string => CRITERIA[criterion];

const MEASURES: Readonly<Record<Measure, string>> = {
  'velocity-rms': 'rms velocity',
  'displacement-rms': 'rms displacement',
  'velocity-peak': 'peak velocity of the largest axis',
  'velocity-peak-horizontal': 'peak horizontal velocity',
  'acceleration-peak-vertical': 'peak vertical acceleration',
  'acceleration-peak-horizontal': 'peak horizontal acceleration',
  'equivalent-sine-peak': 'equivalent sinusoidal peak acceleration',
  'weighted-rms': 'frequency-weighted rms acceleration',
  'response-factor': 'response factor',
};
export const measureName = (measure: Measure): string => MEASURES[measure];

const REASONS: Readonly<Record<LevelReason, string>> = {
  'band-partly-seen': 'the phone sees only part of the band that this criterion needs',
  'folded-left-out': 'folded or undecided tones were left out',
  'folded-in-acceleration': 'folded or undecided tones are in the acceleration at a false frequency',
  'no-value': 'the reading holds no value for it',
  'class-unknown': 'the class is not known: enter what the spot is',
  'loading-not-presumed': 'it is not said that the crowd or walker which the criterion presumes was there',
  'crest-factor': 'there are shocks in it: the rms understates them',
  'no-dominant-frequency': 'there is no clear frequency to read the guide value at',
  'lines-only': 'only the lines told from the noise are counted',
  'wider-band': 'motion above the band of this criterion is in it, so it may read too high',
};
export const levelReason = (reason: LevelReason): string => REASONS[reason];

/** The crowd that each class presumes (HIVOSS traffic classes, from memory, .85; EN 1990 note to A2.4.3.2). */
const PRESUMED_CROWD: Readonly<Partial<Record<Criterion, string>>> = {
  'en-1990': 'The designer’s traffic for the bridge; 0.4 m/s² horizontal for exceptional crowds.',
  hivoss:
    'Each class presumes its traffic: TC1 15 persons on the deck, TC2 0.2, TC3 0.5, TC4 1.0 and TC5 1.5 persons per m² (check against the standard).',
  setra: 'The crowd of its bridge class: 0.5 to 1.0 persons per m² (check against the standard).',
  'aisc-dg11': 'One person walking at the pace that excites the floor most.',
};

/** What a criterion presumes to have been there, for asking whether it was. */
export const presumedLoading = (criterion: Criterion): string | undefined => PRESUMED_CROWD[criterion];

/** A level value in the unit of its trade: mm/s, µm, m/s². */
export function levelValue(value: number, unit: LevelFinding['unit']): string {
  if (unit === 'm/s') return `${formatNumber(1000 * value, 2)} mm/s`;
  if (unit === 'm') return `${formatNumber(1e6 * value, 2)} µm`;
  return unit === '1' ? formatNumber(value, 2) : `${formatNumber(value, 2)} m/s²`;
}

const ZONED: readonly Criterion[] = ['iso-20816-3', 'iso-10816-1', 'iso-10816-7'];
function zoneName(finding: LevelFinding): string {
  const zone = finding.zone ?? '';
  return ZONED.includes(finding.criterion) ? `zone ${zone}` : zone;
}

function outcome(finding: LevelFinding): string {
  const limit = finding.limit === undefined ? '' : levelValue(finding.limit, finding.unit);
  const isScale = finding.zone !== undefined && finding.zone !== 'within' && finding.zone !== 'beyond';
  switch (finding.grade) {
    case 'within':
      return isScale ? zoneName(finding) : `within ${limit}`;
    case 'beyond':
      return isScale ? `${zoneName(finding)}, beyond the last boundary` : `beyond ${limit}`;
    case 'at-least':
      return isScale ? `at least ${zoneName(finding)}` : `at least this, which is beyond ${limit}`;
    case 'not-assessed':
      return 'not assessed';
  }
}

/** "ISO 20816-3 ...: rms velocity 5.1 mm/s, at least zone D, because ..."; the source of the limit closes it. */
export function levelSentence(finding: LevelFinding): string {
  const value = finding.value === undefined ? '' : ` ${levelValue(finding.value, finding.unit)}`;
  const reasons = finding.reasons.map(levelReason).join('; ');
  const because = reasons === '' ? '' : `, because ${reasons}`;
  const origin = finding.classOf === undefined ? finding.origin : `${finding.origin}, ${finding.classOf}`;
  const check = finding.certain ? '' : ` (${CHECK_THE_STANDARD})`;
  const band = `needs ${formatInterval(finding.bandHz, 3)} Hz`;
  const presumed = finding.reasons.includes('loading-not-presumed') && PRESUMED_CROWD[finding.criterion];
  const crowd = presumed ? ` ${presumed}` : '';
  return `${criterionName(finding.criterion)}: ${measureName(finding.measure)}${value}, ${outcome(finding)}${because}.${crowd} Source: ${origin}${check}; ${band}.`;
}
