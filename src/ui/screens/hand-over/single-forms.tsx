import type { Form } from '../../../app/hand-over.ts';
import { CHARTS } from '../../../app/ports.ts';
import { handOverText as text } from '../../../text/hand-over.ts';
import { Button } from '../../components/button.tsx';
import { FormRow } from './form-row.tsx';
import styles from './hand-over.module.css';

/** Samples and charts: only of one reading at a time. */
export const SingleForms = ({ onForm }: { readonly onForm: (form: Form) => void }) => (
  <details>
    <summary>{text.single}</summary>
    <ul class={styles.forms}>
      <FormRow {...text.singleForms.samplesCsv} onClick={() => onForm({ kind: 'samples', as: 'csv' })} />
      <FormRow {...text.singleForms.samplesNpy} onClick={() => onForm({ kind: 'samples', as: 'npy' })} />
      {CHARTS.map((chart) => (
        <li key={chart} class={styles.chart}>
          <b>{text.singleForms[chart].title}</b>
          {(['png', 'svg'] as const).map((as) => (
            <Button
              key={as}
              label={`${text.singleForms[chart].title}, ${as.toUpperCase()}`}
              onClick={() => onForm({ kind: 'chart', chart, as })}
            >
              {as === 'png' ? text.asPng : text.asSvg}
            </Button>
          ))}
        </li>
      ))}
    </ul>
  </details>
);
