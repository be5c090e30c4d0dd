import type { Page } from 'playwright-core';
import { afterAll, beforeAll, expect, it } from 'vitest';
import { chooseFiles, describeInBrowser, picture, ServedWindow } from './served-window.ts';
import { jsonFile, otherSources, smallBoard } from './small-board.ts';

/** The window's frame from outside. Oracle: what the interface's brief promises a user, written out. */

describeInBrowser('the window', () => {
  let served: ServedWindow;

  beforeAll(async () => {
    served = await ServedWindow.start();
  });

  afterAll(async () => {
    await served?.close();
  });

  const status = (page: Page) => page.getByRole('contentinfo');

  async function openSmallBoard(page: Page): Promise<void> {
    await chooseFiles(page, [smallBoard()]);
    await page.getByRole('button', { name: /^Estimate/ }).waitFor();
  }

  it('leads from the first start to the sample’s estimate, and steps through its lines', async () => {
    const { page, complaints } = await served.open();
    await page.screenshot({ path: picture('start') });
    expect(new URL(page.url()).hash).toBe('');
    await page.getByRole('button', { name: 'Open the sample project' }).click();
    await status(page).getByText('Not estimated yet').waitFor();
    await page.getByRole('button', { name: /^Estimate/ }).click();
    await page.getByRole('progressbar').waitFor();
    await status(page).getByText('CISPR 32 class B at 3 m').waitFor({ timeout: 280_000 });
    await page.screenshot({ path: picture('sample-estimated') });

    const line = status(page).getByText(/dBµV\/m, .* dB (under|over)/);
    const worst = await line.textContent();
    expect(worst).toMatch(/^\d.*Hz: /);
    await page.keyboard.press('ArrowRight');
    await expect.poll(() => line.textContent()).not.toBe(worst);
    await page.keyboard.press('ArrowLeft');
    await expect.poll(() => line.textContent()).toBe(worst);
    await page.keyboard.press('Escape');
    await line.waitFor({ state: 'detached' });
    await page.keyboard.press('Alt+w');
    await expect.poll(() => line.textContent()).toBe(worst);
    expect(complaints).toEqual([]);
    // Ten seconds of work on a machine that has nothing else to do.
  }, 300_000);

  it('keeps project, document and result when it is loaded again', async () => {
    const { page } = await served.open();
    await page.getByRole('button', { name: 'Orchard valve controller', exact: true }).click();
    await status(page).getByText('CISPR 32 class B at 3 m').waitFor();
    await expect.poll(() => status(page).getByText('Out of date').count()).toBe(0);
  });

  it('undoes and redoes an added sources file, by keys and by buttons that say what', async () => {
    const { page, complaints } = await served.open();
    await openSmallBoard(page);
    const undo = page.getByRole('button', { name: /^Undo/ });
    const redo = page.getByRole('button', { name: /^Redo/ });
    expect(await undo.isDisabled()).toBe(true);
    await chooseFiles(page, [otherSources()]);
    await page.getByRole('button', { name: 'Undo: Open slower.sources.json' }).waitFor();
    await status(page).getByText('Saved', { exact: true }).waitFor();
    await page.keyboard.press('Control+z');
    await page.getByRole('button', { name: 'Redo: Open slower.sources.json' }).waitFor();
    expect(await undo.isDisabled()).toBe(true);
    await page.keyboard.press('Control+y');
    await expect.poll(() => redo.isDisabled()).toBe(true);
    await undo.click();
    await expect.poll(() => undo.isDisabled()).toBe(true);
    expect(complaints).toEqual([]);
  });

  it('marks a result that is out of date, until it is estimated again', async () => {
    const { page } = await served.open();
    await openSmallBoard(page);
    await page.keyboard.press('Control+Enter');
    await status(page).getByText('CISPR 32 class B at 3 m').waitFor({ timeout: 60_000 });
    await chooseFiles(page, [otherSources()]);
    await status(page).getByText('Out of date').waitFor();
    await page.getByRole('button', { name: 'Estimate again' }).click();
    await status(page).getByText('Out of date').waitFor({ state: 'detached', timeout: 60_000 });
    await status(page).getByText('CISPR 32 class B at 3 m').waitFor({ timeout: 60_000 });
  });

  it('says in words what is wrong with a file, and stays as it was', async () => {
    const { page } = await served.open();
    await openSmallBoard(page);
    await chooseFiles(page, [jsonFile('broken.board.json', '{ "format": "quietboard-board", ')]);
    const notice = page.getByRole('alertdialog');
    await notice.getByText(/broken\.board\.json/).waitFor();
    expect(await notice.textContent()).not.toMatch(/Error:|undefined|at .*\.js/);
    expect(await page.getByRole('banner').getByText('rev A').count()).toBe(1);
    await notice.getByRole('button', { name: 'Close notice' }).click();
    await notice.waitFor({ state: 'detached' });
  });

  it('says what a dropped file will do before it is dropped, and opens it', async () => {
    const { page } = await served.open();
    const { name, buffer } = smallBoard();
    const carried = await page.evaluateHandle(
      ([fileName, text]) => {
        const transfer = new DataTransfer();
        transfer.items.add(new File([text!], fileName!));
        return transfer;
      },
      [name, buffer.toString()],
    );
    const main = page.getByRole('main');
    await main.dispatchEvent('dragenter', { dataTransfer: carried });
    await page.getByText('is opened in a new project').waitFor();
    await page.screenshot({ path: picture('drop') });
    await main.dispatchEvent('drop', { dataTransfer: carried });
    await page.getByRole('heading', { name: 'Greenhouse lamp', exact: true }).waitFor();
    expect(await page.getByText('is opened in a new project').count()).toBe(0);
  });

  it('remembers the theme, and follows the system until one is chosen', async () => {
    const { page } = await served.open({ colorScheme: 'dark' });
    const paper = () => page.evaluate(() => getComputedStyle(document.body).backgroundColor);
    const dark = await paper();
    await page.getByRole('button', { name: 'Theme: light' }).click();
    await expect.poll(paper).toBe('rgb(255, 255, 255)');
    await page.waitForTimeout(600);
    await page.reload();
    await page.getByRole('main').waitFor();
    await expect.poll(paper).toBe('rgb(255, 255, 255)');
    await page.keyboard.press('Control+k');
    await page.keyboard.type('theme system');
    await page.keyboard.press('Enter');
    await expect.poll(paper).toBe(dark);
    await page.waitForTimeout(600);
  });

  it('can be worked by the keyboard alone', async () => {
    const { page } = await served.open();
    const focused = () =>
      page.evaluate(() => document.activeElement?.textContent || document.activeElement?.getAttribute('aria-label'));
    for (let i = 0; i < 12 && (await focused()) !== 'Open the sample project'; i++) await page.keyboard.press('Tab');
    expect(await focused()).toBe('Open the sample project');
    const outline = await page.evaluate(() => getComputedStyle(document.activeElement!).outlineStyle);
    expect(outline).toBe('solid');
    await page.keyboard.press('Enter');
    await page.getByRole('button', { name: /^Estimate/ }).waitFor();

    await page.keyboard.press('?');
    await page.keyboard.type('keys');
    await page.keyboard.press('Enter');
    await page.getByRole('dialog').getByText('Ctrl+Enter').waitFor();
    await page.screenshot({ path: picture('keys') });
    await page.keyboard.press('Escape');
    await page.getByRole('dialog').waitFor({ state: 'detached' });
  });

  it('writes numbers as the reader’s locale does', async () => {
    const { page } = await served.open({ locale: 'de-DE' });
    await openSmallBoard(page);
    await page.keyboard.press('Control+Enter');
    await status(page)
      .getByText(/\d,\d dB/)
      .first()
      .waitFor({ timeout: 60_000 });
    expect(
      await status(page)
        .getByText(/\d\.\d dB/)
        .count(),
    ).toBe(0);
  });
});
