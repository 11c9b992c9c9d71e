import type { ReadingFilter, ReadingSummary } from '../app/ports.ts';
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

export function isSummary(value: unknown): value is ReadingSummary {
  if (typeof value !== 'object' || value === null) return false;
  const { id, recordedAt, procedure, trust, trashed } = value as Partial<ReadingSummary>;
  const texts = [id, recordedAt, procedure, trust];
  return texts.every((text) => typeof text === 'string') && typeof trashed === 'boolean';
}

/** Whether a summary passes a filter. Without `trashed` only what is not in the trash passes. */
export function passesFilter(
  summary: ReadingSummary,
  filter: ReadingFilter,
  nameOf: (entity: string) => string | undefined,
): boolean {
  if (summary.trashed !== (filter.trashed ?? false)) return false;
  const exact = ['procedure', 'spot', 'asset', 'site', 'round'] as const;
  if (exact.some((field) => filter[field] !== undefined && filter[field] !== summary[field])) return false;
  const words = searchWords(filter.text ?? '');
  return words.length === 0 || containsAll(searchText(summary, nameOf), words);
}

const searchWords = (text: string): readonly string[] => foldCase(text).split(/\s+/).filter(Boolean);
const foldCase = (text: string): string => text.normalize('NFKD').replace(/\p{M}/gu, '').toLowerCase();

function containsAll(text: string, words: readonly string[]): boolean {
  return words.every((word) => text.includes(word));
}

function searchText(summary: ReadingSummary, nameOf: (entity: string) => string | undefined): string {
  const names = [summary.site, summary.asset, summary.spot, summary.round].map((id) => id && nameOf(id));
  const own = [summary.label, summary.procedure, summary.recordedAt.slice(0, 10)];
  return foldCase([...own, ...names].filter(Boolean).join('\n'));
}
