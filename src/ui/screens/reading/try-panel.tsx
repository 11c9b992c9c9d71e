import { useEffect, useRef } from 'preact/hooks';
import type { Judgement, Separation } from '../../../core/model/judgement.ts';
import type { Source } from '../../../core/model/source.ts';
import { formatNumber } from '../../../text/number.ts';
import { formatPercent, formatSpeed } from '../../../text/quantity.ts';
import { readingText } from '../../../text/reading-screen.ts';
import { nearnessWords } from '../../../text/sentence.ts';
import { forcingName } from '../../../text/sources.ts';
import { verdictWord } from '../../../text/verdicts.ts';
import { Button } from '../../components/button.tsx';
import { VerdictMark } from '../../components/verdict-mark.tsx';
import { sentenceCase } from './pair-card.tsx';
import { forcingVerdict, worstOfMode } from '../../../text/pairs.ts';
import { saidHz, type ReadingUnits } from '../../../text/reading-units.ts';
import { Slider } from './slider.tsx';
import { likelyHz } from '../../../text/true-frequency.ts';
import styles from './try-panel.module.css';
import type { Judged } from './use-tried.ts';
import { isNothingTried, nothingTried, presentSpeedRpm, type TriedChange } from './what-if.ts';

/** Ends of the sliders: what a repair may reach (our own choice; beyond it the structure is another one). */
const STIFFNESS: readonly [number, number] = [0.4, 5];
const MASS: readonly [number, number] = [0.5, 4];
const DAMPING: readonly [number, number] = [0.002, 0.2];
const SPEED: readonly [number, number] = [0.4, 2];

interface TryPanelProps {
  readonly measured: Judged;
  readonly shown: Judged;
  readonly sources: readonly Source[];
  readonly tried: TriedChange;
  readonly units: ReadingUnits;
  readonly onChange: (change: TriedChange) => void;
  readonly onClose: () => void;
}

/** Sliders for what could be changed; the ladder above follows at once, and the sentence says what came of it. */
export function TryPanel(props: TryPanelProps) {
  const { measured, sources, tried, units, onChange } = props;
  const place = useRef<HTMLDivElement>(null);
  // the button that opened this is gone: the keyboard goes on at the first slider
  useEffect(() => place.current?.querySelector('input')?.focus({ preventScroll: true }), []);
  const { trying } = readingText;
  const mode = measured.analysis.modes[tried.modeIndex];
  const now = props.shown.analysis.modes[tried.modeIndex];
  if (!mode || !now) return null;
  const times = (factor: number) =>
    Math.abs(factor - 1) < 1e-9 ? trying.asMeasured : trying.times(formatNumber(factor, 3));
  return (
    <div ref={place} class={styles.panel} role="group" aria-label={trying.title}>
      <TriedResult {...props} />
      <p class="note">{trying.ofMode(saidHz(units, likelyHz(mode)))}</p>
      <Slider
        label={trying.change('stiffness')}
        value={tried.stiffnessRatio}
        range={STIFFNESS}
        rest={1}
        said={times}
        onChange={(stiffnessRatio) => onChange({ ...tried, stiffnessRatio })}
      />
      <Slider
        label={trying.change('mass')}
        value={tried.massRatio}
        range={MASS}
        rest={1}
        said={times}
        onChange={(massRatio) => onChange({ ...tried, massRatio })}
      />
      <Slider
        label={trying.change('damping')}
        value={now.dampingRatio}
        range={DAMPING}
        rest={mode.dampingRatio}
        said={(ratio) => formatPercent(ratio)}
        onChange={(dampingRatio) => onChange({ ...tried, dampingRatio })}
      />
      {sources.map((source, index) => {
        const present = presentSpeedRpm(source);
        if (present === undefined) return null;
        return (
          <Slider
            key={index}
            label={trying.speedOf(source.name)}
            value={tried.speedsRpm[index] ?? present}
            range={[present * SPEED[0], present * SPEED[1]]}
            rest={present}
            said={formatSpeed}
            onChange={(speed) => onChange({ ...tried, speedsRpm: { ...tried.speedsRpm, [index]: speed } })}
          />
        );
      })}
      <p class="note">{trying.note}</p>
      <div class={styles.ends}>
        <Button disabled={isNothingTried(tried)} onClick={() => onChange(nothingTried(tried.modeIndex))}>
          {trying.reset}
        </Button>
        <Button kind="main" onClick={props.onClose}>
          {trying.close}
        </Button>
      </div>
    </div>
  );
}

const SERIOUS = ['coincident', 'undecided', 'close'] as const;
const severity = (judgement: Judgement, index: number): number => {
  const place = SERIOUS.findIndex((verdict) => verdict === forcingVerdict(judgement, index));
  return place === -1 ? SERIOUS.length : place;
};

/** What came of the change: where the mode is now, its nearest pair, a worse pair elsewhere, and what became worse. */
function TriedResult({ measured, shown, tried, units }: TryPanelProps) {
  const { trying } = readingText;
  const before = measured.analysis.modes[tried.modeIndex];
  const now = shown.analysis.modes[tried.modeIndex];
  const own = worstOfMode(shown.judgement, tried.modeIndex);
  const [worst] = shown.judgement.separations;
  const isElsewhere = worst !== undefined && own !== undefined && worst.verdict !== own.verdict;
  const worse = shown.judgement.forcings.filter(
    (_, index) => severity(shown.judgement, index) < severity(measured.judgement, index),
  );
  return (
    <div class={styles.result} aria-live="polite">
      {before && now && <b>{trying.nowAt(saidHz(units, likelyHz(now)), saidHz(units, likelyHz(before)))}</b>}
      {own ? (
        <PairLine judgement={shown.judgement} separation={own} units={units} />
      ) : (
        <span>{trying.nothingNear}</span>
      )}
      {isElsewhere && <PairLine judgement={shown.judgement} separation={worst} units={units} />}
      {worse.length > 0 && <span>{trying.worse(worse.map(forcingName).join(', '))}</span>}
    </div>
  );
}

function PairLine(props: {
  readonly judgement: Judgement;
  readonly separation: Separation;
  readonly units: ReadingUnits;
}) {
  const { judgement, separation, units } = props;
  const forcing = judgement.forcings[separation.forcingIndex];
  if (!forcing) return null;
  const against = readingText.pair.against(forcingName(forcing), saidHz(units, separation.modeHz));
  return (
    <span>
      <VerdictMark verdict={separation.verdict} word={`${sentenceCase(verdictWord(separation.verdict))}.`} />{' '}
      {sentenceCase(against)} {nearnessWords(separation)}.
    </span>
  );
}
