/** The five calls of a CouchDB server over a map, as a `fetch`: quick enough for many phones and many cuts. */

interface Kept {
  readonly document: Record<string, unknown>;
  readonly raw?: Uint8Array<ArrayBuffer>;
}

export interface MemoryCouch {
  readonly fetch: (url: string, init: RequestInit) => Promise<Response>;
  /** By id: what lies there. A second revision of an id would be counted in `conflictCount`. */
  readonly documents: Map<string, Kept>;
  readonly conflictCount: number;
}

export function memoryCouch(): MemoryCouch {
  const documents = new Map<string, Kept>();
  const order: string[] = [];
  let conflictCount = 0;
  const put = (document: Record<string, unknown>, raw?: Uint8Array<ArrayBuffer>): void => {
    const id = String(document['_id']);
    const here = documents.get(id);
    if (here?.document['_rev'] !== document['_rev'] && here !== undefined) conflictCount += 1;
    if (here !== undefined) return;
    const { _revisions, _attachments, ...content } = document;
    documents.set(id, { document: content, ...(raw === undefined ? {} : { raw }) });
    order.push(id);
  };

  const answers = async (url: URL, init: RequestInit): Promise<Response> => {
    const path = url.pathname.replace(/^\/team/, '');
    const body = init.body instanceof Blob ? new Uint8Array(await init.body.arrayBuffer()) : new Uint8Array();
    if (path === '/_revs_diff') {
      const asked = JSON.parse(text(body)) as Record<string, string[]>;
      const missing = Object.entries(asked).filter(
        ([id, [revision]]) => documents.get(id)?.document['_rev'] !== revision,
      );
      return json(Object.fromEntries(missing.map(([id, revisions]) => [id, { missing: revisions }])));
    }
    if (path === '/_bulk_docs') {
      const { docs } = JSON.parse(text(body)) as { docs: Record<string, unknown>[] };
      docs.forEach((document) => put(document));
      return json([]);
    }
    if (path === '/_changes') return json(changes(url.searchParams));
    const id = decodeURIComponent(path.split('/')[1]!);
    if (init.method === 'PUT') {
      const { document, raw } = partsOf(body, new Headers(init.headers).get('Content-Type')!);
      put(document, raw);
      return json({ ok: true, id, rev: document['_rev'] }, 201);
    }
    const raw = documents.get(id)?.raw;
    return raw === undefined ? json({ error: 'not_found' }, 404) : new Response(raw);
  };

  const changes = (query: URLSearchParams): object => {
    const since = Number(query.get('since'));
    const ids = order.slice(since, since + Number(query.get('limit')));
    return {
      results: ids.map((id, index) => {
        const { document } = documents.get(id)!;
        const row = { seq: since + index + 1, id, changes: [{ rev: document['_rev'] }] };
        return query.has('include_docs') ? { ...row, doc: document } : row;
      }),
      last_seq: since + ids.length,
      pending: order.length - since - ids.length,
    };
  };

  return {
    fetch: (url, init) => answers(new URL(url), init),
    documents,
    get conflictCount() {
      return conflictCount;
    },
  };
}

const text = (bytes: Uint8Array): string => new TextDecoder().decode(bytes);
const json = (content: unknown, status = 200): Response =>
  new Response(JSON.stringify(content), { status, headers: { 'Content-Type': 'application/json' } });

/** Two parts of multipart/related (RFC 2387): the document, and as many bytes as it announces. */
function partsOf(
  body: Uint8Array,
  type: string,
): { readonly document: Record<string, unknown>; readonly raw: Uint8Array<ArrayBuffer> } {
  const boundary = /boundary="([^"]+)"/.exec(type)![1]!;
  const latin = new TextDecoder('latin1').decode(body);
  const first = latin.indexOf('\r\n\r\n') + 4;
  const second = latin.indexOf(`\r\n--${boundary}`, first);
  const document = JSON.parse(text(body.subarray(first, second))) as Record<string, unknown>;
  const attachments = document['_attachments'] as { raw: { length: number } };
  const start = latin.indexOf('\r\n\r\n', second) + 4;
  const raw = body.slice(start, start + attachments.raw.length) as Uint8Array<ArrayBuffer>;
  if (!latin.startsWith(`\r\n--${boundary}--`, start + raw.length)) throw new Error('malformed multipart');
  return { document, raw };
}
