import type { Page } from 'playwright-core';
import { afterAll, beforeAll, expect, it } from 'vitest';
import { violations } from './axe.ts';
import { chooseFiles, describeInBrowser, picture, ServedWindow } from './served-window.ts';
import { smallBoard } from './small-board.ts';
import { estimate, showTab, showView, tabNames } from './steps.ts';

/** Oracle: WCAG 2.2 A and AA as axe-core checks them (contrast among them), and reflow at 200 %. */

describeInBrowser('accessibility of the window', () => {
  let served: ServedWindow;

  beforeAll(async () => {
    served = await ServedWindow.start();
  });

  afterAll(async () => {
    await served?.close();
  });

  const overlays: readonly (readonly [name: string, open: (page: Page) => Promise<void>])[] = [
    ['menu', async (page) => page.getByRole('button', { name: 'Menu' }).click()],
    ['palette', async (page) => page.keyboard.press('Control+k')],
    ['shortcuts', async (page) => page.keyboard.press('F1')],
    ['cautions', async (page) => page.getByRole('button', { name: /^An estimate, not a measurement/ }).click()],
  ];

  it.each(['light', 'dark'] as const)(
    'has no violation on the start page, in the work and in what lies over it: %s',
    async (colorScheme) => {
      const { page } = await served.open({ colorScheme });
      expect(await violations(page)).toEqual([]);
      await page.getByRole('button', { name: 'Open the sample project' }).click();
      await page.getByRole('button', { name: /^Estimate/ }).waitFor();
      expect(await violations(page)).toEqual([]);
      await page.screenshot({ path: picture(`work-${colorScheme}`) });
      for (const [name, open] of overlays) {
        await open(page);
        await page
          .getByRole(name === 'menu' ? 'menu' : 'dialog')
          .first()
          .waitFor();
        expect(await violations(page), name).toEqual([]);
        await page.screenshot({ path: picture(`${name}-${colorScheme}`) });
        await page.keyboard.press('Escape');
      }
    },
  );

  it.each(['light', 'dark'] as const)('has no violation in any part, with a result: %s', async (colorScheme) => {
    const { page, complaints } = await served.open({ colorScheme });
    await chooseFiles(page, [smallBoard()]);
    await page.getByRole('button', { name: /^Estimate/ }).click();
    const status = page.getByRole('contentinfo');
    await status.getByText('CISPR 32 class B at 3 m').waitFor({ timeout: 60_000 });
    await page.keyboard.press('Alt+w');
    const check = async (name: string) => {
      // Pictures and plots follow the panel.
      await page.waitForTimeout(1000);
      expect(await violations(page), name).toEqual([]);
      await page.screenshot({ path: picture(`${name.toLowerCase()}-${colorScheme}`) });
    };
    for (const name of await tabNames(page)) {
      await showTab(page, name);
      await page.getByRole('tabpanel').first().waitFor();
      if (name === 'Report') await page.getByRole('img', { name: /^Page 1 of/ }).waitFor({ timeout: 90_000 });
      const views = await page.getByRole('tablist', { name, exact: true }).getByRole('tab').allTextContents();
      if (views.length === 0) await check(name);
      for (const view of views) {
        await showView(page, name, view);
        await check(`${name}-${view}`);
      }
    }
    await page.getByRole('button', { name: 'List', exact: true }).click();
    await page.getByRole('button', { name: 'Layers', exact: true }).click();
    await check('List-Layers');
    expect(complaints).toEqual([]);
  });

  it('needs no sideways scrolling at 200 % on a screen of 1280 × 720', async () => {
    // What the browser's zoom does: half as many CSS pixels, twice the density.
    const { page } = await served.open({ viewport: { width: 640, height: 360 }, deviceScaleFactor: 2 });
    const overflow = () => page.evaluate(() => document.documentElement.scrollWidth - innerWidth);
    expect(await overflow()).toBeLessThanOrEqual(0);
    await page.screenshot({ path: picture('zoom-start') });
    await page.getByRole('button', { name: 'Open the sample project' }).click();
    const estimate = page.getByRole('button', { name: /^Estimate/ });
    await estimate.waitFor();
    expect(await overflow()).toBeLessThanOrEqual(0);
    const box = (await estimate.boundingBox())!;
    expect(box.x + box.width).toBeLessThanOrEqual(640);
    await page.screenshot({ path: picture('zoom-work') });
    for (const name of await tabNames(page)) {
      await showTab(page, name);
      expect(await overflow(), name).toBeLessThanOrEqual(0);
      expect(await violations(page), name).toEqual([]);
      await page.screenshot({ path: picture(`zoom-${name.toLowerCase()}`) });
    }
  });

  it('fills a screen of 3840 × 2160', async () => {
    const { page } = await served.open({ viewport: { width: 3840, height: 2160 } });
    await chooseFiles(page, [smallBoard()]);
    await page.getByRole('heading', { name: 'Greenhouse lamp', exact: true }).waitFor();
    await estimate(page);
    await page.keyboard.press('Alt+w');
    await page.getByRole('img', { name: /^Turntable pattern: maximum/ }).waitFor({ timeout: 30_000 });
    const footer = (await page.getByRole('contentinfo').boundingBox())!;
    expect(footer.y + footer.height).toBe(2160);
    expect(footer.width).toBe(3840);
    await page.screenshot({ path: picture('work-4k') });
  });
});
