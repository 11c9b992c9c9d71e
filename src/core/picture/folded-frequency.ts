/**
 * Where a frequency appears in samples taken at `rateHz`: folded about multiples of half the rate (Nyquist), 0 to rate/2.
 * Misleads when the sampling itself scatters: then a high frequency is smeared as well as folded.
 */
export const foldedFrequencyHz = (frequencyHz: number, rateHz: number): number => {
  if (!(rateHz > 0)) throw new RangeError(`foldedFrequencyHz: rateHz must be > 0, got ${rateHz}`);
  const withinHz = frequencyHz % rateHz;
  return Math.min(withinHz, rateHz - withinHz);
};
