import { buildWhenOld } from '../../src/cli/project.mjs';

/** Browser tests run against the built app; THRUMBOOK_DIST names another built folder, taken as it is. */
export default async function setup(): Promise<void> {
  if (process.env['THRUMBOOK_DIST'] === undefined) await buildWhenOld();
}
