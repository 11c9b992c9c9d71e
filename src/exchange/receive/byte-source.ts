import type { ByteSource } from '../../core/packet/packet-zip-read.ts';

/** A file that is read in pieces, so that it need not fit into memory. */
export const blobSource = (blob: Blob): ByteSource => ({
  sizeBytes: blob.size,
  read: async (from, to) => new Uint8Array(await blob.slice(from, to).arrayBuffer()),
});

export const bytesSource = (bytes: Uint8Array): ByteSource => ({
  sizeBytes: bytes.length,
  read: async (from, to) => bytes.subarray(from, to),
});
