import { useEffect } from 'preact/hooks';
import { IconClose } from './icons.tsx';
import styles from './notice-list.module.css';

export interface ShownNotice {
  readonly id: number;
  readonly text: string;
  readonly tone: 'plain' | 'failure';
  readonly action?: { readonly label: string; readonly run: () => void };
}

/** Long enough to read and to reach an undo with a glove; hovering or focusing keeps it. */
const STAY_MS = 8000;

/** Messages above the foot of the screen: polite ones wait for a pause in speech, failures do not. */
export function NoticeList(props: {
  readonly notices: readonly ShownNotice[];
  readonly closeLabel: string;
  readonly onDismiss: (id: number) => void;
}) {
  const says = (tone: ShownNotice['tone']) =>
    props.notices
      .filter((notice) => notice.tone === tone)
      .map((notice) => <Item key={notice.id} notice={notice} {...props} />);
  return (
    <div class={`${styles.list} no-print`}>
      <div role="status" aria-live="polite">
        {says('plain')}
      </div>
      <div role="alert" aria-live="assertive">
        {says('failure')}
      </div>
    </div>
  );
}

function Item(props: {
  readonly notice: ShownNotice;
  readonly closeLabel: string;
  readonly onDismiss: (id: number) => void;
}) {
  const { notice } = props;
  const isLasting = notice.tone === 'failure';
  useEffect(() => {
    if (isLasting) return undefined;
    const timer = setTimeout(() => props.onDismiss(notice.id), STAY_MS);
    return () => clearTimeout(timer);
  }, [notice.id]);
  return (
    <div class={styles.notice}>
      <span>{notice.text}</span>
      {notice.action && (
        <button
          type="button"
          onClick={() => {
            notice.action?.run();
            props.onDismiss(notice.id);
          }}
        >
          {notice.action.label}
        </button>
      )}
      <button type="button" aria-label={props.closeLabel} onClick={() => props.onDismiss(notice.id)}>
        <IconClose />
      </button>
    </div>
  );
}
