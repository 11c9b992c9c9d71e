import * as v from 'valibot';
import type { AxisName, SensorDescription } from '../model/recording.ts';
import { INTERRUPTION_CODES } from '../model/recording.ts';
import { parseJsonBytes } from './parse-json.ts';

export const axisName = v.picklist(['x', 'y', 'z'] satisfies readonly AxisName[]);

/** The facts of the sensor. Extra members are kept: they belong to the hash. */
export const sensorDescription = v.looseObject({
  source: v.picklist(['accelerometer', 'devicemotion', 'file', 'practice']),
  practice: v.boolean(),
  name: v.pipe(v.string(), v.maxLength(1000)),
  claimedIntervalMs: v.exactOptional(v.pipe(v.number(), v.finite())),
  requestedRateHz: v.exactOptional(v.pipe(v.number(), v.finite())),
  screenAngleDeg: v.exactOptional(v.pipe(v.number(), v.finite())),
  gravityReads: v.exactOptional(v.picklist(['up', 'down'])),
  interruption: v.exactOptional(v.picklist(INTERRUPTION_CODES)),
});

const rawHeader = v.looseObject({
  count: v.pipe(v.number(), v.integer(), v.minValue(0)),
  axes: v.pipe(v.array(axisName), v.minLength(1), v.maxLength(3)),
  startedAt: v.exactOptional(v.pipe(v.string(), v.maxLength(40))),
  sensor: sensorDescription,
});

export interface RawHeader {
  readonly count: number;
  readonly axes: readonly AxisName[];
  readonly startedAt?: string;
  readonly sensor: SensorDescription;
}

/** The header of raw v1, or undefined when it is not one. */
export function parseRawHeader(bytes: Uint8Array): RawHeader | undefined {
  const parsed = v.safeParse(rawHeader, parseJsonBytes(bytes));
  if (!parsed.success || new Set(parsed.output.axes).size !== parsed.output.axes.length) return undefined;
  return parsed.output as RawHeader;
}
