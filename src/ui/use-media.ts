import { useEffect, useState } from 'preact/hooks';

/** Whether a media query holds now; draws again when that changes. */
export function useMedia(query: string): boolean {
  const [holds, setHolds] = useState(() => matchMedia(query).matches);
  useEffect(() => {
    const list = matchMedia(query);
    const tell = () => setHolds(list.matches);
    tell();
    list.addEventListener('change', tell);
    return () => list.removeEventListener('change', tell);
  }, [query]);
  return holds;
}
