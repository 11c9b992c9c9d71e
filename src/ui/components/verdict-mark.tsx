import type { Verdict } from '../../core/model/judgement.ts';
import { VERDICT_BOX_PX, verdictShape } from '../../core/picture/verdict-shape.ts';
import styles from './verdict-mark.module.css';

/** The shape of a verdict, with its word beside it: told by word, shape and colour together. */
export function VerdictMark({ verdict, word }: { readonly verdict: Verdict; readonly word: string }) {
  const shape = verdictShape(verdict);
  return (
    <span class={`${styles.mark} ${styles[verdict]}`}>
      <svg viewBox={`0 0 ${VERDICT_BOX_PX} ${VERDICT_BOX_PX}`} aria-hidden="true" focusable="false">
        {shape.filled && <path d={shape.filled} fill="currentColor" />}
        {shape.outline && <path d={shape.outline} fill="none" stroke="currentColor" stroke-width="1.5" />}
      </svg>
      {word}
    </span>
  );
}
