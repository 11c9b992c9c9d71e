import { readFileSync } from 'node:fs';

/** Reference vectors made by SciPy (test/golden/generate_signal.py). */
export interface SignalGolden {
  readonly fft: readonly {
    readonly size: number;
    readonly seed: number;
    readonly re: number[];
    readonly im: number[];
  }[];
  readonly windows: Readonly<Record<string, number[]>>;
  readonly welch: {
    readonly seed: number;
    readonly count: number;
    readonly rateHz: number;
    readonly segment: number;
    readonly density: number[];
  };
  readonly weighting: { readonly frequencyHz: number[]; readonly Wk: number[]; readonly Wd: number[] };
  readonly line: { readonly seed: number; readonly count: number; readonly left: number[] };
}

export const signalGolden = (): SignalGolden =>
  JSON.parse(readFileSync(new URL('../golden/signal.json', import.meta.url), 'utf8')) as SignalGolden;

/** The generator's own numbers, -1..1: a linear congruential sequence any language can repeat. */
export function congruential(count: number, seed: number): Float64Array {
  let x = seed;
  return Float64Array.from({ length: count }, () => {
    x = (Math.imul(1103515245, x) + 12345) & 0x7fffffff;
    return x / 2 ** 30 - 1;
  });
}
