import { readFileSync } from 'node:fs';
import { createRequire } from 'node:module';
import type axe from 'axe-core';
import type { Page } from 'playwright-core';

const AXE_FILE = createRequire(import.meta.url).resolve('axe-core/axe.min.js');

/** Violations of WCAG 2.2 A and AA (axe-core's rules) in what the page shows, as short lines. */
export async function violations(page: Page): Promise<string[]> {
  // Run by the debugger, so that the page's content policy stays as it is.
  const isThere = await page.evaluate(() => 'axe' in window);
  if (!isThere) await page.evaluate(readFileSync(AXE_FILE, 'utf8'));
  const found = await page.evaluate(async () => {
    const { axe: run } = window as unknown as { axe: typeof axe };
    const tags = ['wcag2a', 'wcag2aa', 'wcag21a', 'wcag21aa', 'wcag22aa', 'best-practice'];
    const result = await run.run(document, { runOnly: { type: 'tag', values: tags } });
    return result.violations.flatMap(({ id, help, nodes }) =>
      nodes.map(({ target, failureSummary }) => `${id}: ${help}: ${String(target)}: ${failureSummary ?? ''}`),
    );
  });
  return found;
}
