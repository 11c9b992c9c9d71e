import type { Analysis } from '../../../core/model/analysis.ts';
import type { Judgement } from '../../../core/model/judgement.ts';
import { doubtText } from '../../../text/doubts.ts';
import { readingText } from '../../../text/reading-screen.ts';
import { allDoubts } from '../../../text/all-doubts.ts';
import styles from './doubts-section.module.css';
import { Section } from './section.tsx';

/** Every reason not to trust the reading fully: what it means, what to do. */
export function DoubtsSection(props: { readonly analysis: Analysis; readonly judgement: Judgement }) {
  const doubts = allDoubts(props.analysis, props.judgement);
  const words = readingText.doubts;
  return (
    <Section
      title={words.title}
      aside={
        <span class="quiet">
          {readingText.trust[props.judgement.trust]} {readingText.trustName}
        </span>
      }
    >
      {doubts.length === 0 ? (
        <p>{words.none}</p>
      ) : (
        <ul class={styles.list}>
          {doubts.map((doubt) => {
            const text = doubtText(doubt);
            return (
              <li key={doubt.code}>
                <h3>{text.name}</h3>
                <p>{text.meaning}</p>
                <p class={styles.remedy}>
                  <span class="unseen">{words.todo}: </span>
                  {text.remedy}
                </p>
              </li>
            );
          })}
        </ul>
      )}
    </Section>
  );
}
