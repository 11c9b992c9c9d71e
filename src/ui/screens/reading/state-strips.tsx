import { interruptionSentence } from '../../../text/interruptions.ts';
import { readingText } from '../../../text/reading-screen.ts';
import { Button } from '../../components/button.tsx';
import type { ReadingUseCases, ReadingView } from './reading-use-cases.ts';
import styles from './state-strips.module.css';

/** What must be known before anything else: practice, interrupted, in the trash. */
export function StateStrips({
  view,
  cases,
}: {
  readonly view: ReadingView;
  readonly cases: ReadingUseCases;
}) {
  const { reading, entity } = view;
  const cut = reading.sensor.interruption;
  return (
    <>
      {reading.practice && (
        <p class={`${styles.strip} ${styles.practice}`}>
          <b>{readingText.practice}.</b> {readingText.practiceNote}
        </p>
      )}
      {cut && <p class={styles.strip}>{interruptionSentence(cut)}</p>}
      {entity.trashed && (
        <div class={styles.strip}>
          <span>{readingText.trashed}</span>
          <Button onClick={() => void cases.restore(reading._id)}>{readingText.restore}</Button>
        </div>
      )}
    </>
  );
}
