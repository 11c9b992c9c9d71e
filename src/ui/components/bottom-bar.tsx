import type { ComponentChildren } from 'preact';
import styles from './bottom-bar.module.css';

/** The actions of a screen where the thumb is: stays at the foot while the page scrolls. The last one is the main one. */
export function BottomBar({ children }: { readonly children: ComponentChildren }) {
  return <div class={`${styles.bar} no-print`}>{children}</div>;
}
