import type { StorePort, Watch } from '../../app/ports.ts';
import type { Fact } from '../../core/model/fact.ts';
import type { PacketFact } from '../../core/packet/packet-examine.ts';
import { gzipOfBody, packedBody, type ByteSource } from '../../core/packet/packet-zip-read.ts';

/** One transaction holds so many facts or bytes of attachments: quick, and little is lost when it is cut. */
const STEP_COUNT = 60;
const STEP_BYTES = 8_000_000;

interface Step {
  readonly facts: { readonly fact: Fact; readonly raw?: Uint8Array }[];
  bytes: number;
}

/** Puts the facts of an examined packet into the store, step by step; the store checks shape and hash once more. */
export async function takeFacts(
  store: Pick<StorePort, 'putFacts'>,
  source: ByteSource,
  facts: readonly PacketFact[],
  { signal, onProgress }: Watch,
): Promise<{ added: number; damaged: readonly string[] }> {
  let added = 0;
  const damaged: string[] = [];
  let step: Step = { facts: [], bytes: 0 };
  const put = async () => {
    signal.throwIfAborted();
    const outcome = await store.putFacts(step.facts);
    added += outcome.added;
    damaged.push(...outcome.damaged);
    step = { facts: [], bytes: 0 };
  };
  for (const [index, { fact, raw }] of facts.entries()) {
    const bytes = raw && (await packedBody(source, raw));
    // Bytes of its own: what was read ahead is let go.
    const own = raw && bytes && (raw.isPacked ? gzipOfBody(raw, bytes) : bytes.slice());
    step.facts.push({ fact, ...(own ? { raw: own } : {}) });
    step.bytes += own?.length ?? 0;
    if (step.facts.length >= STEP_COUNT || step.bytes >= STEP_BYTES) await put();
    onProgress((index + 1) / facts.length);
  }
  if (step.facts.length > 0) await put();
  return { added, damaged };
}
