import type { StorePort } from '../app/ports.ts';

/** What the exchange is given: the store as it needs it, what stands in every file, and the look of reports. */
export interface ExchangeParts {
  readonly store: Pick<StorePort, 'facts' | 'fact' | 'putFacts' | 'rawOf' | 'storedRawOf'>;
  readonly about: { readonly version: string; readonly commit: string; readonly analysisVersion: number };
  readonly now: () => Date;
  /** The named tokens of the screens as a style sheet: a report has the same paper and ink. */
  readonly tokensCss: (names: readonly string[]) => string;
}
