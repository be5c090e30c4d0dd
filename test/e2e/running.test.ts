import type { Page } from 'playwright-core';
import { afterAll, beforeAll, expect, it } from 'vitest';
import { chooseFiles, describeInBrowser, ServedWindow } from './served-window.ts';
import { smallBoard } from './small-board.ts';
import { choose, estimate, select, showTab, showView, status, type } from './steps.ts';

/** Runs: stopped, shown in every window, there again after a power cut; steps undone. Oracle: what the interface's brief promises. */

const runRows = (page: Page) => page.getByRole('table', { name: 'Runs, newest first' }).getByRole('row');
/** Rows of runs and the head. */
const HEAD_ROWS = 1;

describeInBrowser('runs and steps', () => {
  let served: ServedWindow;

  beforeAll(async () => {
    served = await ServedWindow.start();
  });

  afterAll(async () => {
    await served?.close();
  });

  const saved = (page: Page) => status(page).getByText('Saved', { exact: true }).waitFor();

  async function openSmallBoard(page: Page): Promise<void> {
    await chooseFiles(page, [smallBoard()]);
    await page.getByRole('heading', { name: 'Greenhouse lamp', exact: true }).waitFor();
    await showTab(page, 'Set-up');
    await choose(page, 'Planes and cables', 'Left out');
    await saved(page);
  }

  it('are stopped at once, and nothing is kept', async () => {
    const { page, complaints } = await served.open();
    await page.getByRole('button', { name: 'Open the sample project' }).click();
    await status(page).getByText('Not estimated yet').waitFor();
    await page.getByRole('button', { name: /^Estimate/ }).click();
    await page.getByRole('progressbar').waitFor();
    // Into the work: something is done, and more is left.
    await expect
      .poll(async () => Number(await page.getByRole('progressbar').getAttribute('aria-valuenow')), { timeout: 60_000 })
      .toBeGreaterThan(0);
    const stoppedAt = performance.now();
    await page.getByRole('button', { name: /^Stop/ }).click();
    await page.getByRole('progressbar').waitFor({ state: 'detached' });
    // Promised is one second; the machine of the tests may be busy with other tests.
    expect(performance.now() - stoppedAt).toBeLessThan(5000);
    await status(page).getByText('Not estimated yet').waitFor();
    await showView(page, 'Ledger', 'Runs');
    await page.getByText('No runs yet').waitFor();
    await page
      .getByRole('button', { name: /^Estimate/ })
      .and(page.locator(':enabled'))
      .waitFor();
    expect(complaints).toEqual([]);
  });

  it('steps over sources and set-up are undone and redone one by one', async () => {
    const { page, complaints } = await served.open();
    await openSmallBoard(page);
    await choose(page, 'Antenna distance', '10 m');
    await type(page, 'Required margin', '6 dB');
    await showView(page, 'Sources', 'Waveforms');
    await type(page, 'Rise 10–90 %', '3n3');
    const rise = page.getByRole('textbox', { name: 'Rise 10–90 %' });
    await expect.poll(() => rise.inputValue()).toBe('3.3 ns');
    await rise.blur();

    const undone: string[] = [];
    const undo = page.getByRole('button', { name: /^Undo: / });
    for (let i = 0; i < 4; i++) {
      undone.push((await undo.getAttribute('aria-label'))!);
      await page.keyboard.press('Control+z');
      await page.getByRole('button', { name: undone.at(-1)!.replace('Undo', 'Redo'), exact: true }).waitFor();
    }
    expect(undone).toEqual([
      'Undo: Rise time of clock',
      'Undo: Required margin',
      'Undo: Antenna distance',
      'Undo: Planes and cables',
    ]);
    await expect.poll(() => rise.inputValue()).toBe('1 ns');
    await showTab(page, 'Set-up');
    expect(await select(page, 'Antenna distance').textContent()).toBe('3 m');
    expect(await select(page, 'Planes and cables').textContent()).toBe('Solved');
    for (let i = 0; i < 4; i++) await page.keyboard.press('Control+y');
    await expect.poll(() => select(page, 'Antenna distance').textContent()).toBe('10 m');
    expect(await page.getByRole('textbox', { name: 'Required margin' }).inputValue()).toBe('6 dB');
    await showView(page, 'Sources', 'Waveforms');
    expect(await rise.inputValue()).toBe('3.3 ns');
    expect(complaints).toEqual([]);
  });

  it('appear in the other window’s ledger, and are there with the draft after the program was killed', async () => {
    const { page: one } = await served.open();
    await one.getByRole('button', { name: 'Menu' }).waitFor();
    await openSmallBoard(one);
    const { page: two } = await served.open();
    await two.getByRole('button', { name: 'Greenhouse lamp', exact: true }).first().click();
    await saved(two);
    await showView(two, 'Ledger', 'Runs');
    await two.getByText('No runs yet').waitFor();
    await estimate(one);
    await expect.poll(() => runRows(two).count(), { timeout: 20_000 }).toBe(HEAD_ROWS + 1);
    await showView(one, 'Ledger', 'Runs');
    await type(one, 'Note to run 1', 'before the resistor');
    const noteOfTwo = two.getByRole('textbox', { name: 'Note to run 1' });
    await expect.poll(() => noteOfTwo.inputValue(), { timeout: 20_000 }).toBe('before the resistor');
    await showView(one, 'Sources', 'Nets');
    await one.getByRole('button', { name: 'CLK', exact: true }).click();
    await type(one, 'Series resistor', '4k7');
    await saved(one);

    await served.kill();
    served = await ServedWindow.start(served.home);
    const { page: again, complaints } = await served.open();
    await again.getByRole('button', { name: 'Greenhouse lamp', exact: true }).first().click();
    await status(again).getByText('Out of date').waitFor();
    await showView(again, 'Ledger', 'Runs');
    expect(await runRows(again).count()).toBe(HEAD_ROWS + 1);
    expect(await again.getByRole('textbox', { name: 'Note to run 1' }).inputValue()).toBe('before the resistor');
    await showView(again, 'Sources', 'Nets');
    await again.getByRole('button', { name: 'CLK', exact: true }).click();
    expect(await again.getByRole('textbox', { name: 'Series resistor' }).inputValue()).toBe('4.7 kΩ');
    expect(complaints).toEqual([]);
  });
});
