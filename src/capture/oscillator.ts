/**
 * One driven, damped oscillator of unit mass, stepped exactly: between steps the force is constant, so position and
 * speed follow the closed solution (any textbook on vibration, e.g. Thomson & Dahleh, chapter 4).
 */
export class Oscillator {
  readonly #stiffness: number;
  readonly #friction: number;
  readonly #omega: number;
  readonly #dampingRatio: number;
  #position = 0;
  #speed = 0;
  #force = 0;

  constructor(frequencyHz: number, dampingRatio: number) {
    this.#omega = 2 * Math.PI * frequencyHz;
    this.#dampingRatio = dampingRatio;
    this.#stiffness = this.#omega ** 2;
    this.#friction = 2 * dampingRatio * this.#omega;
  }

  /** A blow much shorter than a period: a jump of speed, m/s. */
  strike(speedMps: number): void {
    this.#speed += speedMps;
  }

  /** Move on by `stepS` under a force per mass, m/s². */
  advance(stepS: number, forceMps2: number): void {
    const [position, speed] = this.#after(stepS, forceMps2);
    this.#position = position;
    this.#speed = speed;
    this.#force = forceMps2;
  }

  /** Acceleration by spring and damper `aheadS` after the last step, m/s²: add the force per mass for all of it. */
  restoring(aheadS: number): number {
    const [position, speed] = this.#after(aheadS, this.#force);
    return -this.#stiffness * position - this.#friction * speed;
  }

  #after(stepS: number, forceMps2: number): readonly [number, number] {
    const rest = forceMps2 / this.#stiffness;
    const decay = this.#dampingRatio * this.#omega;
    const damped = this.#omega * Math.sqrt(1 - this.#dampingRatio ** 2);
    const x0 = this.#position - rest;
    const factor = Math.exp(-decay * stepS);
    const cosine = Math.cos(damped * stepS);
    const sine = Math.sin(damped * stepS);
    const position = factor * (x0 * cosine + ((this.#speed + decay * x0) / damped) * sine);
    const speed =
      factor * (this.#speed * cosine - ((decay * this.#speed + this.#stiffness * x0) / damped) * sine);
    return [rest + position, speed];
  }
}
