import type { Fact } from '../../core/model/fact.ts';

/** Name of a fact's one attachment. */
export const ATTACHMENT = 'raw';

/** A fact as the server keeps it: its one revision is its whole history. */
export function documentOf(fact: Fact, revision: string): Record<string, unknown> {
  return { ...fact, _rev: revision, _revisions: { start: 1, ids: [revision.slice(2)] } };
}

/**
 * A fact with its attachment as multipart/related (RFC 2387), the form in which CouchDB takes both in one step. The bytes go as
 * they lie in the phone's store: a reading's are gzip already and are named so, not unpacked and packed again by the server.
 */
export function multipartFact(
  fact: Fact,
  revision: string,
  raw: Uint8Array,
): { readonly type: string; readonly body: Blob } {
  // Made of the content's own hash: it cannot stand in the content by accident.
  const boundary = `thrumbook-${revision.slice(2)}`;
  const contentType = contentTypeOf(fact);
  const json = JSON.stringify({
    ...documentOf(fact, revision),
    _attachments: { [ATTACHMENT]: { content_type: contentType, follows: true, length: raw.length } },
  });
  const head = [
    `--${boundary}`,
    'Content-Type: application/json',
    '',
    json,
    `--${boundary}`,
    `Content-Disposition: attachment; filename="${ATTACHMENT}"`,
    `Content-Type: ${contentType}`,
    `Content-Length: ${raw.length}`,
    '',
    '',
  ].join('\r\n');
  return {
    type: `multipart/related; boundary="${boundary}"`,
    body: new Blob([head, raw as Uint8Array<ArrayBuffer>, `\r\n--${boundary}--`]),
  };
}

function contentTypeOf({ kind }: Fact): string {
  if (kind === 'reading') return 'application/gzip';
  return kind === 'photo' ? 'image/jpeg' : 'application/octet-stream';
}
