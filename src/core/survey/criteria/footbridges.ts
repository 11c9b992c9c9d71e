import type { Levels } from '../../model/analysis.ts';
import type { Interval } from '../../model/interval.ts';
import type { Criterion, LevelFinding, LevelReason } from '../../model/judgement.ts';
import { graded, type Scale } from './grading.ts';

type Direction = 'vertical' | 'horizontal';
interface FootbridgeTable {
  readonly criterion: Criterion;
  readonly origin: string;
  readonly certain: Readonly<Record<Direction, boolean>>;
  readonly scale: Readonly<Record<Direction, Scale>>;
}
const classes = ['CL1', 'CL2', 'CL3', 'CL4'];
const comfort = ['maximum comfort', 'mean comfort', 'minimum comfort', 'unacceptable'];
const limitOnly = (limit: number): Scale => ({ boundaries: [limit], zones: ['within', 'beyond'] });

/** Peak accelerations, m/s². EN 1990 seen on two pages; HIVOSS from memory, .95; Sétra vertical and lateral from memory, .85. */
export const FOOTBRIDGES: readonly FootbridgeTable[] = [
  {
    criterion: 'en-1990',
    origin: 'EN 1990 A2.4.3.2',
    certain: { vertical: true, horizontal: true },
    scale: { vertical: limitOnly(0.7), horizontal: limitOnly(0.2) },
  },
  {
    criterion: 'hivoss',
    origin: 'HIVOSS 2008 / JRC EUR 23984',
    certain: { vertical: true, horizontal: true },
    scale: {
      vertical: { boundaries: [0.5, 1, 2.5], zones: classes },
      horizontal: { boundaries: [0.1, 0.3, 0.8], zones: classes },
    },
  },
  {
    criterion: 'setra',
    origin: 'Sétra 2006',
    certain: { vertical: false, horizontal: false },
    scale: {
      vertical: { boundaries: [0.5, 1, 2.5], zones: comfort },
      horizontal: { boundaries: [0.15, 0.3, 0.8], zones: comfort },
    },
  },
];

/** Bands of the walking harmonics that the criteria are about: EN 1990 asks below 5 Hz vertical, below 2.5 Hz lateral. */
export const FOOTBRIDGE_BAND_HZ: Readonly<Record<Direction, Interval>> = {
  vertical: [1, 5],
  horizontal: [0.3, 2.5],
};

/** Peak acceleration against each criterion and direction. Each class presumes its crowd; without it nothing is a pass. */
export function footbridgeFindings(levels: Levels, loaded: boolean): LevelFinding[] {
  const noPass: LevelReason[] = loaded ? [] : ['loading-not-presumed'];
  const values = { vertical: levels.verticalPeakMps2, horizontal: levels.horizontalPeakMps2 };
  return FOOTBRIDGES.flatMap(({ criterion, origin, certain, scale }) =>
    (['vertical', 'horizontal'] as const).map((direction) =>
      graded(
        {
          criterion,
          measure: `acceleration-peak-${direction}`,
          unit: 'm/s²',
          origin,
          certain: certain[direction],
          bandHz: FOOTBRIDGE_BAND_HZ[direction],
        },
        scale[direction],
        {
          value: values[direction],
          seenHz: levels.bandHz,
          leftOutTones: false,
          falseTones: levels.leftOutTones,
          unfiltered: true,
        },
        { noPass },
      ),
    ),
  );
}
