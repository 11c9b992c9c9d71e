import { PracticeRig } from './practice-rig.ts';
import { parseRigParameters } from './rig-parameters.ts';
import type { SampleSource, SensorEvents } from './sensor-source.ts';

/** How often simulated samples are handed over, ms. */
const DELIVERY_MS = 16;
/** After a stall of the page the rig makes up for at most this much of real time, s. */
const CATCH_UP_S = 0.25;

/** Sensor of the practice rig. Everything recorded from it is practice, for good. */
export function createPracticeSource(query: string, nowMs: () => number): SampleSource {
  const parameters = parseRigParameters(query);
  const rig = new PracticeRig(parameters);
  let timer: ReturnType<typeof setInterval> | undefined;

  const stop = (): void => {
    clearInterval(timer);
    timer = undefined;
  };

  return {
    ask: () => Promise.resolve('granted'),

    start({ onSample, onProblem }: SensorEvents) {
      const { paceRatio, rateHz, failS } = parameters;
      let sampleCount = 0;
      let lastMs = nowMs();
      let simulatedS = 0;
      timer = setInterval(() => {
        const elapsedS = Math.min(CATCH_UP_S, (nowMs() - lastMs) / 1000);
        lastMs = nowMs();
        simulatedS += elapsedS * paceRatio;
        for (; sampleCount < simulatedS * rateHz && timer !== undefined; sampleCount += 1) {
          if (failS > 0 && sampleCount / rateHz > failS) {
            stop();
            onProblem('sensor-error');
            return;
          }
          const sample = rig.next();
          if (sample !== undefined) onSample(sample.stampS * 1000, sample.x, sample.y, sample.z);
        }
      }, DELIVERY_MS);
    },

    stop,

    describe: () => ({ source: 'practice', practice: true, name: query, requestedRateHz: parameters.rateHz }),

    act: () => rig.act(),
  };
}
