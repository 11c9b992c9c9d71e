import * as v from 'valibot';
import { ANALYSIS_VERSION } from '../model/analysis.ts';
import type { Fact, KnownFact } from '../model/fact.ts';
import type { Outcome } from '../model/outcome.ts';
import { failure, success } from '../model/outcome.ts';
import { isHarmless } from './parse-json.ts';
import { hasLoneSurrogate } from './canonical-json.ts';
import { FACT_SCHEMAS, factFrame } from './fact-schema.ts';

/** A fact with its content as it came: nothing added, nothing dropped, because the revision covers all of it. */
export type ParsedFact =
  { readonly known: true; readonly fact: KnownFact } | { readonly known: false; readonly fact: Fact };

/** Longest text of a fact, characters, all members together (our own bound; a reading has about 20,000). */
export const FACT_TEXT_LIMIT = 4_000_000;

/**
 * Understand a value from outside: a known fact, a fact of a newer kind or version (kept, not understood), or
 * `damaged` with the path of the first wrong member. Never throws.
 */
export function parseFact(value: unknown): Outcome<ParsedFact> {
  if (!isHarmless(value)) return failure('damaged', { path: '' });
  const frame = v.safeParse(factFrame, value);
  if (!frame.success) return damaged(frame.issues[0]);
  const fact = value as Fact;
  if (!fact._id.startsWith(`${fact.kind}:`)) return failure('damaged', { path: '_id' });
  if (!isTextSound(value)) return failure('damaged', { path: 'text' });
  if (!isKnownKind(fact.kind) || fact.v > 1) return success({ known: false, fact });
  const parsed = v.safeParse(FACT_SCHEMAS[fact.kind], value);
  if (parsed.success) return understood(value as KnownFact);
  return isFromNewerAnalysis(value) ? success({ known: false, fact }) : damaged(parsed.issues[0]);
}

function understood(fact: KnownFact): Outcome<ParsedFact> {
  if (fact.kind === 'erase' && fact._id !== `erase:${fact.target}`)
    return failure('damaged', { path: 'target' });
  return success({ known: true, fact });
}

function damaged(issue: v.BaseIssue<unknown>): Outcome<never> {
  const path = (issue.path ?? []).map((item) => String(item.key)).join('.');
  return failure('damaged', { path: path.slice(0, 200) });
}

function isKnownKind(kind: string): kind is keyof typeof FACT_SCHEMAS {
  return Object.hasOwn(FACT_SCHEMAS, kind);
}

/** A newer analysis may use codes that this code has no sentence for: kept and forwarded, not shown as ours. */
function isFromNewerAnalysis(value: unknown): boolean {
  const { analysis } = value as { analysis?: unknown };
  if (typeof analysis !== 'object' || analysis === null) return false;
  const { version } = analysis as { version?: unknown };
  return typeof version === 'number' && Number.isInteger(version) && version > ANALYSIS_VERSION;
}

function isTextSound(value: unknown): boolean {
  const text = JSON.stringify(value);
  return text.length <= FACT_TEXT_LIMIT && !hasEscapedSurrogate(value);
}

function hasEscapedSurrogate(value: unknown): boolean {
  if (typeof value === 'string') return hasLoneSurrogate(value);
  if (typeof value !== 'object' || value === null) return false;
  return Object.entries(value).some(([key, item]) => hasLoneSurrogate(key) || hasEscapedSurrogate(item));
}
