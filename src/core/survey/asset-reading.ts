import type { Analysis } from '../model/analysis.ts';
import type { Circumstances } from '../model/fact.ts';
import type { Judgement } from '../model/judgement.ts';
import type { JudgeSettings } from './judge.ts';

/** A reading as an asset pools it: of what is current now (a redone analysis stands for the first). */
export interface AssetReading {
  readonly id: string;
  readonly recordedAt: string;
  /** Id of its spot, where it has one. */
  readonly spot?: string;
  readonly analysis: Analysis;
  readonly circumstances: Partial<Circumstances>;
  readonly settings?: JudgeSettings;
}

export interface JudgedReading extends AssetReading {
  readonly judgement: Judgement;
}
