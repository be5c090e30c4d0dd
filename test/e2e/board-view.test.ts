import type { Page } from 'playwright-core';
import { afterAll, beforeAll, expect, it } from 'vitest';
import { violations } from './axe.ts';
import { chooseFiles, describeInBrowser, picture, ServedWindow } from './served-window.ts';
import { smallBoard } from './small-board.ts';

/** The board from outside. Oracle: the lamp board's one trace runs through its middle, 30 mm long, over a plane. */

describeInBrowser('the board', () => {
  let served: ServedWindow;

  beforeAll(async () => {
    served = await ServedWindow.start();
  });

  afterAll(async () => {
    await served?.close();
  });

  const board = (page: Page) => page.getByRole('region', { name: 'Board' });
  const stage = (page: Page) => board(page).getByRole('application');
  const scale = async (page: Page): Promise<number> => {
    const label = await board(page).getByRole('img', { name: 'Scale' }).getAttribute('aria-label');
    return Number.parseFloat(/[\d.]+/.exec(label!)![0]);
  };

  async function openLamp(page: Page): Promise<void> {
    await chooseFiles(page, [smallBoard()]);
    await page.getByRole('heading', { name: 'Greenhouse lamp' }).waitFor();
    await stage(page).waitFor();
    // Two frames: the picture has been drawn.
    await page.evaluate(() => new Promise((resolve) => requestAnimationFrame(() => requestAnimationFrame(resolve))));
  }

  async function middle(page: Page): Promise<{ x: number; y: number }> {
    const { x, y, width, height } = (await stage(page).boundingBox())!;
    return { x: x + width / 2, y: y + height / 2 };
  }

  it('names what is pointed at, chooses it on a click, and lets go on a click beside it', async () => {
    const { page, complaints } = await served.open();
    await openLamp(page);
    const { x, y } = await middle(page);
    await page.mouse.move(x, y);
    await board(page).getByText('30 mm on TOP').waitFor();
    await board(page).getByText('driven at U1.1 by clock').waitFor();
    await page.mouse.click(x, y);
    const facts = board(page).getByText(/^CLK · 30 mm on TOP/);
    await facts.waitFor();
    await page.screenshot({ path: picture('board-chosen') });
    await page.mouse.click(x, (await stage(page).boundingBox())!.y + 3);
    await facts.waitFor({ state: 'detached' });
    expect(complaints).toEqual([]);
  });

  it('enlarges at the pointer, moves with a drag, fits again, and is found as it was left', async () => {
    const { page } = await served.open();
    await openLamp(page);
    const fitted = await scale(page);
    const { x, y } = await middle(page);
    await page.mouse.move(x, y);
    for (let i = 0; i < 6; i++) await page.mouse.wheel(0, -200);
    await expect.poll(() => scale(page)).toBeLessThan(fitted);
    // What lay under the pointer still does.
    await page.mouse.move(x + 1, y);
    await board(page).getByText('30 mm on TOP').waitFor();
    const near = await scale(page);
    await page.mouse.down();
    await page.mouse.move(x + 40, y + 60, { steps: 4 });
    await page.mouse.up();
    await page.mouse.move(x + 40, y + 60);
    await board(page).getByText('30 mm on TOP').waitFor();
    await page.waitForTimeout(1000);
    await page.reload();
    await page.getByRole('button', { name: 'Greenhouse lamp', exact: true }).first().click();
    await stage(page).waitFor();
    await expect.poll(() => scale(page)).toBe(near);
    await page.keyboard.press('f');
    await expect.poll(() => scale(page)).toBe(fitted);
  });

  it('can be worked by the keyboard: search, list of nets, arrows', async () => {
    const { page } = await served.open();
    await openLamp(page);
    await page.keyboard.press('Control+f');
    await page.keyboard.type('cl');
    await board(page).getByText('1 net', { exact: true }).waitFor();
    await page.keyboard.press('Enter');
    await board(page)
      .getByText(/^CLK · /)
      .waitFor();
    await page.keyboard.press('Escape');
    await page.keyboard.press('Escape');
    await board(page).getByRole('button', { name: 'Nets', exact: true }).click();
    const list = board(page).getByRole('listbox', { name: 'Nets' });
    await list.focus();
    await page.keyboard.press('Home');
    await expect.poll(() => list.getByRole('option', { selected: true }).count()).toBe(1);
    await stage(page).focus();
    const before = await scale(page);
    for (let i = 0; i < 4; i++) await page.keyboard.press('+');
    await expect.poll(() => scale(page)).toBeLessThan(before);
    const outline = await stage(page).evaluate((element) => getComputedStyle(element).outlineStyle);
    expect(outline).toBe('solid');
  });

  it.each(['light', 'dark'] as const)('has no violation with its lists open, and stands 320 px: %s', async (theme) => {
    const { page } = await served.open({ colorScheme: theme });
    await openLamp(page);
    for (const list of ['Layers', 'Nets', 'Findings']) {
      await board(page).getByRole('button', { name: list, exact: true }).click();
      expect(await violations(page), list).toEqual([]);
    }
    await page.screenshot({ path: picture(`board-${theme}`) });
    await page.setViewportSize({ width: 320, height: 640 });
    const overflow = await board(page).evaluate((element) => element.scrollWidth - element.clientWidth);
    expect(overflow).toBeLessThanOrEqual(0);
    await page.screenshot({ path: picture(`board-narrow-${theme}`) });
  });
});
