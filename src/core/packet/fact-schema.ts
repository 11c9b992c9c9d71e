import * as v from 'valibot';
import { PROCEDURES } from '../model/analysis.ts';
import { analysisSchema, analysisSettings } from './analysis-schema.ts';
import { sensorDescription } from './raw-header.ts';

/* Shapes of the facts that this code knows, as they come from a file, a server or the phone's own store. */
const ULID = '[0-7][0-9A-HJKMNP-TV-Z]{25}';
const idOf = (kinds: string) => v.pipe(v.string(), v.regex(new RegExp(`^(?:${kinds}):${ULID}$`)));
const ENTITY_KINDS = 'site|asset|spot|source|round|reading|photo';
/** ISO 8601 date-time with offset or Z. */
const instant = v.pipe(
  v.string(),
  v.regex(/^\d{4}-\d{2}-\d{2}T\d{2}:\d{2}:\d{2}(?:\.\d{1,9})?(?:Z|[+-]\d{2}:\d{2})$/),
);
const shortText = v.pipe(v.string(), v.maxLength(500));
const finite = v.pipe(v.number(), v.finite());
const count = v.pipe(v.number(), v.integer(), v.minValue(0));
const sha256 = v.pipe(v.string(), v.regex(/^[0-9a-f]{64}$/));
const maybe = v.exactOptional;

const circumstances = v.looseObject({
  mounting: v.picklist(['laid', 'strapped', 'putty', 'clamp', 'magnet', 'unknown']),
  surface: v.picklist(['tube', 'plate', 'floor', 'unknown']),
  excitation: v.picklist([
    'knuckle',
    'mallet',
    'heel-drop',
    'bounce-and-stop',
    'pull-and-release',
    'machine',
    'ambient',
    'unknown',
  ]),
  machineState: v.picklist(['off', 'running', 'slowing', 'none', 'unknown']),
  peopleOnIt: v.picklist(['none', 'hands', 'people', 'unknown']),
  load: maybe(shortText),
  temperatureC: maybe(finite),
  phoneMassKg: maybe(finite),
  direction: maybe(shortText),
  visibleSway: maybe(v.boolean()),
  cracksOrLooseParts: maybe(v.boolean()),
  speedRpm: maybe(finite),
});

const phoneCheck = v.looseObject({
  checkedAt: instant,
  rateHz: finite,
  scatterSdS: finite,
  repeatCount: count,
  gapCount: count,
  stepMps2: finite,
  noiseMps2PerRootHz: v.pipe(v.array(finite), v.maxLength(3)),
  gravityMps2: finite,
  smallestToneMps2: finite,
  usableBandHz: v.tuple([finite, finite]),
});

const reading = v.looseObject({
  _id: idOf('reading'),
  v: v.literal(1),
  kind: v.literal('reading'),
  recordedAt: instant,
  timeZone: v.pipe(v.string(), v.maxLength(80)),
  procedure: v.picklist(PROCEDURES),
  practice: v.boolean(),
  site: maybe(idOf('site')),
  asset: maybe(idOf('asset')),
  spot: maybe(idOf('spot')),
  round: maybe(idOf('round')),
  circumstances,
  phone: v.looseObject({
    device: shortText,
    userAgent: v.pipe(v.string(), v.maxLength(1000)),
    check: maybe(phoneCheck),
  }),
  sensor: sensorDescription,
  rawSha256: sha256,
  rawBytes: count,
  analysis: analysisSchema,
  app: v.looseObject({ version: shortText, commit: shortText }),
});

const result = v.looseObject({
  _id: idOf('result'),
  v: v.literal(1),
  kind: v.literal('result'),
  reading: idOf('reading'),
  analysisVersion: v.pipe(v.number(), v.integer(), v.minValue(1)),
  settings: analysisSettings,
  analysis: analysisSchema,
  at: instant,
});

export const fieldName = v.pipe(v.string(), v.regex(/^[A-Za-z][A-Za-z0-9]{0,59}$/));

const edit = v.looseObject({
  _id: idOf('edit'),
  v: v.literal(1),
  kind: v.literal('edit'),
  entity: idOf(ENTITY_KINDS),
  set: v.record(fieldName, v.unknown()),
  over: v.record(fieldName, v.pipe(v.array(idOf('edit')), v.maxLength(1000))),
  device: shortText,
  at: instant,
});

const erase = v.looseObject({
  _id: v.pipe(v.string(), v.startsWith('erase:'), v.maxLength(100)),
  v: v.literal(1),
  kind: v.literal('erase'),
  target: idOf(`${ENTITY_KINDS}|result|edit`),
  device: shortText,
  at: instant,
});

const photo = v.looseObject({
  _id: idOf('photo'),
  v: v.literal(1),
  kind: v.literal('photo'),
  entity: idOf(ENTITY_KINDS),
  type: v.literal('image/jpeg'),
  widthCount: count,
  heightCount: count,
  rawSha256: sha256,
  rawBytes: count,
  at: instant,
});

/** By kind: the shape at version 1. */
export const FACT_SCHEMAS = { reading, result, edit, erase, photo } as const;

/** What every fact must have, known or not. The id begins with the kind. */
export const factFrame = v.looseObject({
  _id: v.pipe(v.string(), v.regex(/^[a-z][a-z0-9-]{0,30}:[A-Za-z0-9:_-]{1,120}$/)),
  v: v.pipe(v.number(), v.integer(), v.minValue(1)),
  kind: v.pipe(v.string(), v.regex(/^[a-z][a-z0-9-]{0,30}$/)),
});
