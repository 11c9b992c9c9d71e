import type { Analysis, Mode } from '../../../core/model/analysis.ts';
import type { Judgement, Separation } from '../../../core/model/judgement.ts';
import type { Forcing } from '../../../core/model/source.ts';
import { foldedFrequencyHz } from '../../../core/picture/folded-frequency.ts';
import { formatInterval } from '../../../text/number.ts';
import { formatDamping, formatFrequencyRange } from '../../../text/quantity.ts';
import { readingText } from '../../../text/reading-screen.ts';
import { nearnessWords } from '../../../text/sentence.ts';
import { forcingName, forcingOrigin } from '../../../text/sources.ts';
import { unpairedText, verdictText, verdictWord } from '../../../text/verdicts.ts';
import { VerdictMark } from '../../components/verdict-mark.tsx';
import { timesText } from './amplification-text.tsx';
import styles from './pair-card.module.css';
import { keptTogether } from './kept-together.ts';
import { pickedSeparation, type Picked } from '../../../text/pairs.ts';
import { saidHz, saidMps2, type ReadingUnits } from '../../../text/reading-units.ts';
import { likelyDampingRatio, likelyHz } from '../../../text/true-frequency.ts';

interface PairCardProps {
  readonly analysis: Analysis;
  readonly judgement: Judgement;
  readonly picked: Picked | undefined;
  readonly units: ReadingUnits;
  readonly paceLink: (frequencyHz: number) => string;
}

export const sentenceCase = (text: string): string => text.charAt(0).toUpperCase() + text.slice(1);

/** What is picked on the ladder: the pair with its ratio and amplification, or what is known of the one mark. */
export function PairCard(props: PairCardProps) {
  return (
    <div class={styles.card} aria-live="polite">
      <CardContent {...props} />
    </div>
  );
}

function CardContent({ analysis, judgement, picked, units, paceLink }: PairCardProps) {
  if (picked === undefined) return <p class="quiet">{readingText.pair.pick}</p>;
  if (picked.kind === 'tone') return <ToneCard {...{ analysis, judgement, units }} index={picked.index} />;
  const separation = pickedSeparation(judgement, picked);
  if (separation)
    return (
      <>
        {picked.kind === 'mode' && <ModeLine mode={analysis.modes[picked.index]} units={units} />}
        <SeparationCard {...{ judgement, separation, units, paceLink }} />
      </>
    );
  if (picked.kind === 'forcing')
    return <ForcingCard {...{ judgement, units }} index={picked.index} rateHz={analysis.recording.rateHz} />;
  return (
    <>
      <ModeLine mode={analysis.modes[picked.kind === 'mode' ? picked.index : picked.mode]} units={units} />
      <p>{readingText.pair.modeAlone}</p>
    </>
  );
}

/** Whether a person can walk it on purpose, to feel and record what it does. */
const isWalked = ({ activity }: Forcing): boolean => activity === 'walking' || activity === 'stairs';

function ModeLine({ mode, units }: { readonly mode: Mode | undefined; readonly units: ReadingUnits }) {
  if (mode === undefined) return null;
  const frequency = keptTogether(saidHz(units, likelyHz(mode), mode.frequencySdHz));
  const damping = keptTogether(formatDamping(likelyDampingRatio(mode), mode.dampingRatioSd));
  return (
    <p>
      <b>{readingText.pair.mode(frequency, damping)}</b>
    </p>
  );
}

function SeparationCard(props: {
  readonly judgement: Judgement;
  readonly separation: Separation;
  readonly units: ReadingUnits;
  readonly paceLink: (frequencyHz: number) => string;
}) {
  const { separation, judgement, units, paceLink } = props;
  const forcing = judgement.forcings[separation.forcingIndex];
  if (!forcing) return null;
  const { kind, interval } = separation.amplification;
  const against = readingText.pair.against(forcingName(forcing), saidHz(units, separation.modeHz));
  return (
    <>
      <p class={styles.said}>
        <VerdictMark
          verdict={separation.verdict}
          word={`${sentenceCase(verdictWord(separation.verdict))}.`}
        />{' '}
        {sentenceCase(against)} {nearnessWords(separation)}
        {separation.atFaceValue ? `: ${readingText.pair.faceValue(verdictWord(separation.atFaceValue))}` : ''}
        .
      </p>
      <dl class={styles.figures}>
        <div>
          <dt>{readingText.pair.ratio}</dt>
          <dd>{formatInterval(separation.ratio, 3)}</dd>
        </div>
        <div>
          <dt>{readingText.pair.amplified(kind)}</dt>
          <dd>{timesText(interval)}</dd>
        </div>
      </dl>
      <p class="note">
        {verdictText(separation.verdict).meaning} {formatFrequencyRange(forcing.frequencyHz, units.frequency)}
        , {forcingOrigin(forcing)}.{separation.stoppedAgainstRunning ? ` ${readingText.pair.stopped}` : ''}
        {separation.buildUpLimited ? ` ${sentenceCase(readingText.pair.limited)}.` : ''}
      </p>
      {isWalked(forcing) && separation.verdict !== 'apart' && (
        <p class="no-print">
          <a class={styles.pace} href={paceLink(separation.modeHz)}>
            {readingText.pair.pace}
          </a>
        </p>
      )}
    </>
  );
}

function ForcingCard(props: {
  readonly judgement: Judgement;
  readonly index: number;
  readonly units: ReadingUnits;
  readonly rateHz: number;
}) {
  const { judgement, index, units, rateHz } = props;
  const forcing = judgement.forcings[index];
  const unpaired = judgement.unpaired.find((entry) => entry.forcingIndex === index);
  if (!forcing) return null;
  const isAbove = forcing.frequencyHz[0] > rateHz / 2;
  const imageHz = foldedFrequencyHz((forcing.frequencyHz[0] + forcing.frequencyHz[1]) / 2, rateHz);
  return (
    <>
      <p class={styles.said}>
        {unpaired?.verdict === 'blind' && (
          <VerdictMark verdict="blind" word={sentenceCase(verdictWord('blind'))} />
        )}{' '}
        {sentenceCase(forcingName(forcing))}, {formatFrequencyRange(forcing.frequencyHz, units.frequency)}.
      </p>
      <p class="note">
        {unpaired ? unpairedText(unpaired.verdict).meaning : ''}{' '}
        {isAbove ? readingText.pair.image(saidHz(units, imageHz)) : ''} {sentenceCase(forcingOrigin(forcing))}
        .
      </p>
    </>
  );
}

function ToneCard(props: {
  readonly analysis: Analysis;
  readonly judgement: Judgement;
  readonly index: number;
  readonly units: ReadingUnits;
}) {
  const { analysis, judgement, index, units } = props;
  const tone = analysis.tones[index];
  if (!tone) return null;
  return (
    <>
      <p class={styles.said}>
        {keptTogether(readingText.pair.toneAlone(saidHz(units, likelyHz(tone), tone.frequencySdHz)))}{' '}
        {keptTogether(saidMps2(units, tone.amplitudeMps2, tone.amplitudeSdMps2))}.
      </p>
      <p class="note">
        {sentenceCase(toneMatchText(judgement, index))}. {sentenceCase(readingText.fold(tone.fold.verdict))}.
      </p>
    </>
  );
}

/** What explains a tone, in words. */
export function toneMatchText(judgement: Judgement, toneIndex: number): string {
  const match = judgement.toneMatches.find((entry) => entry.toneIndex === toneIndex);
  if (!match?.forcing) return readingText.noMatch;
  const name = forcingName(match.forcing);
  return match.folded ? readingText.foldedImageOf(name) : name;
}
