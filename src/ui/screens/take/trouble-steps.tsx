/** What can go wrong while taking a reading, each with its way back. */
import type { App } from '../../../app/app.ts';
import type { CaptureProblem } from '../../../app/ports.ts';
import { isWorthUsing, type TakeState } from '../../../app/take-flow.ts';
import type { Problem } from '../../../core/model/problem.ts';
import { interruptionSentence } from '../../../text/interruptions.ts';
import { problemSentence } from '../../../text/problems.ts';
import { screenText } from '../../../text/screens.ts';
import { BottomBar } from '../../components/bottom-bar.tsx';
import { Button } from '../../components/button.tsx';
import { Page } from '../../components/page.tsx';
import { FileButton } from '../../components/file-button.tsx';

const text = screenText.take;

/** Problems that a second try could mend. */
const MENDABLE: readonly CaptureProblem[] = ['not-allowed', 'sensor-error', 'busy-elsewhere', 'slow-sensor'];

export function RefusedStep(props: {
  readonly app: App;
  readonly problem: CaptureProblem;
  readonly onLeave: () => void;
}) {
  const { app, problem } = props;
  const { title, note } = text.refused[problem];
  const practise = () => {
    app.take.usePractice();
    app.take.begin();
  };
  return (
    <Page title={title} back={{ label: text.leave, onClick: props.onLeave }}>
      <p role="alert">{note}</p>
      <p class="note">{text.practiceNote}</p>
      <FileButton label={screenText.start.openFile} onFile={(file) => void app.take.openFile(file)} />
      <BottomBar>
        <Button onClick={practise} kind={MENDABLE.includes(problem) ? 'plain' : 'main'}>
          {text.usePractice}
        </Button>
        {MENDABLE.includes(problem) && (
          <Button kind="main" onClick={() => app.take.begin()}>
            {text.tryAgain}
          </Button>
        )}
      </BottomBar>
    </Page>
  );
}

export function CutStep(props: {
  readonly app: App;
  readonly cut: TakeState & { readonly phase: 'cut' };
  readonly onLeave: () => void;
}) {
  const { app, cut } = props;
  const isUsable = isWorthUsing(cut.recording);
  const lengthS = Math.round((cut.recording?.timeS.at(-1) ?? 0) - (cut.recording?.timeS[0] ?? 0));
  return (
    <Page title={text.cut} back={{ label: text.leave, onClick: props.onLeave }}>
      <p role="alert">{interruptionSentence(cut.reason)}</p>
      {isUsable && <p class="quiet">{text.cutNote(lengthS)}</p>}
      <BottomBar>
        <Button kind={isUsable ? 'plain' : 'main'} onClick={() => app.take.reset()}>
          {isUsable ? text.dropCut : text.again}
        </Button>
        {isUsable && (
          <Button kind="main" onClick={() => app.take.useCut()}>
            {text.useCut}
          </Button>
        )}
      </BottomBar>
    </Page>
  );
}

export function FailedStep(props: {
  readonly app: App;
  readonly problem: Problem;
  readonly onLeave: () => void;
}) {
  return (
    <Page title={text.failed} back={{ label: text.leave, onClick: props.onLeave }}>
      <p role="alert">{problemSentence(props.problem)}</p>
      <p class="quiet">{text.failedNote}</p>
      <BottomBar>
        <Button kind="main" onClick={() => props.app.take.reset()}>
          {text.again}
        </Button>
      </BottomBar>
    </Page>
  );
}

export function UnsavedStep(props: { readonly detail: string; readonly onRetry: () => void }) {
  return (
    <Page title={text.unsaved}>
      <p role="alert">{text.unsavedNote}</p>
      <p class="note">{props.detail}</p>
      <BottomBar>
        <Button kind="main" onClick={props.onRetry}>
          {text.retry}
        </Button>
      </BottomBar>
    </Page>
  );
}
