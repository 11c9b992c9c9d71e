import type { ComponentChildren } from 'preact';
import { useEffect, useRef } from 'preact/hooks';
import { ArrowBack } from './icons.tsx';
import styles from './page.module.css';

/**
 * Frame of one screen: way back, title, content. The title takes the focus when the screen opens, so that a
 * screen reader begins there; a screen that starts with something to type passes `quietFocus`.
 */
export function Page(props: {
  readonly title: ComponentChildren;
  readonly over?: ComponentChildren;
  readonly back?: { readonly label: string; readonly onClick: () => void };
  readonly aside?: ComponentChildren;
  readonly children: ComponentChildren;
  readonly quietFocus?: boolean;
}) {
  const heading = useRef<HTMLHeadingElement>(null);
  useEffect(() => {
    if (!props.quietFocus) heading.current?.focus({ preventScroll: true });
  }, []);
  return (
    <div class={styles.page}>
      {(props.back || props.aside) && (
        <div class={`${styles.top} no-print`}>
          {props.back ? (
            <button type="button" class={styles.back} onClick={props.back.onClick}>
              <ArrowBack />
              <span>{props.back.label}</span>
            </button>
          ) : (
            <span />
          )}
          {props.aside}
        </div>
      )}
      {props.over && <p class={styles.over}>{props.over}</p>}
      <h1 ref={heading} tabIndex={-1} class={styles.title}>
        {props.title}
      </h1>
      {props.children}
    </div>
  );
}
