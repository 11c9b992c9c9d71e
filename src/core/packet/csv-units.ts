/** Standard gravity, m/s² (3rd CGPM, 1901). */
export const STANDARD_GRAVITY_MPS2 = 9.80665;

export type AccelerationUnit = 'mps2' | 'g' | 'mg';
export type TimeUnit = 's' | 'ms' | 'us' | 'ns';

/** Factor from a unit to m/s². */
export const MPS2_PER_UNIT: Readonly<Record<AccelerationUnit, number>> = {
  mps2: 1,
  g: STANDARD_GRAVITY_MPS2,
  mg: STANDARD_GRAVITY_MPS2 / 1000,
};

/** How many of a unit make a second. */
export const UNITS_PER_SECOND: Readonly<Record<TimeUnit, number>> = { s: 1, ms: 1e3, us: 1e6, ns: 1e9 };

const ACCELERATION_SPELLINGS: Readonly<Record<string, AccelerationUnit>> = {
  mps2: 'mps2',
  'm/s2': 'mps2',
  'm/s/s': 'mps2',
  ms2: 'mps2',
  'ms-2': 'mps2',
  'm/sec2': 'mps2',
  g: 'g',
  gn: 'g',
  g0: 'g',
  mg: 'mg',
  millig: 'mg',
};

const TIME_SPELLINGS: Readonly<Record<string, TimeUnit>> = {
  s: 's',
  sec: 's',
  secs: 's',
  second: 's',
  seconds: 's',
  ms: 'ms',
  msec: 'ms',
  millis: 'ms',
  millisecond: 'ms',
  milliseconds: 'ms',
  us: 'us',
  µs: 'us',
  micros: 'us',
  microsecond: 'us',
  microseconds: 'us',
  ns: 'ns',
  nanos: 'ns',
  nanosecond: 'ns',
  nanoseconds: 'ns',
};

/** Unit of acceleration that a spelling such as "m/s^2", "G" or "mps2" means; undefined when unknown. */
export function parseAccelerationUnit(spelling: string): AccelerationUnit | undefined {
  const plain = spelling
    .toLowerCase()
    .replaceAll('²', '2')
    .replaceAll('⁻', '-')
    .replace(/[\s^*·.{}()]/g, '');
  return Object.hasOwn(ACCELERATION_SPELLINGS, plain) ? ACCELERATION_SPELLINGS[plain] : undefined;
}

/** Unit of time that a spelling such as "ms", "µs" or "seconds" means; undefined when unknown. */
export function parseTimeUnit(spelling: string): TimeUnit | undefined {
  // Greek mu and the micro sign look the same and are different characters.
  const plain = spelling.toLowerCase().trim().replaceAll('μ', 'µ');
  return Object.hasOwn(TIME_SPELLINGS, plain) ? TIME_SPELLINGS[plain] : undefined;
}
