import { readFile } from 'node:fs/promises';
import type { Page } from 'playwright-core';
import { afterAll, beforeAll, expect, it } from 'vitest';
import { contour, ipcFile, line, onLayer, PROFILE } from '../main/ipc2581/fixture.ts';
import { describeInBrowser, picture, ServedWindow } from './served-window.ts';
import type { NamedFile } from './small-board.ts';
import { choose, dropFiles, estimate, select, showTab, showView, status, type } from './steps.ts';

/** From a layout export to the printed report. Oracle: the steps that the start page promises, each by what it shows. */

const pad = (x: number, y: number, component: string): string =>
  `<Pad padstackDefRef="P"><Location x="${x}" y="${y}"/><StandardPrimitiveRef id="R"/><PinRef componentRef="${component}" pin="1"/></Pad>`;

/** Two nets of 60 and 20 mm over a ground plane. */
const step = `<Step name="Orangery vent">${PROFILE}
  ${onLayer('TOP', `${line('CLK_25M', '10,20 70,20')}${line('LED_EN', '10,30 30,30')}<Set net="CLK_25M">${pad(10, 20, 'U1')}${pad(70, 20, 'U2')}</Set>`)}
  ${onLayer('BOT', contour('net="GND" geometryUsage="PLANE"', '0.5,0.5 79.5,0.5 79.5,49.5 0.5,49.5 0.5,0.5'))}</Step>`;

const layout: NamedFile = {
  name: 'vent-3.xml',
  mimeType: 'application/xml',
  buffer: Buffer.from(ipcFile({ steps: step })),
};

describeInBrowser('the whole job', () => {
  let served: ServedWindow;

  beforeAll(async () => {
    served = await ServedWindow.start();
  });

  afterAll(async () => {
    await served?.close();
  });

  async function openLayout(page: Page): Promise<void> {
    await dropFiles(page, [layout]);
    await page.getByText('Read IPC-2581 C').waitFor();
    const notice = page.getByRole('main');
    for (const fact of ['80 × 50 mm', '2 copper layers', '3 nets, 2 with traces', '80 mm of trace'])
      await notice.getByText(fact).waitFor();
    await page.screenshot({ path: picture('job-1-import') });
    await page.getByRole('button', { name: 'Next: say what switches' }).click();
  }

  async function driveClock(page: Page): Promise<void> {
    await page.getByRole('tablist', { name: 'Sources' }).waitFor();
    await showView(page, 'Sources', 'Waveforms');
    await page.getByRole('button', { name: 'Add a clock' }).click();
    await type(page, 'Frequency', '40M');
    await type(page, 'Rise 10–90 %', '0.8 ns');
    await page.getByRole('img', { name: /^Spectrum of clock/ }).waitFor();
    await page.screenshot({ path: picture('job-2-waveform') });
    await showView(page, 'Sources', 'Nets');
    await page.getByRole('button', { name: 'CLK_25M', exact: true }).click();
    await choose(page, 'Drive it with', 'clock');
    await page.getByText('Driver', { exact: true }).waitFor();
    await page.screenshot({ path: picture('job-3-sources') });
  }

  async function chooseTest(page: Page): Promise<void> {
    await showTab(page, 'Set-up');
    await choose(page, 'Standard', 'VCCI-CISPR 32');
    await choose(page, 'Antenna distance', '10 m');
    await choose(page, 'Planes and cables', 'Left out');
    await page.screenshot({ path: picture('job-4-set-up') });
  }

  it('goes from a dropped IPC-2581 file to a saved PDF', async () => {
    const { page, complaints } = await served.open();
    await openLayout(page);
    await driveClock(page);
    await chooseTest(page);
    await estimate(page);

    await showTab(page, 'Shares');
    await page.keyboard.press('Alt+w');
    const shares = page.getByRole('tabpanel', { name: 'Shares' });
    await shares.getByRole('heading', { name: 'Shares, dBµV/m' }).waitFor();
    await shares.getByRole('button', { name: 'CLK_25M' }).waitFor();
    await shares.getByRole('img', { name: /^Turntable pattern: maximum/ }).waitFor({ timeout: 30_000 });
    await shares.getByRole('img', { name: /^Height pattern: maximum/ }).waitFor();
    await page.getByRole('img', { name: /^Range 30 MHz to .* chosen:/ }).waitFor();
    await page.screenshot({ path: picture('job-5-shares') });

    await showTab(page, 'Report');
    await page.getByRole('img', { name: /^Page 1/ }).waitFor({ timeout: 90_000 });
    await page.screenshot({ path: picture('job-6-report') });
    const [download] = await Promise.all([
      page.waitForEvent('download'),
      page.getByRole('button', { name: 'Save PDF' }).click(),
    ]);
    expect(download.suggestedFilename()).toMatch(/^Orangery vent.*\.pdf$/);
    const bytes = await readFile(await download.path());
    expect(bytes.subarray(0, 5).toString()).toBe('%PDF-');
    expect(bytes.subarray(-7).toString()).toContain('%%EOF');
    expect(await status(page).getByText('VCCI-CISPR 32 class B at 10 m').count()).toBeGreaterThan(0);
    expect(await select(page, 'About').count()).toBe(1);
    expect(complaints).toEqual([]);
  });
});
