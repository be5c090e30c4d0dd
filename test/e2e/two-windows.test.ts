import type { Page } from 'playwright-core';
import { afterAll, beforeAll, expect, it } from 'vitest';
import { chooseFiles, describeInBrowser, ServedWindow } from './served-window.ts';
import { jsonFile, type NamedFile, smallBoard } from './small-board.ts';

/** Two windows on one project. Oracle: nobody's change is lost unasked. */

describeInBrowser('two windows on one project', () => {
  let served: ServedWindow;

  beforeAll(async () => {
    served = await ServedWindow.start();
  });

  afterAll(async () => {
    await served?.close();
  });

  const withLoad = (resistanceOhm: number): NamedFile =>
    jsonFile(`load-${resistanceOhm}.sources.json`, {
      format: 'quietboard-sources',
      version: 1,
      loads: [{ net: 'CLK', resistanceOhm }],
    });

  const saved = (page: Page) => page.getByRole('contentinfo').getByText('Saved', { exact: true });
  const undo = (page: Page, what: string) => page.getByRole('button', { name: `Undo: ${what}` });

  it('shows the other window’s change as a step, and asks when both changed it at once', async () => {
    const { page: one } = await served.open();
    await chooseFiles(one, [smallBoard()]);
    await saved(one).waitFor();
    await one.getByRole('heading', { name: 'Greenhouse lamp', exact: true }).waitFor();
    const { page: two } = await served.open();
    await two.getByRole('button', { name: 'Greenhouse lamp', exact: true }).click();
    await saved(two).waitFor();

    await chooseFiles(one, [withLoad(50)]);
    await undo(two, 'Change by another window').waitFor();

    // Both change it before either can hear of the other.
    await two.context().setOffline(true);
    await chooseFiles(one, [withLoad(100)]);
    await undo(one, 'Open load-100.sources.json').waitFor();
    await saved(one).waitFor();
    await two.context().setOffline(false);
    await two.keyboard.press('Control+z');
    const conflict = two.getByText('Another window changed this project at the same time');
    await conflict.waitFor({ timeout: 20_000 });
    await two.getByRole('button', { name: 'Keep mine' }).click();
    await conflict.waitFor({ state: 'detached' });
    await saved(two).waitFor();
    await undo(one, 'Change by another window').waitFor();
    expect(await one.getByText('Another window changed').count()).toBe(0);
  });

  it('goes on where it was after the program was killed', async () => {
    const { page } = await served.open();
    await chooseFiles(page, [smallBoard()]);
    await saved(page).waitFor();
    await chooseFiles(page, [withLoad(70)]);
    await undo(page, 'Open load-70.sources.json').waitFor();
    await saved(page).waitFor();
    await served.kill();
    served = await ServedWindow.start(served.home);
    const { page: again } = await served.open();
    const project = again.getByRole('button', { name: 'Greenhouse lamp', exact: true });
    await project.first().click();
    await again.getByRole('heading', { name: 'Greenhouse lamp', exact: true }).waitFor();
    await saved(again).waitFor();
  });
});
