import type { ComponentChildren } from 'preact';
import type { ReadingUnits } from '../../../text/reading-units.ts';
import type { ReadingLinks, ReadingUseCases } from './reading-use-cases.ts';

export interface ReadingPageProps {
  readonly id: string;
  readonly cases: ReadingUseCases;
  readonly links: ReadingLinks;
  readonly units: ReadingUnits;
  /** The dialog that names the spot; without it the reading stays where it is. */
  readonly spotDialog?: (id: string, onClose: () => void) => ComponentChildren;
}
