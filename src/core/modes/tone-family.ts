import type { Tone } from '../model/analysis.ts';

/** Orders looked for; a walker's stride or a four-stroke's half order shows as its own fundamental. */
const HIGHEST_ORDER = 12;
/** A multiple may be off by this share of its frequency, or three standard deviations and one over the record. */
const FAMILY_TOLERANCE_RATIO = 0.003;

/**
 * Marks tones that are whole multiples of one of them: each gets the fundamental of the largest family it fits in, and its order.
 * @param resolutionHz reciprocal of the record's duration
 */
export function withFamilies(tones: readonly Tone[], resolutionHz: number): Tone[] {
  const isMultiple = (base: Tone, tone: Tone): number => {
    const order = Math.round(tone.frequencyHz / base.frequencyHz);
    if (order < 1 || order > HIGHEST_ORDER) return 0;
    const slack =
      Math.max(
        FAMILY_TOLERANCE_RATIO * tone.frequencyHz,
        3 * Math.hypot(tone.frequencySdHz, order * base.frequencySdHz),
      ) + (base === tone ? 0 : 0.5 * resolutionHz);
    return Math.abs(tone.frequencyHz - order * base.frequencyHz) <= slack ? order : 0;
  };
  const families = tones
    .map((base) => ({ base, members: tones.filter((tone) => isMultiple(base, tone) > 0) }))
    .filter((family) => family.members.length > 1)
    .sort((a, b) => b.members.length - a.members.length);
  return tones.map((tone) => {
    const family = families.find((f) => f.members.includes(tone));
    if (!family) return tone;
    return { ...tone, familyHz: family.base.frequencyHz, familyOrder: isMultiple(family.base, tone) };
  });
}
