import type { CaptureProblem } from '../app/ports.ts';
import type { SensorDescription } from '../core/model/recording.ts';

/** Stamp in ms on the page's clock, acceleration with gravity in m/s². Called for every reading: must be tiny. */
export type SampleHandler = (stampMs: number, x: number, y: number, z: number) => void;

export interface SensorEvents {
  readonly onSample: SampleHandler;
  readonly onProblem: (problem: CaptureProblem) => void;
}

/** Where samples come from. One source per recording: samples of two are never mixed. */
export interface SampleSource {
  /** Called synchronously inside the person's tap. Anything but `granted` is a refusal. */
  ask(): Promise<'granted' | CaptureProblem>;
  /** Start delivering; problems before and during go to `onProblem`. */
  start(events: SensorEvents): void;
  stop(): void;
  /** Facts of the sensor as known once samples come. */
  describe(): SensorDescription;
  /** Tells a simulated phone that the person would act now (tap, switch off): real ones need no telling. */
  act?(): void;
}
