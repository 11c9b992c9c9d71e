/** What the page and the analysis worker say to each other: the only file both sides share. */
import type { AnalysisSettings } from '../core/model/analysis.ts';
import type { Outcome } from '../core/model/outcome.ts';
import type { AnalysisResult } from '../core/model/pictures.ts';
import type { Recording } from '../core/model/recording.ts';

/** Page to worker. One request at a time; the recording is copied, since chart and store still need it. */
export interface AnalyseRequest {
  readonly kind: 'analyse';
  readonly requestIndex: number;
  readonly recording: Recording;
  readonly settings: AnalysisSettings;
}

/** Worker to page: the outcome (a problem is an outcome too), or what was thrown, which is our own bug. */
export type AnalyseReply =
  | { readonly kind: 'outcome'; readonly requestIndex: number; readonly outcome: Outcome<AnalysisResult> }
  | {
      readonly kind: 'thrown';
      readonly requestIndex: number;
      readonly name: string;
      readonly message: string;
      readonly stack: string;
    };

/** The part of a worker, or of a message port, that the protocol needs. */
export interface MessageEnd {
  postMessage(message: unknown, transfer?: Transferable[]): void;
  onmessage: ((event: { readonly data: unknown }) => void) | null;
}

type Analyse = (recording: Recording, settings: AnalysisSettings) => Outcome<AnalysisResult>;

/** Answers requests on one end; used by the worker's entry and by tests over a message channel. */
export function serveAnalysis(end: MessageEnd, analyse: Analyse): void {
  end.onmessage = ({ data }) => {
    const { requestIndex, recording, settings } = data as AnalyseRequest;
    end.postMessage(replyTo(requestIndex, () => analyse(recording, settings)));
  };
}

function replyTo(requestIndex: number, run: () => Outcome<AnalysisResult>): AnalyseReply {
  try {
    return { kind: 'outcome', requestIndex, outcome: run() };
  } catch (error) {
    const { name, message, stack } = error instanceof Error ? error : new Error(String(error));
    return { kind: 'thrown', requestIndex, name, message, stack: stack ?? '' };
  }
}
