/** How the energy of a record goes up and down: taps rise at once and ring out, everything else takes its time both ways. */
export interface EnergyShape {
  /** Largest sudden rise: ln of energy after over energy before, within about a third of a second. */
  readonly rise: number;
  /** Largest sudden fall, the same with time reversed. */
  readonly fall: number;
  /** Share of the record (0..1) before its loudest moment. */
  readonly loudestAt: number;
  /** ln of the energy in the first tenth over the last tenth. */
  readonly declineLog: number;
}

/** Length of one energy, s. */
const STEP_S = 0.1;
/** Energies before and after that are compared. */
const BEFORE_STEPS = 4;
const AFTER_STEPS = 3;

/** @param axes uniform samples per axis; undefined for records of less than 2 s */
export function energyShape(axes: readonly Float64Array[], periodS: number): EnergyShape | undefined {
  const step = Math.max(2, Math.round(STEP_S / periodS));
  const count = Math.floor((axes[0]?.length ?? 0) / step);
  if (count < 12) return undefined;
  const energy = Float64Array.from({ length: count }, (_, k) => {
    let sum = 0;
    for (const axis of axes) for (let i = k * step; i < (k + 1) * step; i++) sum += (axis[i] as number) ** 2;
    return sum;
  });
  const most = (from: number, to: number): number =>
    energy.subarray(from, to).reduce((m, v) => Math.max(m, v), 1e-12);
  let rise = 0;
  let fall = 0;
  for (let k = BEFORE_STEPS; k < count - BEFORE_STEPS; k++) {
    rise = Math.max(rise, Math.log(most(k, k + AFTER_STEPS) / most(k - BEFORE_STEPS, k)));
    fall = Math.max(fall, Math.log(most(k - AFTER_STEPS + 1, k + 1) / most(k + 1, k + 1 + BEFORE_STEPS)));
  }
  const tenth = Math.max(1, Math.floor(count / 10));
  const loudest = energy.reduce((best, v, k) => (v > (energy[best] as number) ? k : best), 0);
  const sum = (from: number, to: number): number => energy.subarray(from, to).reduce((s, v) => s + v, 1e-12);
  return {
    rise,
    fall,
    loudestAt: loudest / count,
    declineLog: Math.log(sum(0, tenth) / sum(count - tenth, count)),
  };
}
