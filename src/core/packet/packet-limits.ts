import { FACT_TEXT_LIMIT } from './parse-fact.ts';

/*
 * Bounds on what a packet may hold. Above them a file is damaged or made to hurt. All are our own, several times what
 * ten years of daily work make.
 */
/** Entries of a packet. */
export const PACKET_ENTRY_LIMIT = 300_000;
/** Largest JSON entry, bytes unpacked. */
export const PACKET_FACT_LIMIT_BYTES = FACT_TEXT_LIMIT;
/** Largest attachment, bytes unpacked: a recording at its limit of samples (raw-recording.ts). */
export const PACKET_RAW_LIMIT_BYTES = 160_000_000;
/** A recording packs 2 to 20 times, JSON up to 30 times; zeros would pack 1030 times (RFC 1951's limit). */
export const PACKET_RATIO_LIMIT = 200;
/** What is small may pack as it likes, bytes unpacked. */
export const PACKET_RATIO_FREE_BYTES = 65_536;
/** A ZIP without 64-bit offsets ends here. */
export const PACKET_SIZE_LIMIT_BYTES = 0xffff_0000;
/** Largest report that is searched for a packet, bytes. */
export const PACKET_REPORT_LIMIT_BYTES = 400_000_000;
/** Names of entries, characters. */
export const PACKET_NAME_LIMIT = 300;
