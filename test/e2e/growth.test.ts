import type { CDPSession, Page } from 'playwright-core';
import { afterAll, beforeAll, expect, it } from 'vitest';
import { chooseFiles, describeInBrowser, ServedWindow } from './served-window.ts';
import { smallBoard } from './small-board.ts';
import { choose, estimate, showTab, tabNames } from './steps.ts';

/**
 * A long day's use in short. Oracle: what is there after the same round of use once more is the same, whatever the round:
 * elements, listeners and memory may grow while caches fill, not for ever.
 */

interface Sizes {
  readonly elements: number;
  readonly listeners: number;
  readonly heapMb: number;
}

const ROUNDS = 4;
/** In one round. */
const STEPS = 250;
const UNDOS = 25;

describeInBrowser('long use', () => {
  let served: ServedWindow;

  beforeAll(async () => {
    served = await ServedWindow.start();
  });

  afterAll(async () => {
    await served?.close();
  });

  async function sizesOf(session: CDPSession): Promise<Sizes> {
    await session.send('HeapProfiler.collectGarbage');
    const { metrics } = await session.send('Performance.getMetrics');
    const of = (wanted: string) => metrics.find(({ name }) => name === wanted)!.value;
    return { elements: of('Nodes'), listeners: of('JSEventListeners'), heapMb: of('JSHeapUsedSize') / 2 ** 20 };
  }

  /** Keys as they come from a held one: no waiting for the answer to each. */
  const press = (page: Page, key: string, times: number, ctrlKey = false) =>
    page.evaluate(
      async ([pressed, count, ctrl]) => {
        for (let i = 0; i < count; i++) {
          document.body.dispatchEvent(new KeyboardEvent('keydown', { key: pressed, ctrlKey: ctrl, bubbles: true }));
          await new Promise(requestAnimationFrame);
        }
      },
      [key, times, ctrlKey] as const,
    );

  async function round(page: Page, tabs: readonly string[]): Promise<void> {
    for (let i = 0; i < STEPS / 25; i++) {
      await press(page, 'ArrowRight', 12);
      await press(page, 'ArrowLeft', 13);
    }
    await press(page, 'z', UNDOS, true);
    await press(page, 'y', UNDOS, true);
    for (const name of [...tabs, ...tabs]) await showTab(page, name);
    await showTab(page, tabs[0]!);
    await page.keyboard.press('Escape');
    await page.waitForTimeout(500);
  }

  it('does not make the window grow', async () => {
    const { page, complaints } = await served.open();
    await chooseFiles(page, [smallBoard()]);
    await page.getByRole('heading', { name: 'Greenhouse lamp', exact: true }).waitFor();
    await showTab(page, 'Set-up');
    await choose(page, 'Planes and cables', 'Left out');
    await estimate(page);
    const tabs = await tabNames(page);
    const session = await page.context().newCDPSession(page);
    await session.send('Performance.enable');
    // The first round fills the caches.
    await round(page, tabs);
    const sizes: Sizes[] = [await sizesOf(session)];
    for (let i = 1; i < ROUNDS; i++) {
      await round(page, tabs);
      sizes.push(await sizesOf(session));
    }
    console.log(sizes.map((size) => JSON.stringify(size)).join('\n'));
    const [first, last] = [sizes[0]!, sizes.at(-1)!];
    // A leak of one element or listener for each step would show as hundreds; a few toasts and tooltips may be on their way out.
    expect(last.elements).toBeLessThan(first.elements * 1.1 + 300);
    expect(last.listeners).toBeLessThan(first.listeners * 1.1 + 100);
    // Ten kilobytes for each step would be 7 MB; compiled code and results looked at come in between.
    expect(last.heapMb).toBeLessThan(first.heapMb + 5);
    expect(complaints).toEqual([]);
  });
});
