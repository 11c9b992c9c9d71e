import type { Analysis, Mode } from '../model/analysis.ts';

/** A change at the spot, as factors on the modal quantities of one mode. */
export interface StructuralChange {
  readonly modeIndex: number;
  readonly stiffnessFactor?: number;
  readonly massFactor?: number;
  readonly dampingRatio?: number;
}

/** A mode after a change. Stiffening keeps the loss factor; added mass keeps stiffness and damper, so damping ratio falls (Chopra, Example 3.4). */
function changedMode(mode: Mode, change: StructuralChange): Mode {
  const mass = change.massFactor ?? 1;
  const scale = Math.sqrt((change.stiffnessFactor ?? 1) / mass);
  const damping = change.dampingRatio ?? mode.dampingRatio / Math.sqrt(mass);
  return {
    ...mode,
    frequencyHz: mode.frequencyHz * scale,
    frequencySdHz: mode.frequencySdHz * scale,
    dampingRatio: damping,
    // A damping that is aimed at has no uncertainty of measurement.
    dampingRatioSd: change.dampingRatio === undefined ? mode.dampingRatioSd / Math.sqrt(mass) : 0,
    fold: { ...mode.fold, candidatesHz: mode.fold.candidatesHz.map((candidateHz) => candidateHz * scale) },
  };
}

/** The analysis as it would read after a change: what the sliders and the ways out are judged on. */
export function changedAnalysis(analysis: Analysis, change: StructuralChange): Analysis {
  const modes = analysis.modes.map((mode, index) =>
    index === change.modeIndex ? changedMode(mode, change) : mode,
  );
  return { ...analysis, modes };
}
