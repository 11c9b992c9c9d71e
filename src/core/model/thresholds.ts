/** What the person may set. Every default with its origin. */
export interface Thresholds {
  /** Coincident within this of 1, or within the half-power band where that is wider. */
  readonly coincidentRatio: number;
  /** Apart at or below this ratio, and at or above the other. */
  readonly apartBelowRatio: number;
  readonly apartAboveRatio: number;
  /** Relative half-width (95 %) for holding a mode found at rest against a running machine. */
  readonly stoppedRunningRatio: number;
  /** Amplification (for people times their load factor) from which a coincidence calls for a specialist. */
  readonly specialistAmplificationRatio: number;
  /** Amplification that the damping way out aims at. */
  readonly wantedAmplificationRatio: number;
  /** Transmissibility that the isolation way out aims at. */
  readonly wantedTransmissibilityRatio: number;
}
