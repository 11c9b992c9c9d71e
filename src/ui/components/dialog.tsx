import type { ComponentChildren } from 'preact';
import { useEffect, useId, useRef } from 'preact/hooks';
import styles from './dialog.module.css';

/** A native modal dialog: the platform keeps the focus inside and gives it back. Escape and the backdrop close it. */
export function Dialog(props: {
  readonly title: string;
  readonly children: ComponentChildren;
  readonly actions: ComponentChildren;
  readonly onClose: () => void;
}) {
  const element = useRef<HTMLDialogElement>(null);
  const titleId = useId();
  useEffect(() => {
    const dialog = element.current;
    if (dialog && !dialog.open) dialog.showModal();
  }, []);
  return (
    <dialog
      ref={element}
      class={styles.dialog}
      aria-labelledby={titleId}
      onClose={props.onClose}
      onClick={(event) => {
        if (event.target === element.current) element.current?.close();
      }}
    >
      <div class={styles.body}>
        <h2 id={titleId}>{props.title}</h2>
        {props.children}
        <div class={styles.actions}>{props.actions}</div>
      </div>
    </dialog>
  );
}
