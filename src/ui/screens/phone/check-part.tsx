/** Ten seconds at rest tell what this phone can see: the result is kept and stands with every later reading. */
import { useState } from 'preact/hooks';
import type { App } from '../../../app/app.ts';
import type { PhoneCheck } from '../../../core/model/fact.ts';
import type { Problem } from '../../../core/model/problem.ts';
import { formatNumber } from '../../../text/number.ts';
import { problemSentence } from '../../../text/problems.ts';
import { formatFrequencyRange } from '../../../text/quantity.ts';
import { officeText } from '../../../text/office-screens.ts';
import { BottomBar } from '../../components/bottom-bar.tsx';
import { Button } from '../../components/button.tsx';
import { ProgressLine } from '../../components/progress-line.tsx';
import { dayAndTime } from '../../day-and-time.ts';
import { useLoaded } from '../../use-loaded.ts';
import { FactList } from './fact-list.tsx';

const text = officeText.phone.check;

export function CheckPart({ app }: { readonly app: App }) {
  const [runs, setRuns] = useState(0);
  const [isRunning, setIsRunning] = useState(false);
  const [problem, setProblem] = useState<Problem>();
  const [thrown, setThrown] = useState<{ readonly error: unknown }>();
  const check = useLoaded(app.store, () => app.phone.lastCheck(), [runs]);
  // The boundary tells it and keeps it in the error log.
  if (thrown) throw thrown.error;
  const run = async () => {
    setIsRunning(true);
    setProblem(undefined);
    const outcome = await app.phone.check();
    setIsRunning(false);
    setRuns((count) => count + 1);
    if (!outcome.ok) setProblem(outcome.problem);
  };
  return (
    <>
      <p>{text.lead}</p>
      <div aria-live="polite" class="stack">
        {isRunning && (
          <>
            <p>{text.running}</p>
            <ProgressLine label={text.running} />
          </>
        )}
        {problem && <p role="alert">{problemSentence(problem)}</p>}
        {check && !isRunning && <CheckResult check={check} />}
        {!check && !isRunning && !problem && <p class="quiet">{text.never}</p>}
      </div>
      <BottomBar>
        <Button
          kind="main"
          disabled={isRunning}
          onClick={() => run().catch((error: unknown) => setThrown({ error }))}
        >
          {check ? text.again : text.start}
        </Button>
      </BottomBar>
    </>
  );
}

function CheckResult({ check }: { readonly check: PhoneCheck }) {
  const noise = Math.max(...check.noiseMps2PerRootHz);
  return (
    <>
      <p>
        <strong>
          {text.sees(formatFrequencyRange(check.usableBandHz), formatNumber(check.smallestToneMps2, 2))}
        </strong>
      </p>
      <FactList
        facts={[
          [text.rate, `${formatNumber(check.rateHz, 4)} /s`],
          [text.scatter, `${formatNumber(check.scatterSdS * 1000, 2)} ms`],
          [text.step, check.stepMps2 > 0 ? `${formatNumber(check.stepMps2, 2)} m/s²` : text.noStep],
          [text.noise, `${formatNumber(noise * 1000, 2)} mm/s² / √Hz`],
          [text.gravity, `${formatNumber(check.gravityMps2, 4)} m/s²`],
          [text.repeats, String(check.repeatCount)],
          [text.gaps, String(check.gapCount)],
          [text.when, dayAndTime(check.checkedAt)],
        ]}
      />
      <p class="note">{text.note}</p>
    </>
  );
}
