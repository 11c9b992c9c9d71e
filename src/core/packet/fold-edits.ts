import type { EditFact, Entity, EntityKind, FieldValue } from '../model/fact.ts';
import { canonicalJson } from './canonical-json.ts';
import { parseIsoStamp } from './iso-time.ts';

/**
 * Current state of an entity from all its edits, in any order. Per field: the value of the edit that no other edit
 * replaces. Several of them were written unknown to each other: the latest by (`at`, `device`, id) is shown and all
 * are listed as a conflict if their values differ. No clock decides what is kept: only what is shown until a person chooses.
 */
export function foldEdits(id: string, edits: Iterable<EditFact>): Entity {
  const own = uniqueOf(edits, id);
  const fields: [string, FieldValue][] = [];
  const conflicts: [string, Entity['conflicts'][string]][] = [];
  for (const [field, setters] of settersByField(own)) {
    const heads = headsOf(field, setters);
    fields.push([field, heads.at(-1)!.set[field]!]);
    const different = new Set(heads.map((edit) => canonicalJson(edit.set[field])));
    if (different.size > 1) conflicts.push([field, heads.map((edit) => asChoice(edit, field))]);
  }
  const folded = Object.fromEntries(fields);
  return {
    id,
    kind: id.slice(0, id.indexOf(':')) as EntityKind,
    fields: folded,
    conflicts: Object.fromEntries(conflicts),
    trashed: folded['trashed'] === true,
  };
}

/**
 * Ids of the edits that a new edit of `field` replaces: all that are current now, so that choosing ends a conflict.
 */
export function currentEdits(id: string, field: string, edits: Iterable<EditFact>): readonly string[] {
  const setters = uniqueOf(edits, id).filter((edit) => Object.hasOwn(edit.set, field));
  return headsOf(field, setters).map((edit) => edit._id);
}

function uniqueOf(edits: Iterable<EditFact>, entity: string): EditFact[] {
  const byId = new Map<string, EditFact>();
  for (const edit of edits) if (edit.entity === entity && !byId.has(edit._id)) byId.set(edit._id, edit);
  return [...byId.values()].sort(byAge);
}

/** Oldest first by what the writers said; ids break ties, so that every device shows the same. */
function byAge(a: EditFact, b: EditFact): number {
  const aTimeS = instantS(a.at);
  const bTimeS = instantS(b.at);
  if (aTimeS !== bTimeS) return aTimeS - bTimeS;
  if (a.device !== b.device) return a.device < b.device ? -1 : 1;
  return a._id < b._id ? -1 : 1;
}

function instantS(at: string): number {
  const stamp = parseIsoStamp(at);
  return stamp === undefined ? 0 : stamp.wholeS + stamp.fractionS;
}

function settersByField(edits: readonly EditFact[]): [string, EditFact[]][] {
  const setters = new Map<string, EditFact[]>();
  for (const edit of edits) {
    for (const field of Object.keys(edit.set)) setters.set(field, [...(setters.get(field) ?? []), edit]);
  }
  return [...setters].sort(([a], [b]) => (a < b ? -1 : 1));
}

/** The edits of one field that no other replaces. A ring of edits replacing each other would hide all: then all stand. */
function headsOf(field: string, setters: readonly EditFact[]): readonly EditFact[] {
  const replaced = new Set<string>();
  for (const edit of setters) {
    for (const id of edit.over[field] ?? []) if (id !== edit._id) replaced.add(id);
  }
  const heads = setters.filter((edit) => !replaced.has(edit._id));
  return heads.length > 0 ? heads : setters;
}

function asChoice(edit: EditFact, field: string): Entity['conflicts'][string][number] {
  return { edit: edit._id, value: edit.set[field]!, device: edit.device, at: edit.at };
}
