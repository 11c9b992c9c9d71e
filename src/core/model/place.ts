/** What a spot is, as far as criteria and cautions need it. Entered with the spot; everything may be absent. */
export const SPOT_KINDS = [
  'handrail',
  'stair',
  'floor',
  'footbridge',
  'bearing-housing',
  'machine-base',
  'fan-frame',
  'pipe',
  'foundation',
  'top-floor',
  'other',
] as const;
export type SpotKind = (typeof SPOT_KINDS)[number];

export interface MachinePlace {
  readonly type?: 'general' | 'pump' | 'fan';
  readonly ratedPowerW?: number;
  /** Support class of ISO 20816-3: rigid when its lowest natural frequency is at least 1.25 times the main excitation. */
  readonly support?: 'rigid' | 'flexible';
  /** Pump category of ISO 10816-7. */
  readonly pumpCategory?: 1 | 2;
  /** Running speed, which widens the needed band below 600 r/min. */
  readonly speedRpm?: number;
}

export type BuildingUse = 'commercial' | 'dwelling' | 'sensitive';
export type FloorUse =
  'office' | 'residence' | 'mall' | 'indoor-footbridge' | 'outdoor-footbridge' | 'workshop';

export interface Place {
  readonly kind: SpotKind;
  readonly machine?: MachinePlace;
  readonly building?: BuildingUse;
  readonly floorUse?: FloorUse;
  /** The person says that the loading which the criterion presumes (its crowd, its walker) was there during the reading. */
  readonly presumedLoading?: boolean;
}
