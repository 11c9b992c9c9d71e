import type { SpecialistReason } from '../../../core/model/judgement.ts';
import { readingText } from '../../../text/reading-screen.ts';
import { SPECIALIST_HEADING, specialistText } from '../../../text/specialist.ts';
import { IconCaution } from '../../components/icons.tsx';
import styles from './specialist-call.module.css';

/** When this is more than a survey can answer: whom to call, and why. The gravest reason is always in sight. */
export function SpecialistCall({ reasons }: { readonly reasons: readonly SpecialistReason[] }) {
  const [first, ...others] = reasons;
  if (first === undefined) return null;
  return (
    <section class={styles.call} aria-label={SPECIALIST_HEADING}>
      <h2>
        <IconCaution /> {SPECIALIST_HEADING}
      </h2>
      <p>{specialistText(first)}</p>
      {others.length > 0 && (
        <details>
          <summary>{readingText.specialistMore(others.length)}</summary>
          <ul>
            {others.map((reason) => (
              <li key={reason}>{specialistText(reason)}</li>
            ))}
          </ul>
        </details>
      )}
    </section>
  );
}
