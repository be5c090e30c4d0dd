import type { Locator, Page } from 'playwright-core';
import type { NamedFile } from './small-board.ts';

/** What a user does in the window, by the words on its controls. */

export const status = (page: Page): Locator => page.getByRole('contentinfo');

const tablist = (page: Page) => page.getByRole('tablist', { name: 'Parts' });

export async function showTab(page: Page, name: string): Promise<void> {
  const tab = tablist(page).getByRole('tab', { name, exact: true });
  await tab.click();
}

export const tabNames = (page: Page): Promise<string[]> => tablist(page).getByRole('tab').allTextContents();

/** A view inside a part: "Waveforms" of the sources, "Comparison" of the ledger. */
export async function showView(page: Page, part: string, name: string): Promise<void> {
  await showTab(page, part);
  await page.getByRole('tablist', { name: part }).getByRole('tab', { name, exact: true }).click();
}

/** The button of a drop-down list; its name is the present choice, then the label. */
export const select = (page: Page, label: string): Locator =>
  page.getByRole('button', { name: new RegExp(`(^|\\s)${label}$`) }).and(page.locator('[aria-haspopup=listbox]'));

export async function choose(page: Page, label: string, option: string): Promise<void> {
  await select(page, label).click();
  await page.getByRole('option', { name: option }).click();
}

/** Types into a field and leaves it. */
export async function type(page: Page, label: string, text: string): Promise<void> {
  const field = page.getByRole('textbox', { name: label, exact: true });
  await field.fill(text);
  await field.press('Enter');
}

/** Drops files onto the window, as from the system's file manager. */
export async function dropFiles(page: Page, files: readonly NamedFile[]): Promise<void> {
  const named = files.map(({ name, buffer }) => [name, buffer.toString()] as const);
  const carried = await page.evaluateHandle((all) => {
    const transfer = new DataTransfer();
    for (const [name, text] of all) transfer.items.add(new File([text], name));
    return transfer;
  }, named);
  await page.getByRole('main').dispatchEvent('dragenter', { dataTransfer: carried });
  await page.getByRole('main').dispatchEvent('drop', { dataTransfer: carried });
}

/** Starts an estimate by its key and waits for its verdict. */
export async function estimate(page: Page): Promise<void> {
  await page.getByRole('button', { name: /^Estimate/ }).click();
  await estimated(page);
}

export async function estimated(page: Page): Promise<void> {
  await page
    .getByRole('button', { name: /^Estimate again/ })
    .and(page.locator(':enabled'))
    .waitFor({ timeout: 90_000 });
  await status(page).getByText('Out of date').waitFor({ state: 'detached' });
}
