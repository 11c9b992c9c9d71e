import { AxeBuilder } from '@axe-core/playwright';
import type { Page } from 'playwright-core';

/** What axe finds on the page as it stands, one line each; legacy mode spares a page per run. */
export async function axeFindings(page: Page, rules?: readonly string[]): Promise<string[]> {
  const builder = new AxeBuilder({ page }).setLegacyMode();
  const { violations } = await (rules ? builder.withRules([...rules]) : builder).analyze();
  return violations.flatMap((violation) =>
    violation.nodes.map((node) => `${violation.id}: ${node.target.join(' ')} ${node.failureSummary ?? ''}`),
  );
}

/** The theme of the page, without a trip through the settings. */
export const showTheme = (page: Page, theme: string): Promise<void> =>
  page.evaluate((next) => void (document.documentElement.dataset['theme'] = next), theme);
