import { readFileSync } from 'node:fs';
import { createRequire } from 'node:module';
import type { Page } from '@playwright/test';
import type { AxeResults } from 'axe-core';

const source = readFileSync(createRequire(import.meta.url).resolve('axe-core/axe.min.js'), 'utf8');
const RULES = ['wcag2a', 'wcag2aa', 'wcag21a', 'wcag21aa', 'wcag22aa'];

/** @returns the A and AA violations of the page as it stands: rule, element, what is wrong. */
export async function violations(page: Page): Promise<string[]> {
  // Evaluated, not added as a script element: the content policy forbids inline scripts.
  await page.evaluate(source);
  const found = await page.evaluate<AxeResults, string[]>(
    (rules) => window.axe.run(document, { runOnly: rules }),
    RULES,
  );
  return found.violations.flatMap(({ id, nodes }) =>
    nodes.map((node) => `${id}: ${node.html.slice(0, 160)} (${node.failureSummary ?? ''})`),
  );
}

declare global {
  interface Window {
    axe: { run: (context: Document, options: { runOnly: string[] }) => Promise<AxeResults> };
  }
}
