import type { Page } from 'playwright-core';
import { afterAll, beforeAll, expect, it } from 'vitest';
import { chooseFiles, describeInBrowser, picture, ServedWindow } from './served-window.ts';
import { jsonFile, type NamedFile, smallBoard } from './small-board.ts';
import { dropFiles, status } from './steps.ts';

/** Files that cannot be used. Oracle: the message names file, place and what to do; what was open stays. */

const textFile = (name: string, text: string): NamedFile => ({
  name,
  mimeType: 'text/plain',
  buffer: Buffer.from(text),
});

const smallContent = JSON.parse(smallBoard().buffer.toString()) as Record<string, unknown>;

const BAD: readonly (readonly [what: string, file: NamedFile, words: RegExp])[] = [
  [
    'an XML that breaks off',
    textFile('half.xml', '<?xml version="1.0"?>\n<IPC-2581 revision="C"><Content>'),
    /half\.xml.*(line|end)/i,
  ],
  ['XML of something else', textFile('letter.xml', '<letter><to>nobody</to></letter>'), /letter\.xml.*IPC-2581/],
  [
    'JSON with a key that does not exist',
    jsonFile('typo.board.json', { ...smallContent, netz: [] }),
    /typo\.board\.json.*netz/,
  ],
  [
    'JSON with a value of the wrong kind',
    jsonFile('wide.board.json', { ...smallContent, outline: 'wide' }),
    /wide\.board\.json.*outline.*must be/i,
  ],
  ['a text that is no board', textFile('notes.txt', 'milk, eggs'), /notes\.txt/],
  ['an empty file', textFile('empty.board.json', ''), /empty\.board\.json/],
];

describeInBrowser('files that cannot be used', () => {
  let served: ServedWindow;

  beforeAll(async () => {
    served = await ServedWindow.start();
  });

  afterAll(async () => {
    await served?.close();
  });

  const closeNotice = async (page: Page) => {
    const notice = page.getByRole('alertdialog');
    await notice.getByRole('button', { name: 'Close notice' }).click();
    await notice.waitFor({ state: 'detached' });
  };

  it('are refused in words, one by one, and what was open stays', async () => {
    const { page, complaints } = await served.open();
    await chooseFiles(page, [smallBoard()]);
    await status(page).getByText('Saved', { exact: true }).waitFor();
    for (const [what, file, words] of BAD) {
      await dropFiles(page, [file]);
      const notice = page.getByRole('alertdialog');
      await notice.waitFor();
      const text = (await notice.textContent())!;
      expect(text, what).toMatch(words);
      expect(text.split(file.name), what).toHaveLength(2);
      expect(text, what).not.toMatch(/Error:|undefined|null|\bat .*\.js|Unexpected/);
      await closeNotice(page);
      expect(await page.getByRole('heading', { name: 'Greenhouse lamp', exact: true }).count(), what).toBe(1);
      expect(await page.getByRole('button', { name: /^Undo$/ }).isDisabled(), what).toBe(true);
    }
    expect(complaints.filter((text) => !/status of 4\d\d/.test(text))).toEqual([]);
  });

  it('leave no project behind when they come first', async () => {
    const { page } = await served.open();
    const before = await page.getByRole('listitem').count();
    await dropFiles(page, [BAD[0]![1]]);
    await page.getByRole('alertdialog').waitFor();
    await page.screenshot({ path: picture('bad-first-file') });
    await closeNotice(page);
    await page.getByRole('heading', { name: 'How loud is your board?' }).waitFor();
    await page.reload();
    await page.getByRole('heading', { name: 'How loud is your board?' }).waitFor();
    expect(await page.getByRole('listitem').count()).toBe(before);
    await chooseFiles(page, [smallBoard()]);
    await page.getByRole('heading', { name: 'Greenhouse lamp', exact: true }).waitFor();
  });

  it('that are too large are refused before they are read', async () => {
    const { page } = await served.open();
    await page.evaluate(() => {
      const transfer = new DataTransfer();
      const file = new File(['{}'], 'huge.board.json');
      // As large as it says: its content must not be asked for.
      Object.defineProperty(file, 'size', { value: 3e9 });
      transfer.items.add(file);
      const event = new DragEvent('drop', { bubbles: true, cancelable: true });
      Object.defineProperty(event, 'dataTransfer', { value: { types: ['Files'], files: [file], items: [file] } });
      document.querySelector('main')!.dispatchEvent(event);
    });
    const notice = page.getByRole('alertdialog');
    await notice.getByText(/huge\.board\.json.*256 MB/).waitFor();
  });
});
