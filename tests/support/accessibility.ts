import { AxeBuilder } from '@axe-core/playwright';
import type { Page } from 'playwright-core';

const levels = ['wcag2a', 'wcag2aa', 'wcag21a', 'wcag21aa', 'wcag22aa'];

/** Breaches of WCAG 2.2 A and AA that axe can tell, one line each; empty is what a test wants. */
export async function accessibilityFaults(page: Page): Promise<string[]> {
  const { violations } = await new AxeBuilder({ page }).withTags(levels).analyze();
  return violations.flatMap((violation) =>
    violation.nodes.map((node) => `${violation.id}: ${node.html.slice(0, 200)}`),
  );
}
