import styles from './zoom-tools.module.css';

export interface ZoomWords {
  readonly closer: string;
  readonly wider: string;
  readonly whole: string;
}

/** Buttons for what a wheel or two fingers do, at a gloved finger's size. */
export function ZoomTools(props: {
  readonly words: ZoomWords;
  /** Tells these buttons from those of the next picture. */
  readonly of: string;
  readonly isZoomed: boolean;
  readonly onZoom: (closer: boolean) => void;
  readonly onWhole: () => void;
}) {
  const { words, of, isZoomed } = props;
  return (
    <div class={`${styles.tools} no-print`}>
      <button
        type="button"
        class={styles.tool}
        aria-label={`${words.closer}: ${of}`}
        onClick={() => props.onZoom(true)}
      >
        <Sign path="M8 2.5v11M2.5 8h11" />
      </button>
      <button
        type="button"
        class={styles.tool}
        aria-label={`${words.wider}: ${of}`}
        disabled={!isZoomed}
        onClick={() => props.onZoom(false)}
      >
        <Sign path="M2.5 8h11" />
      </button>
      <button
        type="button"
        class={styles.tool}
        aria-label={`${words.whole}: ${of}`}
        disabled={!isZoomed}
        onClick={props.onWhole}
      >
        <Sign path="M2 6V2h4M10 2h4v4M14 10v4h-4M6 14H2v-4" />
      </button>
    </div>
  );
}

const Sign = ({ path }: { readonly path: string }) => (
  <svg viewBox="0 0 16 16" aria-hidden="true" focusable="false">
    <path d={path} />
  </svg>
);
