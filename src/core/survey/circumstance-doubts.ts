/** Doubts that the recording alone cannot raise: they come of how and where the phone lay. */
import type { Analysis } from '../model/analysis.ts';
import type { Doubt } from '../model/doubt.ts';
import type { Circumstances } from '../model/fact.ts';
import type { Place } from '../model/place.ts';
import { massShiftRatio } from './added-mass.ts';
import { STANDARD_GRAVITY_MPS2 } from './isolation.ts';

/** A phone that merely lies slips or lifts above this (common practice, no source). */
export const LOOSE_LIMIT_MPS2 = 0.3 * STANDARD_GRAVITY_MPS2;
/** Phone with case, where its mass is not given (common practice, no source). */
export const USUAL_PHONE_MASS_KG = 0.2;
/** Modal mass of a light rail or tube at a spot, for telling what a phone may do to it (our own estimate: 3 to 6 kg). */
export const LIGHT_MODAL_MASS_KG = 3;
/**
 * One decay of a floor that reads more damping than this is more likely the sum of close modes: SCI P354 Table 4.1 gives 3 % for a
 * fitted floor and 4.5 % only with partitions placed to interrupt the mode; Allen & Murray 1993 give 5 % with full-height partitions.
 */
export const FLOOR_DAMPING_LIMIT_RATIO = 0.04;

type Given = Partial<Circumstances>;

function isFloor(circumstances: Given, place: Place | undefined): boolean {
  const { surface, excitation } = circumstances;
  if (place) return place.kind === 'floor';
  return surface === 'floor' || excitation === 'heel-drop' || excitation === 'bounce-and-stop';
}

/** Strongest motion that the reading knows of, m/s². */
const strongestMps2 = (analysis: Analysis): number =>
  Math.max(analysis.levels?.peakMps2 ?? 0, ...analysis.modes.map((mode) => mode.amplitudeMps2));

const isLight = (circumstances: Given, place: Place | undefined): boolean =>
  circumstances.surface === 'tube' || place?.kind === 'handrail' || place?.kind === 'pipe';

function phoneMass(circumstances: Given): Doubt {
  const phoneMassKg = circumstances.phoneMassKg ?? USUAL_PHONE_MASS_KG;
  const shiftRatio = massShiftRatio(phoneMassKg, LIGHT_MODAL_MASS_KG);
  return { code: 'phone-mass', facts: { phoneMassKg, shiftRatio, modalMassKg: LIGHT_MODAL_MASS_KG } };
}

/** Doubts of the circumstances, none twice and none that the analysis has already. */
export function circumstanceDoubts(
  analysis: Analysis,
  circumstances: Given,
  place: Place | undefined,
): readonly Doubt[] {
  const doubts: Doubt[] = [];
  const strongest = strongestMps2(analysis);
  if (circumstances.mounting === 'unknown') doubts.push({ code: 'mounting-unknown' });
  if (circumstances.mounting === 'laid' && strongest > LOOSE_LIMIT_MPS2)
    doubts.push({ code: 'loose-and-strong', facts: { peakMps2: strongest } });
  if (analysis.modes.length > 0 && isLight(circumstances, place)) doubts.push(phoneMass(circumstances));
  const dampingRatio = analysis.modes[0]?.dampingRatio ?? 0;
  const oneDecay = analysis.procedure === 'tap' && isFloor(circumstances, place);
  if (oneDecay && dampingRatio > FLOOR_DAMPING_LIMIT_RATIO)
    doubts.push({ code: 'one-decay-close-modes', facts: { dampingRatio } });
  const held = new Set(analysis.doubts.map(({ code }) => code));
  return doubts.filter(({ code }) => !held.has(code));
}
