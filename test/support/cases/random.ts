/** Seeded randomness for tests: xoshiro128** (Blackman & Vigna 2018) started by splitmix32. */
export interface Random {
  /** Uniform in [low, high). */
  uniform(low: number, high: number): number;
  /** Log-uniform in [low, high), low > 0. */
  logUniform(low: number, high: number): number;
  /** Standard normal (Box & Muller 1958). */
  normal(): number;
  pick<T>(items: readonly T[]): T;
  chance(probability: number): boolean;
  integer(low: number, high: number): number;
  /** Unit vector, uniform over the sphere. */
  direction(): number[];
}

const rotateLeft = (x: number, k: number): number => ((x << k) | (x >>> (32 - k))) >>> 0;

function splitMix(seed: number): () => number {
  let state = seed >>> 0;
  return () => {
    state = (state + 0x9e3779b9) >>> 0;
    let z = state;
    z = Math.imul(z ^ (z >>> 16), 0x85ebca6b);
    z = Math.imul(z ^ (z >>> 13), 0xc2b2ae35);
    return (z ^ (z >>> 16)) >>> 0;
  };
}

/** @param seed any integers: equal seeds give equal sequences */
export function seededRandom(...seed: number[]): Random {
  const mix = splitMix(seed.reduce((sum, part) => (Math.imul(sum, 0x01000193) ^ part) >>> 0, 0x811c9dc5));
  const s = new Uint32Array([mix(), mix(), mix(), mix()]);
  const next = (): number => {
    const [a, b, c, d] = s as unknown as [number, number, number, number];
    const result = Math.imul(rotateLeft(Math.imul(b, 5) >>> 0, 7), 9) >>> 0;
    s[2] = c ^ a;
    s[3] = d ^ b;
    s[1] = b ^ (s[2] as number);
    s[0] = a ^ (s[3] as number);
    s[2] = (s[2] as number) ^ ((b << 9) >>> 0);
    s[3] = rotateLeft(s[3] as number, 11);
    return result;
  };
  const unit = (): number => (next() >>> 5) * 2 ** -27 + (next() >>> 6) * 2 ** -53;
  let spare: number | undefined;
  const normal = (): number => {
    if (spare !== undefined) {
      const value = spare;
      spare = undefined;
      return value;
    }
    const radius = Math.sqrt(-2 * Math.log(1 - unit()));
    const angle = 2 * Math.PI * unit();
    spare = radius * Math.sin(angle);
    return radius * Math.cos(angle);
  };
  const uniform = (low: number, high: number): number => low + (high - low) * unit();
  return {
    uniform,
    logUniform: (low, high) => Math.exp(uniform(Math.log(low), Math.log(high))),
    normal,
    pick: (items) => items[Math.floor(unit() * items.length)] as (typeof items)[number],
    chance: (probability) => unit() < probability,
    integer: (low, high) => Math.floor(uniform(low, high + 1)),
    direction: () => {
      const v = [normal(), normal(), normal()];
      const norm = Math.hypot(...v);
      return v.map((x) => x / norm);
    },
  };
}
