import type { Interval } from '../model/interval.ts';
import type { Separation, WayOut } from '../model/judgement.ts';
import type { Forcing } from '../model/source.ts';
import { transmissibility } from './amplification.ts';
import type { WaysOutContext } from './ways-out-context.ts';

/** Standard gravity, m/s². */
export const STANDARD_GRAVITY_MPS2 = 9.80665;
/** Damping ratio of mounts, from steel springs to neoprene (vendor practice, from memory, .55: indicative). */
export const MOUNT_DAMPING_RATIO: Interval = [0.005, 0.1];
/** Mounts softer than this static deflection are rarely built, m (common practice, no source): 50 mm is 2.2 Hz. */
export const PRACTICAL_DEFLECTION_M = 0.05;

/** Static deflection of a mass on springs with this natural frequency: g / (2 pi f)². */
export const staticDeflectionM = (frequencyHz: number): number =>
  STANDARD_GRAVITY_MPS2 / (2 * Math.PI * frequencyHz) ** 2;

/** Natural frequency of a mass that sinks so far on its springs; 15.76/sqrt(mm) (Thomson & Dahleh, Example 2.2-1). */
export const frequencyFromDeflectionHz = (deflectionM: number): number =>
  Math.sqrt(STANDARD_GRAVITY_MPS2 / deflectionM) / (2 * Math.PI);

/** Mount frequency for a wanted undamped transmissibility T = 1/(r² - 1): f / sqrt(1 + 1/T). */
export const mountFrequencyHz = (forcingHz: number, wantedTransmissibilityRatio: number): number =>
  forcingHz / Math.sqrt(1 + 1 / wantedTransmissibilityRatio);

/** Range of the transmissibility over a band of forcing, mounts of unknown damping. */
function transmissibilityRange(forcingHz: Interval, mountHz: number): Interval {
  const values = forcingHz.flatMap((frequencyHz) =>
    MOUNT_DAMPING_RATIO.map((damping) => transmissibility(frequencyHz / mountHz, damping)),
  );
  return [Math.min(...values), Math.max(...values)];
}

const ISOLATED_KINDS: readonly Forcing['sourceKind'][] = ['machine', 'belt', 'mains', 'traffic'];

/**
 * Isolation of the machine from the structure (or of the structure from the ground). The pair stays as near as it was: less of the
 * forcing arrives. Every forcing of the source that the mounts themselves would sit near is named.
 */
export function isolationWay(separationIndex: number, context: WaysOutContext): WayOut | undefined {
  const separation = context.separations[separationIndex] as Separation;
  const forcing = context.forcings[separation.forcingIndex] as Forcing;
  if (!ISOLATED_KINDS.includes(forcing.sourceKind) && forcing.amplificationKind !== 'base') return undefined;
  const { wantedTransmissibilityRatio, apartBelowRatio, apartAboveRatio } = context.thresholds;
  const mountHz = mountFrequencyHz(forcing.frequencyHz[0], wantedTransmissibilityRatio);
  const factor = transmissibilityRange(forcing.frequencyHz, mountHz);
  const [low, high] = separation.amplification.interval;
  const deflection = staticDeflectionM(mountHz);
  const mountsNearIndex = context.forcings.flatMap((other, index) => {
    const near =
      other.frequencyHz[1] > apartBelowRatio * mountHz && other.frequencyHz[0] < apartAboveRatio * mountHz;
    return near ? [index] : [];
  });
  return {
    kind: 'isolation',
    separationIndex,
    factor,
    targetHz: [mountHz, mountHz],
    staticDeflectionM: deflection,
    practical: deflection <= PRACTICAL_DEFLECTION_M,
    amplificationAfter: [low * factor[0], high * factor[1]],
    verdictAfter: separation.verdict,
    mountsNearIndex,
    sideEffects: [],
  };
}
