import type { ReadingFilter, ReadingSummary } from '../app/ports.ts';

/** Whether a row is a summary as far as lists read it. */
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
