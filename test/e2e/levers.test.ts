import type { Page } from 'playwright-core';
import { afterAll, beforeAll, expect, it } from 'vitest';
import { violations } from './axe.ts';
import { chooseFiles, describeInBrowser, picture, ServedWindow } from './served-window.ts';
import { smallBoard } from './small-board.ts';

/** Oracle: a slower edge radiates less, a pull is one step of undo, and what was kept comes back. */

const LONG_MS = 120_000;

describeInBrowser('levers', () => {
  let served: ServedWindow;

  beforeAll(async () => {
    served = await ServedWindow.start();
  });

  afterAll(async () => {
    await served?.close();
  });

  const readout = (page: Page) => page.getByRole('region', { name: 'Worst margin' });
  const marginDb = async (page: Page) =>
    Number(/[−\d.]+(?= dB)/.exec((await readout(page).textContent())!)![0].replace('−', '-'));
  const edge = (page: Page) => page.getByRole('slider', { name: 'Rise and fall time of clock' });

  async function prepared(page: Page): Promise<void> {
    await chooseFiles(page, [smallBoard()]);
    await page.getByRole('tab', { name: 'Levers' }).click();
    await page.getByRole('tabpanel').getByRole('button', { name: 'Estimate' }).click();
    // The effect of doubling the edge stands there once the quick answers are prepared.
    await page.getByText(/^×2: worst margin \+/).waitFor({ timeout: LONG_MS });
  }

  it(
    'follow a pull with the worst margin, as one step; discard and undo lead back',
    async () => {
      const { page, complaints } = await served.open();
      await prepared(page);
      const before = await marginDb(page);
      expect(await edge(page).getAttribute('aria-valuetext')).toBe('1 ns');
      const thumb = (await edge(page).locator('xpath=ancestor::*[contains(@class, "thumb")]').boundingBox())!;
      const [x, y] = [thumb.x + thumb.width / 2, thumb.y + thumb.height / 2];
      await page.mouse.move(x, y);
      await page.mouse.down();
      for (let move = 1; move <= 8; move++) await page.mouse.move(x + 4 * move, y);
      // A rest in the middle of the pull makes no second step.
      await page.waitForTimeout(1700);
      await page.mouse.move(x + 40, y);
      await page.mouse.up();
      await readout(page).getByText(/^\+\d/).waitFor();
      expect(await marginDb(page)).toBeGreaterThan(before + 1);
      expect(await page.getByText('quick answer to the change').count()).toBe(1);
      await page.screenshot({ path: picture('levers-pulled') });

      await page.keyboard.press('Control+z');
      await readout(page).getByText('no change', { exact: true }).waitFor();
      expect([await marginDb(page), await edge(page).getAttribute('aria-valuetext')]).toEqual([before, '1 ns']);
      await page.keyboard.press('Control+y');
      await readout(page).getByText(/^\+\d/).waitFor();
      await page.getByRole('button', { name: 'Discard' }).click();
      await readout(page).getByText('no change', { exact: true }).waitFor();
      expect([await marginDb(page), await edge(page).getAttribute('aria-valuetext')]).toEqual([before, '1 ns']);

      await edge(page).focus();
      await page.keyboard.press('ArrowRight');
      await readout(page).getByText(/^\+\d/).waitFor();
      const spoken = page.getByRole('status').filter({ hasText: /^Worst margin .* it was/ });
      await spoken.waitFor({ state: 'attached' });
      expect(complaints).toEqual([]);
    },
    2 * LONG_MS,
  );

  it(
    'ask for an estimate when what changed has to be solved, and tell the change then; kept as a revision',
    async () => {
      const { page, complaints } = await served.open();
      await prepared(page);
      await page.getByRole('button', { name: 'Height to the plane, layer' }).click();
      const height = page.getByRole('textbox', { name: 'Height to the plane' });
      await height.fill('100u');
      await height.press('Enter');
      await page.getByText('The layout is another one').waitFor();
      await page.getByRole('button', { name: 'Estimate the change' }).click();
      // Half the height to the plane: less from the pair.
      await readout(page).getByText(/^\+\d/).waitFor({ timeout: LONG_MS });
      await page.getByRole('textbox', { name: 'New revision' }).fill('B');
      await page.getByRole('button', { name: 'Keep as revision' }).click();
      await page.getByRole('banner').getByText('rev B').waitFor({ timeout: LONG_MS });
      await readout(page).getByText('no change', { exact: true }).waitFor({ timeout: LONG_MS });
      expect(complaints).toEqual([]);
    },
    3 * LONG_MS,
  );

  it.each(['light', 'dark'] as const)(
    'have no violation, and fit 320 px: %s',
    async (colorScheme) => {
      const { page } = await served.open({ colorScheme, viewport: { width: 320, height: 800 } });
      await prepared(page);
      for (const name of ['Cables (0)', 'Height to the plane, layer']) await page.getByRole('button', { name }).click();
      expect(await violations(page)).toEqual([]);
      const panel = page.getByRole('tabpanel', { name: 'Levers' });
      const overflowing = await panel.evaluate((element) => {
        const { right } = element.getBoundingClientRect();
        return [...element.querySelectorAll('*')].filter((part) => part.getBoundingClientRect().right > right + 1)
          .length;
      });
      expect(overflowing).toBe(0);
      await panel.screenshot({ path: picture(`levers-narrow-${colorScheme}`) });
    },
    2 * LONG_MS,
  );
});
