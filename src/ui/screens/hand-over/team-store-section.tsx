import type { App } from '../../../app/app.ts';

/** The team's own database server, for teams that outgrow one laptop. */
export function TeamStoreSection(_: { readonly app: App }) {
  return null;
}
