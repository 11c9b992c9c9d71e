import type { Levels, Tone } from '../../model/analysis.ts';
import type { Interval } from '../../model/interval.ts';
import type { LevelFinding } from '../../model/judgement.ts';
import type { MachinePlace } from '../../model/place.ts';
import { graded, notAssessed, type Scale } from './grading.ts';

/** Zone boundaries A/B, B/C, C/D. */
export interface ZoneTable {
  readonly velocityMps: readonly [number, number, number];
  /** Rms displacement, where the standard gives it. */
  readonly displacementM?: readonly [number, number, number];
}
const mm = (a: number, b: number, c: number): [number, number, number] => [a / 1e3, b / 1e3, c / 1e3];
const um = (a: number, b: number, c: number): [number, number, number] => [a / 1e6, b / 1e6, c / 1e6];

export type SupportClass = 'rigid' | 'flexible';
export type MachineGroup = 1 | 2;

/** ISO 20816-3:2022 (as ISO 10816-3:2009, Annex A): velocities seen on six pages and more, displacements from memory, .9. */
export const ISO_20816_3: Readonly<Record<MachineGroup, Readonly<Record<SupportClass, ZoneTable>>>> = {
  1: {
    rigid: { velocityMps: mm(2.3, 4.5, 7.1), displacementM: um(29, 57, 90) },
    flexible: { velocityMps: mm(3.5, 7.1, 11), displacementM: um(45, 90, 140) },
  },
  2: {
    rigid: { velocityMps: mm(1.4, 2.8, 4.5), displacementM: um(22, 45, 71) },
    flexible: { velocityMps: mm(2.3, 4.5, 7.1), displacementM: um(37, 71, 113) },
  },
};

export type MachineClass = 'I' | 'II' | 'III' | 'IV';
/** ISO 10816-1 Annex B (as ISO 2372): seen on five pages. */
export const ISO_10816_1: Readonly<Record<MachineClass, ZoneTable>> = {
  I: { velocityMps: mm(0.71, 1.8, 4.5) },
  II: { velocityMps: mm(1.12, 2.8, 7.1) },
  III: { velocityMps: mm(1.8, 4.5, 11.2) },
  IV: { velocityMps: mm(2.8, 7.1, 18) },
};

/** ISO 10816-7 (rotodynamic pumps): seen on one page and from memory, .9; up to 200 kW, above. */
export const ISO_10816_7: Readonly<Record<1 | 2, readonly [small: ZoneTable, large: ZoneTable]>> = {
  1: [{ velocityMps: mm(2.5, 4.0, 6.6) }, { velocityMps: mm(3.5, 5.0, 7.6) }],
  2: [{ velocityMps: mm(3.2, 5.1, 8.5) }, { velocityMps: mm(4.2, 6.1, 9.5) }],
};

const W_PER_KW = 1000;
/** Rated powers that bound the groups of ISO 20816-3, and the pump sizes of ISO 10816-7. */
export const GROUP_1_ABOVE_W = 300 * W_PER_KW;
export const GROUP_2_FROM_W = 15 * W_PER_KW;
export const LARGE_PUMP_ABOVE_W = 200 * W_PER_KW;
/** Needed band; below 600 r/min it begins at 2 Hz. ISO 20816-3. */
export const MACHINE_BAND_HZ: Interval = [10, 1000];
export const SLOW_MACHINE_BAND_HZ: Interval = [2, 1000];
export const SLOW_BELOW_RPM = 600;

const scaleOf = (boundaries: readonly number[]): Scale => ({ boundaries, zones: ['A', 'B', 'C', 'D'] });

interface Chosen {
  readonly criterion: 'iso-20816-3' | 'iso-10816-1' | 'iso-10816-7';
  readonly origin: string;
  readonly classOf: string;
  readonly table: ZoneTable;
}

/** The table for a machine; undefined when power or support is not known. */
export function tableFor(machine: MachinePlace): Chosen | undefined {
  const power = machine.ratedPowerW;
  if (power === undefined) return undefined;
  if (machine.type === 'pump' && machine.pumpCategory !== undefined) {
    const large = power > LARGE_PUMP_ABOVE_W;
    return {
      criterion: 'iso-10816-7',
      origin: 'ISO 10816-7',
      classOf: `category ${machine.pumpCategory}, ${large ? 'above' : 'up to'} 200 kW`,
      table: ISO_10816_7[machine.pumpCategory][large ? 1 : 0],
    };
  }
  if (power <= GROUP_2_FROM_W)
    return {
      criterion: 'iso-10816-1',
      origin: 'ISO 10816-1 Annex B',
      classOf: 'class I, up to 15 kW',
      table: ISO_10816_1.I,
    };
  if (machine.support === undefined) return undefined;
  const group: MachineGroup = power > GROUP_1_ABOVE_W ? 1 : 2;
  return {
    criterion: 'iso-20816-3',
    origin: 'ISO 20816-3:2022',
    classOf: `group ${group}, ${machine.support} support`,
    table: ISO_20816_3[group][machine.support],
  };
}

interface MachineLevel {
  readonly velocityMps: number | undefined;
  readonly displacementM: number | undefined;
  readonly linesOnly: boolean;
}

/** Rms over direct tones in a band, of the largest axis: sum of (a d / (2 pi f)^n)² / 2; n = 1 velocity, 2 displacement. */
function linesRms(tones: readonly Tone[], bandHz: Interval, integrations: 1 | 2): number | undefined {
  const inBand = tones.filter(
    ({ fold, frequencyHz }) =>
      fold.verdict === 'direct' && frequencyHz >= bandHz[0] && frequencyHz <= bandHz[1],
  );
  if (inBand.length === 0) return undefined;
  const axes = inBand[0]?.direction.map((_, axis) =>
    inBand.reduce((sum, { amplitudeMps2, direction, frequencyHz }) => {
      const integrated =
        (amplitudeMps2 * (direction[axis] ?? 0)) / (2 * Math.PI * frequencyHz) ** integrations;
      return sum + integrated ** 2 / 2;
    }, 0),
  );
  return Math.sqrt(Math.max(...(axes ?? [0])));
}

/**
 * What the reading knows of the needed band: its own level from 10 Hz up where it has one, else the lines alone. Motion below the
 * band (a floor that sways) must not be counted: velocity would be full of it.
 */
function machineLevel(levels: Levels, tones: readonly Tone[], bandHz: Interval): MachineLevel {
  if (bandHz === MACHINE_BAND_HZ && levels.velocityRmsFrom10HzMps !== undefined)
    return {
      velocityMps: levels.velocityRmsFrom10HzMps,
      displacementM: levels.displacementRmsFrom10HzM,
      linesOnly: false,
    };
  return {
    velocityMps: linesRms(tones, bandHz, 1),
    displacementM: linesRms(tones, bandHz, 2),
    linesOnly: true,
  };
}

/** Findings of a bearing housing; nowhere else do the zones apply. */
export function machineFindings(
  levels: Levels,
  tones: readonly Tone[],
  machine: MachinePlace = {},
): LevelFinding[] {
  const slow = machine.speedRpm !== undefined && machine.speedRpm < SLOW_BELOW_RPM;
  const bandHz = slow ? SLOW_MACHINE_BAND_HZ : MACHINE_BAND_HZ;
  const chosen = tableFor(machine);
  const velocity = { measure: 'velocity-rms', unit: 'm/s', certain: true, bandHz } as const;
  if (!chosen)
    return [
      notAssessed({ ...velocity, criterion: 'iso-20816-3', origin: 'ISO 20816-3:2022' }, 'class-unknown'),
    ];
  const { criterion, origin, classOf, table } = chosen;
  const level = machineLevel(levels, tones, bandHz);
  const measured = { seenHz: levels.bandHz, leftOutTones: levels.leftOutTones, falseTones: false };
  const bound = { noPass: level.linesOnly ? (['lines-only'] as const) : [] };
  const described = { criterion, origin, classOf };
  const findings = [
    graded(
      { ...velocity, ...described },
      scaleOf(table.velocityMps),
      { ...measured, value: level.velocityMps },
      bound,
    ),
  ];
  if (table.displacementM)
    findings.push(
      graded(
        { ...velocity, ...described, measure: 'displacement-rms', unit: 'm' },
        scaleOf(table.displacementM),
        { ...measured, value: level.displacementM },
        bound,
      ),
    );
  return findings;
}
