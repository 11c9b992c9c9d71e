import { useState } from 'preact/hooks';

/** Which lines of a plot the person has hidden, by label. */
export function useHiddenLines(): { hidden: ReadonlySet<string>; toggle: (label: string) => void } {
  const [hidden, setHidden] = useState<ReadonlySet<string>>(new Set());
  const toggle = (label: string) => {
    const next = new Set(hidden);
    if (!next.delete(label)) next.add(label);
    setHidden(next);
  };
  return { hidden, toggle };
}
