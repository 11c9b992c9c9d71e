/**
 * Largest running rms (linear averaging; the MTVV of ISO 2631-1 uses 1 s).
 * @param samples uniform, any unit, length n
 * @param windowSamples averaging length; cut to n
 * @returns same unit; 0 for no samples
 */
export function largestRunningRms(samples: ArrayLike<number>, windowSamples: number): number {
  const n = samples.length;
  const width = Math.max(1, Math.min(n, Math.round(windowSamples)));
  let sum = 0;
  let largest = 0;
  for (let i = 0; i < n; i++) {
    sum += samples[i]! ** 2;
    if (i >= width) sum -= samples[i - width]! ** 2;
    if (i >= width - 1) largest = Math.max(largest, sum);
  }
  return n ? Math.sqrt(Math.max(0, largest) / width) : 0;
}

export function rms(samples: ArrayLike<number>): number {
  let sum = 0;
  for (let i = 0; i < samples.length; i++) sum += samples[i]! ** 2;
  return samples.length ? Math.sqrt(sum / samples.length) : 0;
}

export function peak(samples: ArrayLike<number>): number {
  let largest = 0;
  for (let i = 0; i < samples.length; i++) largest = Math.max(largest, Math.abs(samples[i]!));
  return largest;
}
