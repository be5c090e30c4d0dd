import { spawn } from 'node:child_process';
import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { chromium } from 'playwright-core';

/**
 * How fast the window is, on the built program and its sample: `node test/e2e/measure.mjs [browser]`. Says milliseconds:
 * start of the program to the first view, open of the page to the first view, a key to the next line's shares on the screen.
 */

const PROGRAM = fileURLToPath(new URL('../../dist/main/cli/quietboard.js', import.meta.url));
const STEPS = 40;

const home = mkdtempSync(join(tmpdir(), 'quietboard-measure-'));
const browser = await chromium.launch({
  executablePath: process.argv[2] ?? '/usr/bin/chromium',
  args: ['--no-sandbox'],
});
const startedAt = performance.now();
const program = spawn(process.execPath, [PROGRAM, 'serve', '--no-open'], {
  env: { ...process.env, QUIETBOARD_HOME: home },
});
const address = await new Promise((resolve, reject) => {
  let said = '';
  program.once('close', () => reject(new Error(said)));
  for (const stream of [program.stdout, program.stderr]) {
    stream.setEncoding('utf8').on('data', (text) => {
      said += text;
      const found = /http:\/\/127\.0\.0\.1:\d+\/#\S+(?=\n)/.exec(said)?.[0];
      if (found !== undefined) resolve(found);
    });
  }
});
try {
  const page = await browser.newPage({ viewport: { width: 1280, height: 720 } });
  const openedAt = performance.now();
  await page.goto(address);
  await page.getByRole('button', { name: 'Open the sample project' }).waitFor();
  print('start to first view', performance.now() - startedAt);
  print('page to first view', performance.now() - openedAt);

  await page.getByRole('button', { name: 'Open the sample project' }).click();
  await page.getByRole('button', { name: /^Estimate/ }).click();
  await page.getByText('CISPR 32 class B at 3 m').waitFor({ timeout: 600_000 });
  await page.keyboard.press('Alt+w');
  await page.getByRole('img', { name: /^Turntable pattern/ }).waitFor({ timeout: 60_000 });
  const steps = await page.evaluate(stepTimes, STEPS);
  steps.sort((one, other) => one - other);
  print('key to shares, median', steps[Math.floor(STEPS / 2)]);
  print('key to shares, worst', steps.at(-1));
} finally {
  program.kill('SIGINT');
  await browser.close();
  rmSync(home, { recursive: true, force: true });
}

/** In the page: from a key to the frame after the one that shows the next line's heading. */
async function stepTimes(count) {
  const heading = () => document.querySelector('[role=tabpanel] h3')?.textContent;
  const frame = () => new Promise(requestAnimationFrame);
  const times = [];
  for (let i = 0; i < count; i++) {
    const before = heading();
    const key = Math.floor(i / 10) % 2 === 0 ? 'ArrowLeft' : 'ArrowRight';
    const pressedAt = performance.now();
    document.body.dispatchEvent(new KeyboardEvent('keydown', { key, bubbles: true }));
    // The end of the range answers with the same line.
    for (let frames = 0; heading() === before && frames < 60; frames++) await frame();
    await frame();
    times.push(performance.now() - pressedAt);
  }
  return times;
}

function print(what, ms) {
  console.log(`${what}: ${ms.toFixed(0)} ms`);
}
