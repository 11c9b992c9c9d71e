/** What the store takes from the machine: replaced in tests. */
export interface StoreEnvironment {
  nowMs(): number;
  nowIso(): string;
  randomBytes(count: number): Uint8Array;
}

export const browserEnvironment: StoreEnvironment = {
  nowMs: () => Date.now(),
  nowIso: () => new Date().toISOString(),
  randomBytes: (count) => crypto.getRandomValues(new Uint8Array(count)),
};
