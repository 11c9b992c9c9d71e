/** Take a reading: one step at a time, each saying the one thing to do. */
import { useEffect, useState } from 'preact/hooks';
import type { App } from '../../../app/app.ts';
import type { Route } from '../../../app/route.ts';
import { screenText } from '../../../text/screens.ts';
import { Button } from '../../components/button.tsx';
import { BottomBar } from '../../components/bottom-bar.tsx';
import { Page } from '../../components/page.tsx';
import { ProgressLine } from '../../components/progress-line.tsx';
import { useLive } from '../../use-live.ts';
import { CaptureStep } from './capture-step.tsx';
import { CutStep, FailedStep, RefusedStep, UnsavedStep } from './trouble-steps.tsx';
import { PrepareStep } from './prepare-step.tsx';

const text = screenText.take;

export function TakeScreen({
  app,
  route,
}: {
  readonly app: App;
  readonly route: Route & { screen: 'take' };
}) {
  const state = useLive(app.take.state);
  const [isPlanned, setIsPlanned] = useState(false);
  useEffect(() => {
    // A file that is being worked out came here with its own recording: nothing to prepare.
    if (app.take.state.get().phase === 'analysing') return;
    let isCurrent = true;
    setIsPlanned(false);
    void app.take
      .prepare(route.spot ? { spot: route.spot } : {}, route.procedure)
      .then(() => isCurrent && setIsPlanned(true));
    return () => {
      isCurrent = false;
    };
  }, [route.spot, route.procedure]);
  useEffect(
    () => () => {
      const left = app.take.state.get();
      if (left.phase !== 'capture') return;
      // The back button in mid-recording loses nothing: what there is becomes a reading, told by a notice.
      if (left.session.phase === 'recording') app.take.finish();
      else app.take.cancel();
    },
    [],
  );
  const leave = () => {
    app.take.cancel();
    app.navigation.back({ screen: 'start' });
  };
  switch (state.phase) {
    case 'capture':
      return state.session.phase === 'refused' ? (
        <RefusedStep key="refused" app={app} problem={state.session.problem} onLeave={leave} />
      ) : (
        <CaptureStep key="capture" app={app} session={state.session} onLeave={leave} />
      );
    case 'cut':
      return <CutStep key="cut" app={app} cut={state} onLeave={leave} />;
    case 'failed':
      return <FailedStep key="failed" app={app} problem={state.problem} onLeave={leave} />;
    case 'unsaved':
      return <UnsavedStep key="unsaved" detail={state.detail} onRetry={state.retry} />;
    case 'analysing':
    case 'kept':
      return (
        <Page key="analysing" title={text.analysing}>
          <p class="quiet">{text.analysingNote}</p>
          <ProgressLine label={text.analysing} />
          <BottomBar>
            <Button onClick={leave}>{screenText.common.cancel}</Button>
          </BottomBar>
        </Page>
      );
    case 'prepare':
      return isPlanned ? <PrepareStep key="prepare" app={app} onLeave={leave} /> : null;
  }
}
