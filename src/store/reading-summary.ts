import type { ReadingSummary } from '../app/ports.ts';
import type { EditFact, Entity, ReadingFact } from '../core/model/fact.ts';
import { foldEdits } from '../core/packet/fold-edits.ts';

/** Digest of a reading for lists: what was edited later stands over what the fact says. */
export function summaryOf(reading: ReadingFact, edits: readonly EditFact[]): ReadingSummary {
  const entity = foldEdits(reading._id, edits);
  const place = (field: 'site' | 'asset' | 'spot' | 'round') =>
    optional(field, placeOf(field, reading, entity));
  return {
    id: reading._id,
    recordedAt: reading.recordedAt,
    procedure: reading.procedure,
    practice: reading.practice,
    ...optional('label', textField(entity, 'label')),
    ...place('site'),
    ...place('asset'),
    ...place('spot'),
    ...place('round'),
    ...strongestOf(reading),
    trust: reading.analysis.trust,
    trashed: entity.trashed,
  };
}

function placeOf(
  field: 'site' | 'asset' | 'spot' | 'round',
  reading: ReadingFact,
  entity: Entity,
): string | undefined {
  return Object.hasOwn(entity.fields, field) ? textField(entity, field) : reading[field];
}

function textField(entity: Entity, field: string): string | undefined {
  const value = entity.fields[field];
  return typeof value === 'string' && value !== '' ? value : undefined;
}

function optional<K extends string>(key: K, value: string | undefined): { [k in K]?: string } {
  return (value === undefined ? {} : { [key]: value }) as { [k in K]?: string };
}

function strongestOf({ analysis }: ReadingFact): Partial<ReadingSummary> {
  const mode = analysis.modes[0];
  if (mode !== undefined) {
    const { frequencyHz, frequencySdHz, dampingRatio, dampingRatioSd } = mode;
    return { frequencyHz, frequencySdHz, dampingRatio, dampingRatioSd };
  }
  const tone = analysis.tones[0];
  return tone === undefined ? {} : { frequencyHz: tone.frequencyHz, frequencySdHz: tone.frequencySdHz };
}
