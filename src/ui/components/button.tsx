import type { ComponentChildren } from 'preact';
import styles from './button.module.css';

interface Look {
  readonly children: ComponentChildren;
  /** `main`: the one thing to do here. `plain`: another way. `quiet`: rarely. `grave`: takes something away. */
  readonly kind?: 'main' | 'plain' | 'quiet' | 'grave';
  readonly wide?: boolean;
}

const look = (props: Look) =>
  [styles.button, styles[props.kind ?? 'plain'], props.wide ? styles.wide : ''].join(' ');

export function Button(
  props: Look & {
    readonly onClick: (event: MouseEvent) => void;
    readonly disabled?: boolean;
    readonly pressed?: boolean;
    readonly label?: string;
    readonly type?: 'button' | 'submit';
  },
) {
  return (
    <button
      type={props.type ?? 'button'}
      class={look(props)}
      onClick={props.onClick}
      disabled={props.disabled ?? false}
      {...(props.pressed === undefined ? {} : { 'aria-pressed': props.pressed })}
      {...(props.label ? { 'aria-label': props.label } : {})}
    >
      {props.children}
    </button>
  );
}

export function LinkButton(props: Look & { readonly href: string; readonly download?: string }) {
  return (
    <a class={look(props)} href={props.href} {...(props.download ? { download: props.download } : {})}>
      {props.children}
    </a>
  );
}
