/** What is typed in the form, and its way to unknown data for the parser and back. Typed text is kept as typed. */
import type { Source, SourceKind } from '../../../core/model/source.ts';
import { parseNumber } from '../../parse-number.ts';
import { HAS_KNOWN_BY, SOURCE_FIELDS, type SourceField } from './source-fields.ts';

export interface SourceDraft {
  readonly kind: SourceKind;
  readonly name: string;
  readonly knownBy: string;
  readonly typed: Readonly<Record<string, string>>;
}

/** "1480", "900-1500", "1,6 – 2,4": one number or a range; undefined while unfinished. */
export function parseRange(text: string): number | readonly [number, number] | undefined {
  const one = parseNumber(text);
  if (one !== undefined) return one;
  const parts = text.split(/\s*(?:-|–|…|\.\.|to)\s*/i);
  const [low, high] = parts.map(parseNumber);
  return parts.length === 2 && low !== undefined && high !== undefined ? [low, high] : undefined;
}

/** Unknown data for `parseSource`; a text that is no number stays text, so that the parser says what is wrong. */
export function draftToData(draft: SourceDraft, fallbackName: string): Record<string, unknown> {
  const data: Record<string, unknown> = { kind: draft.kind, name: draft.name.trim() || fallbackName };
  if (HAS_KNOWN_BY.includes(draft.kind) && draft.knownBy) data.knownBy = draft.knownBy;
  for (const field of SOURCE_FIELDS[draft.kind]) {
    const typed = draft.typed[field.key]?.trim() ?? '';
    if (typed !== '') data[field.key] = fieldValue(field, typed);
  }
  return data;
}

function fieldValue(field: SourceField, typed: string): unknown {
  switch (field.type) {
    case 'check':
      return typed === 'yes';
    case 'choice':
      return field.isNumber ? Number(typed) : typed;
    case 'list':
      return typed
        .split(/[;\s]+|,(?=\s)/)
        .filter(Boolean)
        .map((part) => parseNumber(part) ?? part);
    case 'measure': {
      const value = field.isRange ? parseRange(typed) : parseNumber(typed);
      if (value === undefined) return typed;
      return typeof value === 'number'
        ? scaled(value, field.perUnit)
        : value.map((end) => scaled(end, field.perUnit));
    }
  }
}

/** Twelve digits take away what the factor's binary form leaves (0.12 m from 120 mm). */
const scaled = (value: number, perUnit = 1) => Number((value * perUnit).toPrecision(12));

export function sourceToDraft(source: Source): SourceDraft {
  const values = source as unknown as Readonly<Record<string, unknown>>;
  const typed: Record<string, string> = {};
  for (const field of SOURCE_FIELDS[source.kind]) {
    const value = values[field.key];
    if (value !== undefined) typed[field.key] = shownValue(field, value);
  }
  return { kind: source.kind, name: source.name, knownBy: source.knownBy ?? '', typed };
}

function shownValue(field: SourceField, value: unknown): string {
  if (field.type === 'check') return value === true ? 'yes' : '';
  if (field.type !== 'measure') return Array.isArray(value) ? value.join(' ') : String(value);
  const unscaled = (number: unknown) => String(scaled(Number(number), 1 / (field.perUnit ?? 1)));
  return Array.isArray(value) ? value.map(unscaled).join(' – ') : unscaled(value);
}

/** A form that is ready to show its forcings where nothing has to be typed. */
export function emptyDraft(kind: SourceKind): SourceDraft {
  const typed: Record<string, string> = {};
  for (const field of SOURCE_FIELDS[kind])
    if (field.type === 'choice' && field.values[0]) typed[field.key] = field.values[0];
  return { kind, name: '', knownBy: '', typed };
}
