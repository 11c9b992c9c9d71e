import type { SpecialistReason } from '../../../core/model/judgement.ts';
import { SPECIALIST_HEADING, specialistText } from '../../../text/specialist.ts';
import { IconCaution } from '../../components/icons.tsx';
import styles from './specialist-call.module.css';

/** When this is more than a survey can answer: whom to call, and why. */
export function SpecialistCall({ reasons }: { readonly reasons: readonly SpecialistReason[] }) {
  if (reasons.length === 0) return null;
  return (
    <section class={styles.call} aria-label={SPECIALIST_HEADING}>
      <h2>
        <IconCaution /> {SPECIALIST_HEADING}
      </h2>
      <ul>
        {reasons.map((reason) => (
          <li key={reason}>{specialistText(reason)}</li>
        ))}
      </ul>
    </section>
  );
}
