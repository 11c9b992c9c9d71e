import type { Analysis } from '../../../core/model/analysis.ts';
import type { Judgement, LevelFinding } from '../../../core/model/judgement.ts';
import { criterionName, levelSentence } from '../../../text/levels.ts';
import { formatDisplacement, formatFrequencyRange, formatVelocity } from '../../../text/quantity.ts';
import { readingText } from '../../../text/reading-screen.ts';
import { FactRows } from './fact-rows.tsx';
import { LevelQuestions } from './level-questions.tsx';
import styles from './levels-section.module.css';
import { saidMps2, type ReadingUnits } from '../../../text/reading-units.ts';
import type { ReadingUseCases, ReadingView } from './reading-use-cases.ts';
import { Section } from './section.tsx';

/** How strong the shaking is, and what published guidance says to that; never a pass on half a band. */
export function LevelsSection(props: {
  readonly view: ReadingView;
  readonly cases: ReadingUseCases;
  readonly analysis: Analysis;
  readonly judgement: Judgement;
  readonly units: ReadingUnits;
}) {
  const { view, cases, analysis, judgement, units } = props;
  const words = readingText.levels;
  const { levels } = analysis;
  if (!levels)
    return (
      <Section title={words.title}>
        <p>{analysis.procedure === 'tap' ? words.tapNote : words.none}</p>
      </Section>
    );
  const rows: readonly (readonly [string, string | undefined])[] = [
    [words.peak, saidMps2(units, levels.peakMps2)],
    [words.rms, saidMps2(units, levels.rmsMps2)],
    [
      words.velocityRms,
      levels.velocityRmsMps === undefined
        ? undefined
        : formatVelocity(levels.velocityRmsMps, undefined, units.velocity),
    ],
    [
      words.velocityPeak,
      levels.velocityPeakMps === undefined
        ? undefined
        : formatVelocity(levels.velocityPeakMps, undefined, units.velocity),
    ],
    [
      words.displacement,
      levels.displacementPeakM === undefined
        ? undefined
        : formatDisplacement(levels.displacementPeakM, undefined, units.displacement),
    ],
  ];
  return (
    <Section title={words.title}>
      {analysis.procedure === 'tap' && <p>{words.tapNote}</p>}
      <FactRows rows={rows} />
      <p class="note">
        {words.band(formatFrequencyRange(levels.bandHz, units.frequency, 2))}{' '}
        {levels.leftOutTones ? words.leftOut : ''}
      </p>
      <Findings findings={judgement.levels} />
      <LevelQuestions view={view} cases={cases} judgement={judgement} />
    </Section>
  );
}

function Findings({ findings }: { readonly findings: readonly LevelFinding[] }) {
  if (findings.length === 0) return null;
  return (
    <>
      <h3>{readingText.levels.criteria}</h3>
      <ul class={styles.findings}>
        {findings.map((finding, index) => (
          <li key={`${finding.criterion}${finding.measure}${index}`} class={styles[finding.grade] ?? ''}>
            {levelSentence(finding).replace(`${criterionName(finding.criterion)}: `, '')}
            <b>{criterionName(finding.criterion)}</b>
          </li>
        ))}
      </ul>
    </>
  );
}
