import type { ComponentChildren } from 'preact';
import { moreToHalve } from '../../../app/reading-desk.ts';
import type { Analysis, Mode } from '../../../core/model/analysis.ts';
import { STANDARD_DEVIATIONS_95 } from '../../../core/model/interval.ts';
import type { Judgement } from '../../../core/model/judgement.ts';
import { formatNumber, numberText } from '../../../text/number.ts';
import { formatDamping, formatPercent, formatVelocity, toUnit } from '../../../text/quantity.ts';
import { readingText } from '../../../text/reading-screen.ts';
import { refusalSentence } from '../../../text/refusals.ts';
import { DataTable } from '../../charts/data-table.tsx';
import { allDoubts } from '../../../text/all-doubts.ts';
import styles from './number-sheet.module.css';
import { toneMatchText } from './pair-card.tsx';
import { saidHz, saidMps2, type ReadingUnits } from '../../../text/reading-units.ts';
import { likelyDampingRatio, likelyHz, otherCandidatesHz } from '../../../text/true-frequency.ts';

/** Half the amplitude is left after ln 2 / (2 pi zeta) cycles (identity; Thomson & Dahleh, ch. 2). */
const HALVING_CYCLES = Math.LN2 / (2 * Math.PI);

interface NumberSheetProps {
  readonly analysis: Analysis;
  readonly judgement: Judgement;
  readonly units: ReadingUnits;
  /** The mode whose numbers are shown large. */
  readonly modeIndex: number;
  readonly onMode: (index: number) => void;
}

/** The numbers, each with its ±: large for the mode in hand, in a table for all. */
export function NumberSheet(props: NumberSheetProps) {
  const { analysis, judgement, units, modeIndex } = props;
  const mode = analysis.modes[modeIndex];
  return (
    <section class={styles.sheet} aria-label={readingText.numbers}>
      {analysis.modes.length > 1 && <ModeTabs {...props} />}
      <dl class={styles.grid}>
        {mode ? <ModeFigures mode={mode} analysis={analysis} units={units} /> : <ToneFigures {...props} />}
        <Figure
          value={readingText.trust[judgement.trust]}
          note={`${readingText.trustName}, ${readingText.doubtCount(allDoubts(analysis, judgement).length)}`}
        />
      </dl>
      <HalvingNote analysis={analysis} />
      {analysis.modes.length > 0 && <ModeTable analysis={analysis} units={units} />}
      {analysis.tones.length > 0 && <ToneTable analysis={analysis} judgement={judgement} units={units} />}
    </section>
  );
}

/** Damping that is known this well is not worth another visit's work: it differs by more from day to day. Our own choice. */
const WELL_KNOWN_RATIO = 0.05;
const isWellKnown = ({ dampingRatio, dampingRatioSd }: Mode): boolean =>
  dampingRatioSd > 0 && STANDARD_DEVIATIONS_95 * dampingRatioSd <= WELL_KNOWN_RATIO * dampingRatio;

/** How much more of the same would halve the ±, where that is worth knowing. */
function HalvingNote({ analysis }: { readonly analysis: Analysis }) {
  const more = moreToHalve(analysis);
  const mode = analysis.modes[0];
  if (more === undefined || (mode && isWellKnown(mode))) return null;
  const words = readingText.halving;
  return (
    <p class="note">{more.kind === 'taps' ? words.taps(more.extraTapCount) : words.seconds(more.extraS)}</p>
  );
}

function ModeTabs({ analysis, units, modeIndex, onMode }: NumberSheetProps) {
  return (
    <div class={styles.tabs} role="group" aria-label={readingText.frequency}>
      {analysis.modes.map((mode, index) => (
        <button key={index} type="button" aria-pressed={index === modeIndex} onClick={() => onMode(index)}>
          {saidHz(units, likelyHz(mode), mode.frequencySdHz).replace(/ ±.*/, '')}
        </button>
      ))}
    </div>
  );
}

/** A figure above its words; the list is read "words: figure" because the term comes first in the source. */
const Figure = (props: { readonly value: ComponentChildren; readonly note: ComponentChildren }) => (
  <div>
    <dt>{props.note}</dt>
    <dd>{props.value}</dd>
  </div>
);

const Measured = (props: { readonly value: number; readonly sd?: number; readonly unit: string }) => {
  const text = numberText(props.value, props.sd);
  return (
    <>
      <span class={styles.whole}>
        {text.value} {props.unit}
      </span>
      {text.plusMinus !== undefined && (
        <>
          {' '}
          <small>± {text.plusMinus}</small>
        </>
      )}
    </>
  );
};

const directionWord = (share: number | undefined): string => {
  if (share === undefined) return '–';
  if (share > 0.8) return readingText.vertical;
  return share < 0.2 ? readingText.sideways : readingText.oblique;
};

const amplitudeWords = (analysis: Analysis): string =>
  ({
    tap: readingText.largest,
    running: readingText.rmsAmplitude,
    ambient: readingText.rmsAmplitude,
    coastdown: readingText.passAmplitude,
  })[analysis.procedure];

function ModeFigures(props: {
  readonly mode: Mode;
  readonly analysis: Analysis;
  readonly units: ReadingUnits;
}) {
  const { mode, analysis, units } = props;
  const others = otherCandidatesHz(mode);
  const isUndecided = mode.fold.verdict === 'undecided';
  const per = toUnit(1, units.frequency);
  return (
    <>
      <Figure
        value={<Measured value={likelyHz(mode) * per} sd={mode.frequencySdHz * per} unit={units.frequency} />}
        note={
          others.length === 0
            ? readingText.frequency
            : readingText.candidates(others.map((hz) => saidHz(units, hz)).join(', '))
        }
      />
      <Figure
        value={
          isUndecided ? (
            '–'
          ) : (
            <Measured value={likelyDampingRatio(mode) * 100} sd={mode.dampingRatioSd * 100} unit="%" />
          )
        }
        note={isUndecided ? readingText.dampingUnsaid : readingText.damping}
      />
      <Figure value={saidMps2(units, mode.amplitudeMps2)} note={amplitudeWords(analysis)} />
      <Figure
        value={directionWord(mode.verticalShare)}
        note={
          mode.verticalShare === undefined
            ? readingText.directionUnknown
            : readingText.verticalShare(formatPercent(mode.verticalShare))
        }
      />
      {!isUndecided && (
        <Figure
          value={readingText.cycles(formatNumber(HALVING_CYCLES / likelyDampingRatio(mode), 2))}
          note={readingText.halfAmplitude}
        />
      )}
    </>
  );
}

function ToneFigures({ analysis, units }: NumberSheetProps) {
  const tone = analysis.tones[0];
  const { levels } = analysis;
  const per = toUnit(1, units.frequency);
  const scale = toUnit(1, units.acceleration);
  return (
    <>
      {tone && (
        <>
          <Figure
            value={
              <Measured value={likelyHz(tone) * per} sd={tone.frequencySdHz * per} unit={units.frequency} />
            }
            note={readingText.tone}
          />
          <Figure
            value={
              <Measured
                value={tone.amplitudeMps2 * scale}
                sd={tone.amplitudeSdMps2 * scale}
                unit={units.acceleration}
              />
            }
            note={readingText.toneAmplitude}
          />
        </>
      )}
      {levels?.velocityRmsMps !== undefined && (
        <Figure
          value={formatVelocity(levels.velocityRmsMps, undefined, units.velocity)}
          note={levels.leftOutTones ? readingText.velocityAtLeast : readingText.velocity}
        />
      )}
      {levels && <Figure value={saidMps2(units, levels.peakMps2)} note={readingText.strongest} />}
    </>
  );
}

const checkText = (check: Mode['halfPower'] | undefined): string => {
  if (check === undefined) return '–';
  return 'refusal' in check ? refusalSentence(check.refusal) : formatDamping(check.dampingRatio);
};

/** A column a mode: on a phone four columns fit, eight do not. */
function ModeTable({ analysis, units }: { readonly analysis: Analysis; readonly units: ReadingUnits }) {
  const { modes } = analysis;
  const row = (name: string, said: (mode: Mode) => string) => [name, ...modes.map(said)];
  const words = readingText.modeRows;
  return (
    <DataTable
      summary={readingText.modes(modes.length)}
      head={['', ...modes.map((_, index) => readingText.modeNumber(index + 1))]}
      rows={[
        row(words.frequency, (mode) => saidHz(units, likelyHz(mode), mode.frequencySdHz)),
        row(words.damping, (mode) => formatDamping(likelyDampingRatio(mode), mode.dampingRatioSd)),
        row(words.largest, (mode) => saidMps2(units, mode.amplitudeMps2)),
        row(words.direction, (mode) => directionWord(mode.verticalShare)),
        row(words.halfPower, (mode) => checkText(mode.halfPower)),
        row(words.logDecrement, (mode) => checkText(mode.logDecrement)),
        row(
          words.fold,
          (mode) => `${saidHz(units, mode.frequencyHz)}, ${readingText.fold(mode.fold.verdict)}`,
        ),
        row(words.method, (mode) => readingText.method(mode.method)),
      ]}
    />
  );
}

const ToneTable = ({
  analysis,
  judgement,
  units,
}: Pick<NumberSheetProps, 'analysis' | 'judgement' | 'units'>) => (
  <DataTable
    summary={readingText.tones(analysis.tones.length)}
    head={readingText.toneHead}
    rows={analysis.tones.map((tone, index) => [
      saidHz(units, likelyHz(tone), tone.frequencySdHz),
      saidMps2(units, tone.amplitudeMps2, tone.amplitudeSdMps2),
      toneMatchText(judgement, index),
      `${saidHz(units, tone.frequencyHz)}, ${readingText.fold(tone.fold.verdict)}`,
    ])}
  />
);
