import { ArrowOn } from '../../components/icons.tsx';
import styles from './hand-over.module.css';

/** One form that readings can take: a full-width target. */
export const FormRow = (props: {
  readonly title: string;
  readonly note?: string;
  readonly onClick: () => void;
}) => (
  <li>
    <button type="button" class={styles.form} onClick={props.onClick}>
      <span>
        <b>{props.title}</b>
        {props.note && <span class="note">{props.note}</span>}
      </span>
      <ArrowOn />
    </button>
  </li>
);
