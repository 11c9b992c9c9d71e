/** Short messages at the edge of the screen, some with an undo. */
import { live, type Live } from './live-state.ts';

export interface Notice {
  readonly id: number;
  readonly text: string;
  readonly tone: 'plain' | 'failure';
  readonly action?: { readonly label: string; readonly run: () => void };
}

export interface Notices {
  readonly list: Live<readonly Notice[]>;
  show(text: string, options?: Partial<Pick<Notice, 'tone' | 'action'>>): void;
  dismiss(id: number): void;
}

/** More than this hides the screen that they speak of. */
const MOST_NOTICES = 3;

export function createNotices(): Notices {
  const list = live<readonly Notice[]>([]);
  let count = 0;
  return {
    list,
    show(text, options = {}) {
      count += 1;
      list.set([...list.get(), { id: count, text, tone: 'plain' as const, ...options }].slice(-MOST_NOTICES));
    },
    dismiss: (id) => list.set(list.get().filter((notice) => notice.id !== id)),
  };
}
