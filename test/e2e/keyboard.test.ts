import type { Page } from 'playwright-core';
import { afterAll, beforeAll, expect, it } from 'vitest';
import { describeInBrowser, ServedWindow } from './served-window.ts';
import { smallBoard } from './small-board.ts';
import { estimated, status, tabNames } from './steps.ts';

/** No pointer at all. Oracle: WCAG 2.1.1 (everything by keyboard), 2.1.2 (no trap), 2.4.7 (focus is seen). */

describeInBrowser('the keyboard alone', () => {
  let served: ServedWindow;

  beforeAll(async () => {
    served = await ServedWindow.start();
  });

  afterAll(async () => {
    await served?.close();
  });

  const focused = (page: Page) =>
    page.evaluate(() => {
      const element = document.activeElement;
      const name = element?.getAttribute('aria-label') || element?.textContent?.trim() || element?.tagName || '';
      return `${element?.getAttribute('role') ?? element?.tagName.toLowerCase()}: ${name}`;
    });

  /** Tabs on until the wanted element has the focus. */
  async function tabTo(page: Page, wanted: RegExp): Promise<void> {
    const seen: string[] = [];
    for (let i = 0; i < 80; i++) {
      const now = await focused(page);
      if (wanted.test(now)) return;
      seen.push(now);
      await page.keyboard.press('Tab');
    }
    expect.unreachable(`${wanted} was not reached: ${seen.join('; ')}`);
  }

  it('leads from the start to an estimate, through its lines and into every part', async () => {
    const { page, complaints } = await served.open();
    await tabTo(page, /^button: Open …|^button: Open/);
    const [chooser] = await Promise.all([page.waitForEvent('filechooser'), page.keyboard.press('Control+o')]);
    await chooser.setFiles([smallBoard()]);
    await page.getByRole('heading', { name: 'Greenhouse lamp', exact: true }).waitFor();
    await tabTo(page, /^button: Estimate/);
    await page.keyboard.press('Enter');
    await estimated(page);

    const line = status(page).getByText(/dBµV\/m, .* dB (under|over)/);
    const steps: (string | null)[] = [];
    for (let i = 0; i < 3; i++) {
      await page.keyboard.press('ArrowRight');
      steps.push(await line.textContent());
    }
    expect(new Set(steps).size).toBe(3);

    const names = await tabNames(page);
    await tabTo(page, new RegExp(`^tab: ${names[0]}$`));
    for (const [i, name] of names.entries()) {
      if (i > 0) await page.keyboard.press('ArrowRight');
      expect(await focused(page)).toBe(`tab: ${name}`);
      await page.getByRole('tabpanel', { name, exact: true }).waitFor();
      // Its outline is drawn.
      expect(await page.evaluate(() => getComputedStyle(document.activeElement!).outlineStyle)).toBe('solid');
    }

    // Once around the whole window and out at its end: no part keeps the focus.
    await tabTo(page, /^body: /);
    expect(complaints).toEqual([]);
  });
});
