import { describe, expect, it } from 'vitest';
import { evaluateDecays } from '../../../../src/core/modes/tap/evaluate-decays.ts';
import type { Component } from '../../../../src/core/modes/tap/decay-model.ts';
import { fitDecays } from '../../../../src/core/modes/tap/fit-decays.ts';
import { dampingRatioOf, naturalFrequencyHz } from '../../../../src/core/modes/tap/mode-estimate.ts';
import { residuals } from '../../../../src/core/modes/tap/modelled-signal.ts';
import { createSplitScans } from '../../../../src/core/modes/tap/split-scan.ts';
import { seededRandom } from '../../../support/cases/random.ts';

const random = seededRandom(17);
const timeS = Float64Array.from({ length: 480 }, (_, i) => i / 60 + 0.002 * random.normal());
const mode = (hz: number, zeta: number): Component => ({
  kind: 'mode',
  angularRadPerS: 2 * Math.PI * hz * Math.sqrt(1 - zeta ** 2),
  decayPerS: 2 * Math.PI * hz * zeta,
});
const ring = ({ angularRadPerS, decayPerS }: Component, phase: number): Float64Array =>
  timeS.map((t) => Math.exp(-decayPerS * t) * Math.cos(angularRadPerS * t + phase));
const sum = (...parts: Float64Array[]): Float64Array =>
  timeS.map((_, i) => parts.reduce((s, p) => s + p[i]!, 0));

const truth = [mode(5, 0.012), mode(6.1, 0.02)];
const exact = {
  timeS,
  y: [
    sum(
      ring(truth[0]!, 0.3),
      ring(truth[1]!, 1).map((v) => 0.6 * v),
      timeS.map((t) => 0.1 + 0.02 * t),
    ),
    sum(
      ring(truth[0]!, -1),
      ring(truth[1]!, 2).map((v) => -0.4 * v),
    ),
  ],
};
const segments = [
  { start: 0, end: 250 },
  { start: 260, end: 480 },
];

describe('evaluateDecays', () => {
  it('leaves nothing at the true frequencies and decays, whatever amplitudes and drift', () => {
    expect(evaluateDecays(exact, segments, truth, [1, 1]).cost).toBeLessThan(1e-12);
  });

  it('has the gradient that finite differences give (0.1 %)', () => {
    const noisy = { timeS, y: exact.y.map((y) => y.map((v) => v + 0.05 * random.normal())) };
    const at = [mode(5.01, 0.013), mode(6.09, 0.019)];
    const { gradient } = evaluateDecays(noisy, segments, at, [2, 3]);
    const cost = (k: number, key: 'angularRadPerS' | 'decayPerS', h: number): number =>
      evaluateDecays(
        noisy,
        segments,
        at.map((c, j) => (j === k ? { ...c, [key]: c[key] + h } : c)),
        [2, 3],
      ).cost;
    [
      [0, 'angularRadPerS'],
      [0, 'decayPerS'],
      [1, 'angularRadPerS'],
      [1, 'decayPerS'],
    ].forEach(([k, key], i) => {
      const h = 1e-5;
      const slope =
        (cost(k as number, key as 'decayPerS', h) - cost(k as number, key as 'decayPerS', -h)) / (2 * h);
      // The cost is a sum of squares without the half: its slope is minus twice the descent direction.
      expect(slope / (-2 * gradient[i]!)).toBeCloseTo(1, 3);
    });
  });

  it('counts weights as repeated samples', () => {
    const weights = [timeS.map((_, i) => (i < 100 ? 2 : 1)), timeS.map(() => 1)];
    const once = evaluateDecays(exact, segments, [mode(5.02, 0.012)], [1, 1]);
    const weighted = evaluateDecays({ ...exact, weights }, segments, [mode(5.02, 0.012)], [1, 1]);
    expect(weighted.rss[0]).toBeGreaterThan(once.rss[0]!);
    expect(weighted.rss[1]).toBeCloseTo(once.rss[1]!, 9);
  });
});

describe('fitDecays', () => {
  it('finds both modes of a noise-free record to nine digits from a rough start', () => {
    const { components } = fitDecays(exact, segments, [mode(5.04, 0.02), mode(6.05, 0.01)], [1e-4, 1e-4]);
    components.forEach((c, k) => {
      expect(naturalFrequencyHz(c) / naturalFrequencyHz(truth[k]!)).toBeCloseTo(1, 6);
      expect(dampingRatioOf(c) / dampingRatioOf(truth[k]!)).toBeCloseTo(1, 5);
    });
  });

  it('does not care about scale, axis order or time shift', () => {
    const noisy = exact.y.map((y) => y.map((v) => v + 0.02 * random.normal()));
    const plain = fitDecays({ timeS, y: noisy }, segments, truth, [4e-4, 4e-4]);
    const other = fitDecays(
      { timeS: timeS.map((t) => t + 100), y: [noisy[1]!, noisy[0]!].map((y) => y.map((v) => 7 * v)) },
      segments,
      truth,
      [0.02, 0.02],
    );
    plain.components.forEach((c, k) => {
      expect(other.components[k]!.angularRadPerS / c.angularRadPerS).toBeCloseTo(1, 6);
      expect(other.components[k]!.decayPerS / c.decayPerS).toBeCloseTo(1, 4);
    });
  });

  it('states the Cramér-Rao spread of Yao & Pandit 1995: sd of decay and angular frequency 4 sqrt(a³ dt) sigma/A', () => {
    const one = mode(10, 0.01);
    const times = Float64Array.from({ length: 2000 }, (_, i) => i / 100);
    const sigma = 0.05;
    const y = times.map(
      (t) => Math.exp(-one.decayPerS * t) * Math.cos(one.angularRadPerS * t + 0.4) + sigma * random.normal(),
    );
    const { covariance, variance } = fitDecays(
      { timeS: times, y: [y] },
      [{ start: 0, end: 2000 }],
      [one],
      [sigma ** 2],
    );
    const theory = 4 * Math.sqrt(one.decayPerS ** 3 * 0.01) * Math.sqrt(variance[0]!);
    // 5 %: the formula is the continuous limit, the constant and slope cost a little.
    expect(Math.sqrt(covariance![0]!) / theory).toBeCloseTo(1, 1.3);
    expect(Math.sqrt(covariance![3]!) / theory).toBeCloseTo(1, 1.3);
  });

  it('scatters as it says: pulls of 150 noisy decays have unit variance within 15 % (seed 8)', () => {
    const draw = seededRandom(8);
    const one = mode(4, 0.02);
    let [pullF, pullA] = [0, 0];
    for (let k = 0; k < 150; k++) {
      const y = [ring(one, 0.2).map((v) => v + 0.05 * draw.normal())];
      const { components, covariance } = fitDecays({ timeS, y }, segments, [one], [0.0025]);
      pullF += (components[0]!.angularRadPerS - one.angularRadPerS) ** 2 / covariance![0]! / 150;
      pullA += (components[0]!.decayPerS - one.decayPerS) ** 2 / covariance![3]! / 150;
    }
    expect(Math.abs(Math.sqrt(pullF) - 1)).toBeLessThan(0.15);
    expect(Math.abs(Math.sqrt(pullA) - 1)).toBeLessThan(0.15);
  });
});

describe('residuals', () => {
  it('are what the evaluation sums, and zero between the segments', () => {
    const noisy = { timeS, y: exact.y.map((y) => y.map((v) => v + 0.02 * random.normal())) };
    const fit = fitDecays(noisy, segments, truth, [4e-4, 4e-4]);
    const left = residuals(noisy, segments, fit);
    left.forEach((l, a) => {
      expect(l.reduce((s, v) => s + v * v, 0)).toBeCloseTo(fit.evaluation.rss[a]!, 8);
      expect([...l.subarray(250, 260)]).toEqual(new Array(10).fill(0));
    });
  });
});

describe('createSplitScans', () => {
  const noisy = { timeS, y: exact.y.map((y) => y.map((v) => v + 0.02 * random.normal())) };
  const scans = createSplitScans(noisy, truth, [2500, 2500]);
  const cost = (start: number, end: number): number =>
    evaluateDecays(noisy, [{ start, end }], truth, [2500, 2500]).cost;

  it('agrees with fitting every leading and trailing part by itself', () => {
    const leading = scans.leading(20, 300);
    const trailing = scans.trailing(20, 300);
    for (const i of [60, 120, 220]) {
      expect(leading.residual[i - leading.origin]! / cost(20, i)).toBeCloseTo(1, 6);
      expect(trailing.residual[i - trailing.origin]! / cost(i, 300)).toBeCloseTo(1, 6);
    }
  });

  it('goes on from where it was', () => {
    const shorter = scans.trailing(150, 250).residual[0];
    const longer = scans.trailing(30, 250);
    expect(longer.residual[150 - longer.origin]).toBe(shorter);
    expect(longer.residual[30 - longer.origin]! / cost(30, 250)).toBeCloseTo(1, 6);
  });

  it('stays exact where a decay falls by hundreds of orders of magnitude', () => {
    const long = {
      timeS: Float64Array.from({ length: 3000 }, (_, i) => i / 25),
      y: [new Float64Array(3000)],
    };
    const w = 2 * Math.PI * 5.3;
    long.timeS.forEach((t, i) => (long.y[0]![i] = Math.exp(-8 * t) * Math.cos(w * t)));
    const mode = [{ kind: 'mode', angularRadPerS: w, decayPerS: 8 }] as const;
    const { trailing, leading } = createSplitScans(long, mode, [1]);
    expect(trailing(0, 3000).residual[0]).toBeLessThan(1e-20);
    expect(leading(0, 3000).residual[3000]).toBeLessThan(1e-20);
    expect(leading(0, 3000).motion[3000]! / long.y[0]!.reduce((s, v) => s + v * v, 0)).toBeCloseTo(1, 1);
  });
});
