import { readFile } from 'node:fs/promises';
import type { Page } from 'playwright-core';
import { afterAll, beforeAll, expect, it } from 'vitest';
import { chooseFiles, describeInBrowser, picture, ServedWindow } from './served-window.ts';
import { boardWith } from './small-board.ts';
import { choose, estimate, showTab, showView, type } from './steps.ts';

/** Script in names from files. Oracle: a name is text: it is read as it stands, makes no element, and nothing runs. */

const IMAGE = '<img src=x onerror="globalThis.ran=1">';
const SCRIPT = '</script><script>globalThis.ran=1</script>';

const board = boardWith({
  name: `Lamp ${SCRIPT}`,
  revision: '<b>A</b>',
  net: IMAGE,
  pin: '<svg onload=globalThis.ran=1>.1',
  waveform: `clock ${SCRIPT}`,
});

describeInBrowser('script in names', () => {
  let served: ServedWindow;

  beforeAll(async () => {
    served = await ServedWindow.start();
  });

  afterAll(async () => {
    await served?.close();
  });

  /** Elements that only such a name could have made. */
  const made = (page: Page) =>
    page.evaluate(() => ({
      elements: document.querySelectorAll('img[src="x"], body script, svg[onload], header b').length,
      ran: (globalThis as { ran?: number }).ran,
    }));

  async function staysText(page: Page, text: string): Promise<void> {
    await page.getByText(text).first().waitFor();
    expect(await made(page)).toEqual({ elements: 0, ran: undefined });
  }

  it('are shown as text in every part, and never run', async () => {
    const { page, complaints } = await served.open();
    await chooseFiles(page, [board]);
    await page.getByRole('banner').getByText(SCRIPT).first().waitFor();
    await showView(page, 'Sources', 'Waveforms');
    await staysText(page, SCRIPT);
    await showView(page, 'Sources', 'Nets');
    await page.getByRole('button', { name: IMAGE, exact: true }).click();
    await staysText(page, IMAGE);
    await showTab(page, 'Set-up');
    await choose(page, 'Planes and cables', 'Left out');
    await estimate(page);
    await showTab(page, 'Shares');
    await page.keyboard.press('Alt+w');
    await page.getByRole('tabpanel', { name: 'Shares' }).getByText(IMAGE).first().waitFor();
    await page.getByRole('button', { name: 'List', exact: true }).click();
    await page.getByRole('cell', { name: IMAGE }).first().waitFor();
    await page.getByRole('button', { name: 'Nets', exact: true }).click();
    await page.getByRole('textbox', { name: /Find a net/ }).fill('onerror');
    await staysText(page, IMAGE);
    await page.screenshot({ path: picture('hostile-names') });
    await page.keyboard.press('Escape');

    await showView(page, 'Sources', 'Nets');
    await type(page, 'Series resistor', '33');
    await estimate(page);
    await showView(page, 'Ledger', 'Comparison');
    await page.getByRole('tabpanel', { name: 'Ledger' }).getByText(IMAGE).first().waitFor();
    await showTab(page, 'Report');
    await page.getByRole('img', { name: /^Page 1 of/ }).waitFor({ timeout: 90_000 });
    await expect.poll(() => page.getByRole('img', { name: /Page \d+ of \d+:.*<img src=x/ }).count()).toBeGreaterThan(0);

    const [download] = await Promise.all([
      page.waitForEvent('download'),
      page.getByRole('button', { name: 'HTML', exact: true }).click(),
    ]);
    const printed = await page.context().newPage();
    await printed.setContent(await readFile(await download.path(), 'utf8'));
    await staysText(printed, IMAGE);
    expect(await made(page)).toEqual({ elements: 0, ran: undefined });
    expect(complaints).toEqual([]);
  });
});
