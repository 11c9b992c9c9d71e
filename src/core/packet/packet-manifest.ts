import * as v from 'valibot';

/** First entry of a packet: what wrote it and what should be inside. Nothing in it is needed to read the rest. */
export interface PacketManifest {
  readonly format: 'thrumbook-packet';
  readonly v: number;
  readonly writtenAt: string;
  readonly app: { readonly version: string; readonly commit: string; readonly analysisVersion: number };
  /** Kinds of facts with how many there are. */
  readonly factCounts: Readonly<Record<string, number>>;
  /** `all`: a back-up; `selection`: some readings and what they need. */
  readonly scope: 'all' | 'selection';
  readonly remark: string;
}

export const PACKET_VERSION = 1;

const count = v.pipe(v.number(), v.integer(), v.minValue(0), v.maxValue(10_000_000));
const text = v.pipe(v.string(), v.maxLength(500));

const manifest = v.looseObject({
  format: v.literal('thrumbook-packet'),
  v: v.pipe(v.number(), v.integer(), v.minValue(1)),
  writtenAt: text,
  app: v.looseObject({ version: text, commit: text, analysisVersion: count }),
  factCounts: v.record(v.pipe(v.string(), v.maxLength(40)), count),
  scope: v.picklist(['all', 'selection']),
  remark: text,
});

/** The manifest in a parsed JSON value, or undefined when it is none. */
export function parseManifest(value: unknown): PacketManifest | undefined {
  const parsed = v.safeParse(manifest, value);
  return parsed.success ? parsed.output : undefined;
}
