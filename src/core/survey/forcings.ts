/**
 * From what shakes things to the frequencies it shakes at. A range that a source really visits (a variable-speed drive, people's
 * paces, wind speeds) is kept apart from what is merely not known (a tolerance): of a range the nearest point counts,
 * of an unknown all points are possible.
 */
import type { Interval } from '../model/interval.ts';
import { failure, success, type Outcome } from '../model/outcome.ts';
import type {
  BandSource,
  BeltSource,
  FootfallSource,
  Forcing,
  MachineSource,
  MainsSource,
  Source,
  TrafficSource,
  WindSource,
} from '../model/source.ts';
import { impossibilityOf } from './impossible-source.ts';
import { FOOTFALL, loadFactorOver } from './footfall.ts';
import { beltHz, bearingOrders, polePassHz, synchronousSpeedRpm } from './rotating.ts';
import { asInterval, originOf, scaled, toleranceOf, widened } from './tolerance.ts';
import { strouhalOf } from './wind.ts';

/** Orders of a machine when none are given: unbalance at 1×, misalignment at 2× (trade rule, no single source). */
export const DEFAULT_ORDERS: readonly number[] = [1, 2];
/** Full-load slip of induction motors, typical (from memory, .8). */
export const TYPICAL_SLIP_RATIO: Interval = [0.01, 0.05];
/** Public supplies hold their frequency within this (EN 50160, 1 % for 99.5 % of a year; from memory, .9). */
export const SUPPLY_TOLERANCE_RATIO = 0.01;
/** Dominant ground-borne frequencies: road 8-20 Hz (from memory, .7), rail 6-40 Hz (seen on one public page). */
export const TRAFFIC_HZ: Readonly<Record<'road' | 'rail', Interval>> = { road: [8, 20], rail: [6, 40] };

type Draft = Omit<Forcing, 'source' | 'sourceKind' | 'frequencyHz'>;

const orderLabel = (order: number): string => `${Number(order.toFixed(3))}×`;

function machineDrafts(source: MachineSource): Draft[] {
  const shaftHz = scaled(asInterval(source.speedRpm), 1 / 60);
  const common = {
    toleranceRatio: toleranceOf(source),
    origin: originOf(source),
    certain: true,
    ...(source.variableSpeed ? { adjustable: true } : {}),
  };
  const draft = (order: number, role: Draft['role'], name = ''): Draft => ({
    ...common,
    label: `${name}${name && ' '}${orderLabel(order)}`,
    role,
    order,
    rangeHz: scaled(shaftHz, order),
    amplificationKind: order === 1 ? 'unbalance' : 'force',
  });
  const drafts = (source.orders ?? DEFAULT_ORDERS).map((order) =>
    draft(order, order === 1 ? 'shaft' : 'shaft-order'),
  );
  if (source.bladeCount) drafts.push(draft(source.bladeCount, 'blade-pass', 'blade pass'));
  if (source.toothCount) drafts.push(draft(source.toothCount, 'gear-mesh', 'gear mesh'));
  if (source.cylinders)
    drafts.push(draft(source.twoStroke ? source.cylinders : source.cylinders / 2, 'firing', 'firing'));
  if (source.bearing) {
    const orders = bearingOrders(source.bearing);
    drafts.push(
      draft(orders.cage, 'bearing-cage', 'cage'),
      draft(2 * orders.ball, 'bearing-ball', 'ball'),
      draft(orders.outer, 'bearing-outer', 'outer race'),
      draft(orders.inner, 'bearing-inner', 'inner race'),
    );
  }
  return drafts;
}

function beltDrafts(source: BeltSource): Draft[] {
  const speed = asInterval(source.speedRpm);
  const belt: Interval = [
    beltHz(source.pulleyDiameterM, speed[0], source.beltLengthM),
    beltHz(source.pulleyDiameterM, speed[1], source.beltLengthM),
  ];
  return [1, 2].map((order) => ({
    label: `belt ${orderLabel(order)}`,
    role: order === 1 ? 'belt-pass' : 'belt-pass-second',
    order,
    rangeHz: scaled(belt, order),
    toleranceRatio: toleranceOf(source),
    origin: originOf(source),
    certain: true,
    amplificationKind: 'force',
  }));
}

function mainsDrafts(source: MainsSource): Draft[] {
  const twiceLine: Draft = {
    label: 'twice line',
    role: 'twice-line',
    order: 2,
    rangeHz: scaled([source.supplyHz, source.supplyHz], 2),
    toleranceRatio: SUPPLY_TOLERANCE_RATIO,
    origin: 'definition',
    certain: true,
    amplificationKind: 'force',
  };
  if (source.poles === undefined) return [twiceLine];
  const synchronous = synchronousSpeedRpm(source.supplyHz, source.poles);
  const known = source.speedRpm !== undefined;
  const shaft = known ? asInterval(source.speedRpm as number | Interval) : meanSlipSpeed(synchronous);
  const toleranceRatio = known ? toleranceOf(source) : TYPICAL_SLIP_RATIO[1] / 2;
  const outer = known ? widened(shaft, toleranceRatio) : slipSpeeds(synchronous);
  const origin = known ? originOf(source) : 'typical slip of 1 to 5 %';
  const slowest = Math.max(0, polePassHz(source.poles, synchronous, Math.min(outer[1], synchronous)));
  return [
    {
      label: 'motor 1×',
      role: 'motor-shaft',
      order: 1,
      rangeHz: scaled(shaft, 1 / 60),
      toleranceRatio,
      origin,
      certain: known,
      amplificationKind: 'unbalance',
    },
    {
      label: 'pole pass',
      role: 'pole-pass',
      order: source.poles,
      rangeHz: [slowest, Math.max(slowest, polePassHz(source.poles, synchronous, outer[0]))],
      toleranceRatio: 0,
      origin,
      certain: known,
      amplificationKind: 'force',
    },
    twiceLine,
  ];
}
const slipSpeeds = (synchronousRpm: number): Interval => [
  synchronousRpm * (1 - TYPICAL_SLIP_RATIO[1]),
  synchronousRpm,
];
const meanSlipSpeed = (synchronousRpm: number): Interval => {
  const middle = synchronousRpm * (1 - TYPICAL_SLIP_RATIO[1] / 2);
  return [middle, middle];
};

function footfallDrafts(source: FootfallSource): Draft[] {
  const table = FOOTFALL[source.activity];
  const own = source.paceHz !== undefined;
  const pace = own ? asInterval(source.paceHz as number | Interval) : table.paceHz;
  return table.harmonics.map(({ order, loadFactor }) => {
    const rangeHz = scaled(pace, order);
    return {
      label: `${source.activity} ${order < 1 ? 'lateral ½' : ordinal(order)}`,
      role: source.activity === 'sway' ? 'sway' : 'step',
      activity: source.activity,
      order,
      rangeHz,
      toleranceRatio: own ? toleranceOf(source) : 0,
      ...(loadFactor ? { loadFactorRatio: loadFactorOver(loadFactor, rangeHz) } : {}),
      ...(source.stepCount === undefined ? {} : { cycleCount: source.stepCount * order }),
      origin: `pace: ${own ? originOf(source) : table.paceOrigin}; load: ${table.loadOrigin}`,
      certain: (own || table.paceCertain) && table.loadCertain && order >= 1,
      amplificationKind: 'force',
    };
  });
}
const ordinal = (order: number): string => ['', '1st', '2nd', '3rd'][order] ?? `${order}th`;

function windDrafts(source: WindSource): Draft[] {
  const strouhal = strouhalOf(source);
  const speed = asInterval(source.speedMps);
  return [
    {
      label: 'vortex shedding',
      role: 'vortex',
      order: 1,
      rangeHz: [
        (strouhal.range[0] * speed[0]) / source.widthM,
        (strouhal.range[1] * speed[1]) / source.widthM,
      ],
      toleranceRatio: source.toleranceRatio ?? 0,
      wind: {
        widthM: source.widthM,
        strouhalRatio: strouhal.range,
        ...(source.massPerLengthKgPerM === undefined
          ? {}
          : { massPerLengthKgPerM: source.massPerLengthKgPerM }),
      },
      origin: strouhal.origin,
      certain: strouhal.certain,
      amplificationKind: 'force',
    },
  ];
}

function trafficDrafts(source: TrafficSource): Draft[] {
  const traffic = source.traffic ?? 'road';
  return [
    {
      label: `${traffic} traffic`,
      role: `${traffic}-traffic`,
      order: 1,
      rangeHz: TRAFFIC_HZ[traffic],
      toleranceRatio: 0,
      origin: 'commonly reported range',
      certain: false,
      amplificationKind: 'base',
    },
  ];
}

function bandDrafts(source: BandSource): Draft[] {
  const band = asInterval(source.frequencyHz);
  return Array.from({ length: source.harmonics ?? 1 }, (_, index) => ({
    label: index === 0 ? 'band' : `band ${ordinal(index + 1)}`,
    role: 'band',
    order: index + 1,
    rangeHz: scaled(band, index + 1),
    toleranceRatio: toleranceOf(source),
    origin: originOf(source),
    certain: true,
    amplificationKind: source.through ?? 'force',
  }));
}

function drafts(source: Source): Draft[] {
  switch (source.kind) {
    case 'machine':
      return machineDrafts(source);
    case 'belt':
      return beltDrafts(source);
    case 'mains':
      return mainsDrafts(source);
    case 'footfall':
      return footfallDrafts(source);
    case 'wind':
      return windDrafts(source);
    case 'traffic':
      return trafficDrafts(source);
    case 'band':
      return bandDrafts(source);
  }
}

/**
 * Forcing frequencies of sources, in the order of the sources.
 * Fails with `bad-source` (row counted from 1, field, reason) when a source is impossible.
 */
export function forcingsOf(sources: readonly Source[]): Outcome<readonly Forcing[]> {
  const forcings: Forcing[] = [];
  for (const [index, source] of sources.entries()) {
    const impossible = impossibilityOf(source);
    if (impossible) return failure('bad-source', { row: index + 1, name: source.name, ...impossible });
    for (const draft of drafts(source))
      forcings.push({
        ...draft,
        source: source.name,
        sourceKind: source.kind,
        frequencyHz: widened(draft.rangeHz, draft.toleranceRatio),
      });
  }
  return success(forcings);
}
