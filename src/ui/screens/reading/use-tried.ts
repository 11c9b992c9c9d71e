import { useMemo, useState } from 'preact/hooks';
import type { Analysis } from '../../../core/model/analysis.ts';
import type { Judgement } from '../../../core/model/judgement.ts';
import type { Source } from '../../../core/model/source.ts';
import { isNothingTried, triedAnalysis, triedSources, type TriedChange } from './what-if.ts';

export interface Judged {
  readonly analysis: Analysis;
  readonly judgement: Judgement;
}

export interface Tried {
  /** Undefined: the sliders are not open. */
  readonly change: TriedChange | undefined;
  readonly set: (change: TriedChange | undefined) => void;
  /** As measured, or as it would read after the change. */
  readonly shown: Judged;
  /** As measured, while something is tried. */
  readonly before: Judged | undefined;
  /** True once the sliders have been open and were closed. */
  readonly hasClosed: boolean;
}

/** The change being tried, judged anew on every move of a slider. */
export function useTried(
  measured: Judged,
  sources: readonly Source[],
  judge: (analysis: Analysis, sources: readonly Source[]) => Judgement,
): Tried {
  const [change, setChange] = useState<TriedChange | undefined>();
  const [hasClosed, setClosed] = useState(false);
  const set = (next: TriedChange | undefined) => {
    setChange(next);
    if (next === undefined) setClosed(true);
  };
  const isTried = change !== undefined && !isNothingTried(change);
  const shown = useMemo((): Judged => {
    if (!isTried) return measured;
    const analysis = triedAnalysis(measured.analysis, change);
    return { analysis, judgement: judge(analysis, triedSources(sources, change)) };
  }, [measured, sources, judge, change, isTried]);
  return { change, set, shown, before: isTried ? measured : undefined, hasClosed };
}
