/** Line drawings of our own, one stroke weight, on a 24 grid; always beside words, so hidden from screen readers. */
import type { ComponentChildren } from 'preact';

function Drawing({ children }: { readonly children: ComponentChildren }) {
  return (
    <svg
      width="1.5rem"
      height="1.5rem"
      viewBox="0 0 24 24"
      fill="none"
      stroke="currentColor"
      stroke-width="1.8"
      stroke-linecap="round"
      stroke-linejoin="round"
      aria-hidden="true"
      focusable="false"
    >
      {children}
    </svg>
  );
}

/** A ring-down: the program's own sign. */
export const IconStart = () => (
  <Drawing>
    <path d="M2.5 12h2.2C6 3.5 7 3.5 8.3 12c1.2 6.6 2.2 6.6 3.3 0 1-4.6 1.9-4.6 2.8 0 .8 3 1.5 3 2.3 0 .7-1.6 1.2-1.6 1.9 0h2.9" />
  </Drawing>
);
export const IconAssets = () => (
  <Drawing>
    <path d="M3 20.5h18M5 20.5V9.5M12 20.5V9.5M19 20.5V9.5M2.5 9.5h19" />
    <circle cx="12" cy="5" r="1.8" />
  </Drawing>
);
export const IconSources = () => (
  <Drawing>
    <circle cx="12" cy="12" r="2.6" />
    <path d="M12 9.4C10.6 6 11.4 3.4 14 3c1.6 2.6.6 4.9-2 6.4M14.3 13.3c3.6.5 5.5 2.4 4.6 4.9-3.1 0-4.6-1.9-4.6-4.9M9.7 13.3c-2.2 2.9-4.8 3.6-6.5 1.5 1.5-2.6 3.9-3.1 6.5-1.5" />
  </Drawing>
);
export const IconHandOver = () => (
  <Drawing>
    <path d="M4 13v6.5h16V13M12 3.5v11M8 10.5l4 4 4-4" />
  </Drawing>
);
export const IconPhone = () => (
  <Drawing>
    <rect x="6.5" y="2.5" width="11" height="19" rx="2.2" />
    <path d="M10.5 18.3h3" />
  </Drawing>
);
export const ArrowBack = () => (
  <Drawing>
    <path d="M14.5 5l-7 7 7 7" />
  </Drawing>
);
export const ArrowOn = () => (
  <Drawing>
    <path d="M9.5 5l7 7-7 7" />
  </Drawing>
);
export const IconAdd = () => (
  <Drawing>
    <path d="M12 5v14M5 12h14" />
  </Drawing>
);
export const IconFile = () => (
  <Drawing>
    <path d="M6 3h8l4 4v14H6zM14 3v4h4M9 13h6M9 16.5h6" />
  </Drawing>
);
export const IconCaution = () => (
  <Drawing>
    <path d="M12 4l9 16H3zM12 10v5M12 17.6v.1" />
  </Drawing>
);
export const IconClose = () => (
  <Drawing>
    <path d="M6 6l12 12M18 6L6 18" />
  </Drawing>
);
