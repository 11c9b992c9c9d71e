const POLYNOMIAL = 0xedb88320;

const TABLE = Uint32Array.from({ length: 256 }, (_, index) => {
  let value = index;
  for (let bit = 0; bit < 8; bit += 1) value = value & 1 ? POLYNOMIAL ^ (value >>> 1) : value >>> 1;
  return value >>> 0;
});

/** CRC-32 of ZIP and gzip (ISO 3309; RFC 1952, section 8), as an unsigned number. */
export function packetCrc(bytes: Uint8Array): number {
  let crc = 0xffffffff;
  for (let i = 0; i < bytes.length; i += 1) crc = TABLE[(crc ^ bytes[i]!) & 0xff]! ^ (crc >>> 8);
  return (crc ^ 0xffffffff) >>> 0;
}
