import type { Procedure } from '../../src/core/model/analysis.ts';
import type { Recording } from '../../src/core/model/recording.ts';
import { seededRandom } from '../support/cases/random.ts';

/** A mode rung by noise, a machine's tone or taps every ten seconds, cheap to make at any length; stamps scatter by 1 ms. */
export function longRecording(procedure: Procedure, durationS: number, rateHz: number, seed = 1): Recording {
  const random = seededRandom(seed);
  const n = Math.floor(durationS * rateHz);
  const timeS = new Float64Array(n);
  const axes = [new Float32Array(n), new Float32Array(n), new Float32Array(n)];
  const decay = Math.exp((-2 * Math.PI * 0.015 * 7.3) / rateHz);
  const turn = 2 * decay * Math.cos((2 * Math.PI * 7.3) / rateHz);
  let last = 0;
  let before = 0;
  for (let k = 0; k < n; k++) {
    const at = k / rateHz;
    timeS[k] = at + 1e-3 * random.normal() * (k > 0 ? 1 : 0);
    const sinceTap = (at - 2) % 10;
    const struck = procedure === 'tap' && at >= 2 && sinceTap < 1 / rateHz ? 0.8 : 0;
    const push = procedure === 'ambient' ? 0.01 * random.normal() : struck;
    const value = turn * last - decay * decay * before + push;
    before = last;
    last = value;
    const tone = procedure === 'running' ? 0.3 * Math.sin(2 * Math.PI * 17.2 * (timeS[k] as number)) : 0;
    [value + tone, 0.4 * value - 0.5 * tone, 9.8 + 0.2 * value].forEach((v, axis) => {
      (axes[axis] as Float32Array)[k] = v + 0.02 * random.normal();
    });
  }
  return {
    sensor: { source: 'file', practice: false, name: 'long.csv' },
    axes: ['x', 'y', 'z'],
    timeS,
    accelerationMps2: axes,
  };
}
