import { Oscillator } from './oscillator.ts';
import type { RigParameters } from './rig-parameters.ts';
import { seededChance, type Chance } from './seeded-chance.ts';

/** Step of the simulated structure, s: 16 steps in the period of the highest machine harmonic that matters. */
const STEP_S = 1 / 1920;
const GRAVITY_MPS2 = 9.81;
const GAP_S = 0.3;
/** Finer steps are no rounding: single precision is about that coarse, m/s². */
const FINEST_STEP_MPS2 = 1e-6;
/** First tap after the person was told to begin, s. */
const FIRST_TAP_S = 1.5;
/** Machine rests this long before it is switched off, s. */
const BEFORE_COAST_S = 5;
/** Harmonics of the machine: order and share of the unbalance (invented, common practice has such lines). */
const MACHINE_LINES = [
  [1, 1],
  [2, 0.4],
  [4, 0.2],
] as const;
/** Motion of each mode in the phone's axes: mostly across, then mostly up. */
const DIRECTIONS = [
  [0.36, 0.1, 0.93],
  [0.9, 0.2, 0.39],
  [0.2, 0.97, 0.12],
] as const;

/** How much of a force on the spot each mode takes. */
const shareOf = (modeIndex: number): number => (modeIndex === 0 ? 1 : 0.4);

export interface RigSample {
  /** Stamp as the browser would give it, s since the rig began. */
  readonly stampS: number;
  readonly x: number;
  readonly y: number;
  readonly z: number;
}

/** A simulated phone on a simulated, invented structure. Same parameters and same seed, same samples. */
export class PracticeRig {
  readonly #parameters: RigParameters;
  readonly #chance: Chance;
  readonly #modes: readonly Oscillator[];
  readonly #gravity: readonly [number, number, number];
  readonly #driveScales: readonly number[];
  #stepCount = 0;
  #sampleIndex = 0;
  #lastStampS = -Infinity;
  #gapUntilS = 0;
  #machineTurns = 0;
  #tapTimesS: number[] = [];
  #coastFromS = Infinity;
  #force = 0;
  #contact = { fromS: -Infinity, speedMps: 0 };

  constructor(parameters: RigParameters) {
    this.#parameters = parameters;
    this.#chance = seededChance(parameters.seed);
    this.#modes = parameters.modes.map(
      ({ frequencyHz, dampingRatio }) => new Oscillator(frequencyHz, dampingRatio),
    );
    const { tiltRad } = parameters;
    this.#gravity = [
      GRAVITY_MPS2 * Math.sin(tiltRad) * 0.6,
      GRAVITY_MPS2 * Math.sin(tiltRad) * 0.8,
      GRAVITY_MPS2 * Math.cos(tiltRad),
    ];
    // White force of deviation s held over steps h gives a mode the rms s sqrt(omega h / (4 zeta)) (Crandall & Mark 1963).
    this.#driveScales = parameters.modes.map(({ frequencyHz, dampingRatio }) => {
      const omega = 2 * Math.PI * frequencyHz;
      return Math.sqrt((4 * dampingRatio) / (omega * STEP_S)) * parameters.ambientMps2;
    });
  }

  /** The person acts now: taps follow, or the machine is switched off. */
  act(): void {
    const { tapCount, tapIntervalS, coastS } = this.#parameters;
    const nowS = this.#nowS();
    this.#tapTimesS = Array.from(
      { length: tapCount },
      (_, i) => nowS + FIRST_TAP_S + i * tapIntervalS * (1 + 0.04 * this.#chance.normal()),
    );
    if (coastS > 0) this.#coastFromS = nowS + BEFORE_COAST_S;
  }

  /** Next sample of the sensor, or undefined when it was lost in a gap. */
  next(): RigSample | undefined {
    const { rateHz, jitterS, lateS, gapsPerMinute } = this.#parameters;
    const nominalS = this.#sampleIndex / rateHz;
    this.#sampleIndex += 1;
    const scatterS = Math.max(-0.45 / rateHz, Math.min(0.45 / rateHz, jitterS * this.#chance.normal()));
    const timeS = Math.max(this.#nowS(), nominalS + scatterS);
    this.#advanceTo(timeS);
    const sample = this.#sampleAt(timeS);
    const stampS = Math.max(this.#lastStampS + 1e-4, timeS + lateS * this.#chance.exponential());
    if (this.#chance.uniform() < gapsPerMinute / 60 / rateHz) this.#gapUntilS = nominalS + GAP_S;
    if (nominalS < this.#gapUntilS) return undefined;
    this.#lastStampS = stampS;
    return { stampS: Math.round(stampS * 1e4) / 1e4, ...sample };
  }

  #nowS(): number {
    return this.#stepCount * STEP_S;
  }

  #advanceTo(timeS: number): void {
    while (this.#nowS() + STEP_S <= timeS) {
      const nowS = this.#nowS();
      this.#giveTaps(nowS);
      this.#force = this.#machineForce(nowS) + this.#handlingForce(nowS) + this.#contactForce(nowS);
      this.#modes.forEach((mode, i) => {
        mode.advance(STEP_S, shareOf(i) * this.#force + this.#driveScales[i]! * this.#chance.normal());
      });
      this.#stepCount += 1;
    }
  }

  /** Taps that are due: at once as a blow, or as the beginning of a contact. */
  #giveTaps(nowS: number): void {
    while (this.#tapTimesS[0] !== undefined && this.#tapTimesS[0] <= nowS) {
      this.#tapTimesS.shift();
      const strength = this.#parameters.tapStrengthMps2 * (1 + 0.15 * this.#chance.normal());
      const speedMps = strength / (2 * Math.PI * this.#parameters.modes[0]!.frequencyHz);
      if (this.#parameters.contactS === 0)
        this.#modes.forEach((mode, i) => mode.strike(speedMps * shareOf(i)));
      else this.#contact = { fromS: nowS, speedMps };
    }
  }

  /** Half a sine whose impulse is that of the blow, m/s². */
  #contactForce(nowS: number): number {
    const { contactS } = this.#parameters;
    const { fromS, speedMps } = this.#contact;
    const share = (nowS - fromS) / contactS;
    if (!(share >= 0 && share <= 1)) return 0;
    return ((Math.PI / 2) * speedMps * Math.sin(Math.PI * share)) / contactS;
  }

  #machineForce(nowS: number): number {
    const { speedRpm, unbalanceMps2, coastS } = this.#parameters;
    if (speedRpm <= 0 || unbalanceMps2 <= 0) return 0;
    const left = coastS > 0 ? 1 - Math.max(0, nowS - this.#coastFromS) / coastS : 1;
    const speedRatio = Math.max(0, left);
    this.#machineTurns += (speedRpm / 60) * speedRatio * STEP_S;
    const turn = 2 * Math.PI * this.#machineTurns;
    // Unbalance grows with the square of the speed.
    return MACHINE_LINES.reduce(
      (sum, [order, share]) => sum + unbalanceMps2 * share * speedRatio ** 2 * Math.sin(order * turn + order),
      0,
    );
  }

  #handlingForce(nowS: number): number {
    const { handlingS } = this.#parameters;
    if (nowS >= handlingS) return 0;
    return 1.5 * this.#chance.normal() * Math.exp((-4 * nowS) / handlingS);
  }

  #sampleAt(timeS: number): { readonly x: number; readonly y: number; readonly z: number } {
    const aheadS = timeS - this.#nowS();
    const [x, y, z] = [0, 1, 2].map((axis) => {
      let value = this.#gravity[axis]!;
      this.#modes.forEach((mode, i) => {
        value += (mode.restoring(aheadS) + shareOf(i) * this.#force) * DIRECTIONS[i % 3]![axis]!;
      });
      return this.#asSensed(value + this.#parameters.noiseMps2 * this.#chance.normal());
    }) as [number, number, number];
    return { x, y, z };
  }

  /** Full scale, then rounding half away from zero, as browsers do. */
  #asSensed(value: number): number {
    const { rangeMps2, stepMps2 } = this.#parameters;
    const clipped = Math.max(-rangeMps2, Math.min(rangeMps2, value));
    if (stepMps2 < FINEST_STEP_MPS2) return clipped;
    return Math.sign(clipped) * Math.floor(Math.abs(clipped) / stepMps2 + 0.5) * stepMps2;
  }
}
