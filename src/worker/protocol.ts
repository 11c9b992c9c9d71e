/** What the page and the analysis worker say to each other: the only file both sides share. */
import type { AnalysisSettings } from '../core/model/analysis.ts';
import type { PhoneCheck } from '../core/model/fact.ts';
import type { Outcome } from '../core/model/outcome.ts';
import type { AnalysisResult } from '../core/model/pictures.ts';
import type { Recording } from '../core/model/recording.ts';

/** Page to worker. One request at a time; the recording is copied, since chart and store still need it. */
export type WorkRequest = Work & { readonly requestIndex: number };
export type Work =
  | { readonly kind: 'analyse'; readonly recording: Recording; readonly settings: AnalysisSettings }
  | { readonly kind: 'check-phone'; readonly recording: Recording; readonly checkedAt: string };

/** Worker to page: the outcome (a problem is an outcome too), or what was thrown, which is our own bug. */
export type WorkReply =
  | { readonly kind: 'outcome'; readonly requestIndex: number; readonly outcome: Outcome<unknown> }
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

/** What the worker can do: pure functions of core. */
export interface WorkerCore {
  analyse(recording: Recording, settings: AnalysisSettings): Outcome<AnalysisResult>;
  checkPhone(recording: Recording, checkedAt: string): Outcome<PhoneCheck>;
}

/** Answers requests on one end; used by the worker's entry and by tests over a message channel. */
export function serveAnalysis(end: MessageEnd, core: WorkerCore): void {
  end.onmessage = ({ data }) => {
    const request = data as WorkRequest;
    end.postMessage(replyTo(request.requestIndex, () => carryOut(core, request)));
  };
}

function carryOut(core: WorkerCore, work: Work): Outcome<unknown> {
  return work.kind === 'analyse'
    ? core.analyse(work.recording, work.settings)
    : core.checkPhone(work.recording, work.checkedAt);
}

function replyTo(requestIndex: number, run: () => Outcome<unknown>): WorkReply {
  try {
    return { kind: 'outcome', requestIndex, outcome: run() };
  } catch (error) {
    const { name, message, stack } = error instanceof Error ? error : new Error(String(error));
    return { kind: 'thrown', requestIndex, name, message, stack: stack ?? '' };
  }
}
