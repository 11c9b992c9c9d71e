import type { Levels } from '../../model/analysis.ts';
import type { Interval } from '../../model/interval.ts';
import type { LevelFinding, LevelReason } from '../../model/judgement.ts';
import type { FloorUse } from '../../model/place.ts';
import { STANDARD_GRAVITY_MPS2 } from '../isolation.ts';
import { graded, notAssessed, type Measured, type Scale } from './grading.ts';

/** ISO 2631-1:1997 C.2.3: comfort words overlap by design; weighted rms, m/s² (first four seen on a page, the last two from memory, .95). */
export const COMFORT_WORDS: readonly { readonly word: string; readonly rangeMps2: Interval }[] = [
  { word: 'not uncomfortable', rangeMps2: [0, 0.315] },
  { word: 'a little uncomfortable', rangeMps2: [0.315, 0.63] },
  { word: 'fairly uncomfortable', rangeMps2: [0.5, 1] },
  { word: 'uncomfortable', rangeMps2: [0.8, 1.6] },
  { word: 'very uncomfortable', rangeMps2: [1.25, 2.5] },
  { word: 'extremely uncomfortable', rangeMps2: [2, Infinity] },
];
/** Boundaries used for grading: the upper end of the first word, and the lower end of the last. */
const COMFORT_FIRST_MPS2 = 0.315;
const COMFORT_LAST_MPS2 = 2;
/** Above this crest factor the rms understates and dose values should be used as well (ISO 2631-1, from memory, .95). */
export const LARGEST_CREST_FACTOR_RATIO = 9;

/** All comfort words whose range holds a weighted acceleration. */
export const comfortWords = (weightedMps2: number): string =>
  COMFORT_WORDS.filter(({ rangeMps2: [low, high] }) => weightedMps2 >= low && weightedMps2 < high)
    .map(({ word }) => word)
    .join(' to ');

/** ISO 10137:2007 Annex C base value at 4-8 Hz, m/s² rms, vertical (seen in peak form through CCIP-016). */
export const BASE_VALUE_MPS2 = 0.005;
/** ISO 10137:2007 / BS 6472:1992 base curve, vertical, rms m/s²: 0.01/sqrt(f) to 4 Hz, 0.005 to 8 Hz, 0.000625 f above. */
export function baseCurveMps2(frequencyHz: number): number {
  if (frequencyHz < 4) return 0.01 / Math.sqrt(frequencyHz);
  return frequencyHz <= 8 ? BASE_VALUE_MPS2 : 6.25e-4 * frequencyHz;
}
/** Multiples of the base curve by use (from memory, .85): shown with "check against the standard". */
export const ISO_10137_MULTIPLES: Readonly<Partial<Record<FloorUse, number>>> = {
  office: 4,
  residence: 2,
  workshop: 8,
};

/** AISC design guide 11: tolerance of peak acceleration at 4-8 Hz, share of gravity, by use (seen on two pages). */
export const AISC_LIMIT_SHARE_OF_GRAVITY: Readonly<Partial<Record<FloorUse, number>>> = {
  office: 0.005,
  residence: 0.005,
  mall: 0.015,
  'indoor-footbridge': 0.015,
  'outdoor-footbridge': 0.05,
};

/** Needed bands: ISO 2631-1 0.5-80 Hz (seen on two pages); ISO 10137 1-80 Hz; AISC design guide 11 walking range. */
export const COMFORT_BAND_HZ: Interval = [0.5, 80];
export const ISO_10137_BAND_HZ: Interval = [1, 80];
export const AISC_BAND_HZ: Interval = [1, 20];

const measuredOf = (levels: Levels, value: number | undefined): Measured => ({
  value,
  seenHz: levels.bandHz,
  leftOutTones: false,
  falseTones: levels.leftOutTones,
});

/** ISO 2631-1: vector sum of the weighted axes (standing or sitting person, k = 1). */
export function comfortFindings(levels: Levels): LevelFinding[] {
  const { weightedVerticalRmsMps2: vertical, weightedHorizontalRmsMps2: horizontal } = levels;
  const value = vertical === undefined ? undefined : Math.hypot(vertical, horizontal ?? 0);
  const impulsive = (levels.crestFactorRatio ?? 0) > LARGEST_CREST_FACTOR_RATIO;
  const noPass: LevelReason[] = impulsive ? ['crest-factor'] : [];
  const finding = graded(
    {
      criterion: 'iso-2631-1',
      measure: 'weighted-rms',
      unit: 'm/s²',
      origin: 'ISO 2631-1:1997 C.2.3',
      certain: true,
      bandHz: COMFORT_BAND_HZ,
    },
    { boundaries: [COMFORT_FIRST_MPS2, COMFORT_LAST_MPS2], zones: ['', '', ''] },
    measuredOf(levels, value),
    { noPass },
  );
  return [finding.zone === undefined ? finding : { ...finding, zone: comfortWords(finding.value as number) }];
}

/** ISO 10137 as a response factor: weighted vertical rms over the base value. */
export function floorUseFindings(levels: Levels, use: FloorUse | undefined, loaded: boolean): LevelFinding[] {
  const noPass: LevelReason[] = loaded ? [] : ['loading-not-presumed'];
  return [...iso10137(levels, use, noPass), ...aisc(levels, use, noPass)];
}

const single = (limit: number): Scale => ({ boundaries: [limit], zones: ['within', 'beyond'] });

function iso10137(levels: Levels, use: FloorUse | undefined, noPass: readonly LevelReason[]): LevelFinding[] {
  const description = {
    criterion: 'iso-10137',
    measure: 'response-factor',
    unit: '1',
    origin: 'ISO 10137:2007 Annex C',
    certain: false,
    bandHz: ISO_10137_BAND_HZ,
  } as const;
  if (use === undefined) return [notAssessed(description, 'class-unknown')];
  const multiple = ISO_10137_MULTIPLES[use];
  if (multiple === undefined) return [];
  const weighted = levels.weightedVerticalRmsMps2;
  const factor = weighted === undefined ? undefined : weighted / BASE_VALUE_MPS2;
  return [graded({ ...description, classOf: use }, single(multiple), measuredOf(levels, factor), { noPass })];
}

function aisc(levels: Levels, use: FloorUse | undefined, noPass: readonly LevelReason[]): LevelFinding[] {
  if (use === undefined) return [];
  const share = AISC_LIMIT_SHARE_OF_GRAVITY[use];
  if (share === undefined) return [];
  const running = levels.runningRmsMaxMps2;
  const fallback = running === undefined ? undefined : Math.SQRT2 * running;
  return [
    graded(
      {
        criterion: 'aisc-dg11',
        measure: 'equivalent-sine-peak',
        unit: 'm/s²',
        origin: 'AISC design guide 11',
        certain: true,
        bandHz: AISC_BAND_HZ,
        classOf: use,
      },
      single(share * STANDARD_GRAVITY_MPS2),
      { ...measuredOf(levels, levels.equivalentSinePeakMps2 ?? fallback), unfiltered: true },
      { noPass },
    ),
  ];
}
