/**
 * Acceleration of one mode driven by a rotating unbalance whose speed follows a polynomial, at any sample times.
 * The mode is split into its two poles; the resonant one is integrated exactly between samples in the frame that turns
 * with the machine (Gauss-Legendre quadrature of the slowly turning source), the other follows by its expansion.
 */

/** Speed f = b0 + b1·u + b2·u² ..., u = (t - centreS) / halfS, Hz. */
export interface Sweep {
  readonly centreS: number;
  readonly halfS: number;
  readonly speedHz: readonly number[];
}

export interface SweepColumns {
  /** Response to a unit unbalance (1 where speed is 1 Hz, times f²): real and imaginary part. */
  readonly re: Float64Array;
  readonly im: Float64Array;
  /** Free decay from the first sample on. */
  readonly decayRe: Float64Array;
  readonly decayIm: Float64Array;
}

/** Longest step that the quadrature takes in one go, rad of turning between the machine and the mode. */
const LONGEST_STEP_RAD = 2.2;
/** A sweep that would need more has run away from any recording. */
const MOST_STEPS = 16;
/** Gauss-Legendre rules on 0..1 (Abramowitz & Stegun 25.4.30), each good to 2e-6 up to its turning in rad. */
const RULES = [
  { mostRad: 0.4, nodes: [0.21132486540518713, 0.7886751345948129], weights: [0.5, 0.5] },
  {
    mostRad: 1.2,
    nodes: [0.1127016653792583, 0.5, 0.8872983346207417],
    weights: [0.2777777777777778, 0.4444444444444444, 0.2777777777777778],
  },
  {
    mostRad: Infinity,
    nodes: [0.06943184420297371, 0.33000947820757187, 0.6699905217924281, 0.9305681557970262],
    weights: [0.17392742256872692, 0.32607257743127307, 0.32607257743127307, 0.17392742256872692],
  },
] as const;

export function speedAt(sweep: Sweep, timeS: number): number {
  const u = (timeS - sweep.centreS) / sweep.halfS;
  let speed = 0;
  for (let j = sweep.speedHz.length - 1; j >= 0; j--) speed = speed * u + (sweep.speedHz[j] as number);
  return speed;
}

/** Rate of change of the speed, Hz/s. */
export function speedRateAt(sweep: Sweep, timeS: number): number {
  const u = (timeS - sweep.centreS) / sweep.halfS;
  let rate = 0;
  for (let j = sweep.speedHz.length - 1; j >= 1; j--) rate = rate * u + j * (sweep.speedHz[j] as number);
  return rate / sweep.halfS;
}

/** Angle of the machine, rad; 0 at the centre. */
export function sweepPhase(sweep: Sweep, timeS: number): number {
  const u = (timeS - sweep.centreS) / sweep.halfS;
  let turns = 0;
  for (let j = sweep.speedHz.length - 1; j >= 0; j--)
    turns = (turns + (sweep.speedHz[j] as number) / (j + 1)) * u;
  // The loop above nests sum(b_j u^j/(j+1)) times u.
  return 2 * Math.PI * sweep.halfS * turns;
}

/**
 * @param timeS increasing sample times, s
 * @param frequencyHz of the undamped mode; dampingRatio 0..1
 */
export function sweepColumns(
  timeS: Float64Array,
  sweep: Sweep,
  frequencyHz: number,
  dampingRatio: number,
): SweepColumns {
  const n = timeS.length;
  const re = new Float64Array(n);
  const im = new Float64Array(n);
  const decayRe = new Float64Array(n);
  const decayIm = new Float64Array(n);
  const w0 = 2 * Math.PI * frequencyHz;
  const lRe = -dampingRatio * w0;
  const lIm = w0 * Math.sqrt(1 - dampingRatio * dampingRatio);
  // x'' = F + (l²·u1 - conj(l)²·u2) / (l - conj(l)), with u' = l·u + F; l - conj(l) = 2i·lIm.
  const sqRe = lRe * lRe - lIm * lIm;
  const sqIm = 2 * lRe * lIm;
  const first = timeS[0] as number;
  let wRe = 0;
  let wIm = 0;
  let before = first;
  let phaseBefore = sweepPhase(sweep, first);
  for (let k = 0; k < n; k++) {
    const t = timeS[k] as number;
    const speed = speedAt(sweep, t);
    const w = 2 * Math.PI * speed;
    const a = speed * speed;
    if (k === 0) {
      const steady = steadyPole(lRe, lIm, w, a, speedRateAt(sweep, t), speed);
      wRe = steady[0];
      wIm = steady[1];
    } else {
      const turning = Math.abs(w - lIm) * (t - before);
      const steps = Math.min(MOST_STEPS, Math.max(1, Math.ceil(turning / LONGEST_STEP_RAD)));
      const h = (t - before) / steps;
      const { nodes, weights } = ruleFor(turning / steps);
      for (let s = 0; s < steps; s++) {
        const to = s === steps - 1 ? t : before + h;
        const phaseTo = sweepPhase(sweep, to);
        const length = to - before;
        let gRe = 0;
        let gIm = 0;
        for (let q = 0; q < nodes.length; q++) {
          const at = before + (nodes[q] as number) * length;
          const speedHere = speedAt(sweep, at);
          const angle = lIm * (to - at) + sweepPhase(sweep, at) - phaseTo;
          const size = (weights[q] as number) * length * speedHere * speedHere * Math.exp(lRe * (to - at));
          gRe += size * Math.cos(angle);
          gIm += size * Math.sin(angle);
        }
        const kept = Math.exp(lRe * length);
        const turn = lIm * length + phaseBefore - phaseTo;
        const cRe = kept * Math.cos(turn);
        const cIm = kept * Math.sin(turn);
        const next = wRe * cRe - wIm * cIm + gRe;
        wIm = wRe * cIm + wIm * cRe + gIm;
        wRe = next;
        before = to;
        phaseBefore = phaseTo;
      }
    }
    const other = steadyPole(lRe, -lIm, w, a, speedRateAt(sweep, t), speed);
    // (l²·w1 - conj(l)²·w2) / (2i·lIm) + a, all in the turning frame.
    const dRe = sqRe * wRe - sqIm * wIm - (sqRe * other[0] + sqIm * other[1]);
    const dIm = sqRe * wIm + sqIm * wRe - (sqRe * other[1] - sqIm * other[0]);
    const accRe = a + dIm / (2 * lIm);
    const accIm = -dRe / (2 * lIm);
    const c = Math.cos(phaseBefore);
    const s = Math.sin(phaseBefore);
    re[k] = accRe * c - accIm * s;
    im[k] = accRe * s + accIm * c;
    const decay = Math.exp(lRe * (t - first));
    decayRe[k] = decay * Math.cos(lIm * (t - first));
    decayIm[k] = decay * Math.sin(lIm * (t - first));
  }
  return { re, im, decayRe, decayIm };
}

function ruleFor(turningRad: number): (typeof RULES)[number] {
  return RULES.find((rule) => turningRad < rule.mostRad) ?? RULES[2];
}

/** Pole's share in the turning frame where it follows steadily: a/(iw - l) minus its first correction for the sweep. */
function steadyPole(
  lRe: number,
  lIm: number,
  w: number,
  a: number,
  speedRateHzPerS: number,
  speedHz: number,
): [number, number] {
  const dRe = -lRe;
  const dIm = w - lIm;
  const d = dRe * dRe + dIm * dIm;
  const sRe = (a * dRe) / d;
  const sIm = (-a * dIm) / d;
  // d/dt [a/(iw - l)] = a'/(iw-l) - a·iw'/(iw-l)²
  const growth = (2 * speedRateHzPerS) / speedHz;
  const wRate = 2 * Math.PI * speedRateHzPerS;
  const iRe = dRe / d;
  const iIm = -dIm / d;
  // ratio = a'/a - i·w'/(iw-l)
  const rRe = growth + wRate * iIm;
  const rIm = -wRate * iRe;
  const cRe = sRe * rRe - sIm * rIm;
  const cIm = sRe * rIm + sIm * rRe;
  return [sRe - (cRe * iRe - cIm * iIm), sIm - (cRe * iIm + cIm * iRe)];
}
