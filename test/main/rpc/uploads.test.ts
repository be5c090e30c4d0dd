import { existsSync, readFileSync } from 'node:fs';
import { afterEach, expect, test } from 'vitest';
import { Uploads } from '../../../main/rpc/uploads.ts';

const uploads = new Uploads();
afterEach(() => uploads.removeAll());
const bytes = (size: number) => new Uint8Array(size).fill(7);

test('a file is there while it is used and gone afterwards, used well or not', async () => {
  const id = await uploads.add('a.csv', bytes(5));
  const path = await uploads.take([id], async ([file]) => {
    expect(readFileSync(file!.path)).toEqual(Buffer.from(bytes(5)));
    return file!.path;
  });
  expect(existsSync(path)).toBe(false);
  const other = await uploads.add('b.csv', bytes(5));
  let otherPath = '';
  const use = uploads.take([other], async ([file]) => {
    otherPath = file!.path;
    throw new Error('not liked');
  });
  await expect(use).rejects.toThrow('not liked');
  expect(otherPath).not.toBe('');
  expect(existsSync(otherPath)).toBe(false);
});

test('what was used or never came is refused', async () => {
  const id = await uploads.add('a.csv', bytes(1));
  await uploads.take([id], async () => undefined);
  await expect(uploads.take([id], async () => undefined)).rejects.toMatchObject({
    code: 'input',
    path: 'uploadIds[0]',
  });
});

test.each([
  ['../../etc/passwd', 'passwd'],
  ['C:\\boards\\valve.xml', 'valve.xml'],
  ['a\u0000b\u001b[31m.csv', 'ab[31m.csv'],
  ['', 'unnamed file'],
  ['..', '..'],
])('the name %j is shown as %j and is no part of the path', async (given, shown) => {
  const id = await uploads.add(given, bytes(1));
  await uploads.take([id], async ([file]) => {
    expect(file!.name).toBe(shown);
    expect(file!.path.endsWith(id)).toBe(true);
  });
});

test('a file over 256 MB is refused in words', async () => {
  const large = { length: 256e6 + 1 } as Uint8Array;
  await expect(uploads.add('large.xml', large)).rejects.toMatchObject({
    code: 'file',
    message: 'large.xml: must be at most 256 MB; received 256 MB',
  });
});

test('files nobody takes give way, oldest first: 600 MB and 100 files at most', async () => {
  const first = await uploads.add('first', bytes(1));
  const second = await uploads.add('second', bytes(1));
  for (let i = 0; i < 99; i++) await uploads.add(`f${i}`, bytes(1));
  await expect(uploads.take([first], async () => undefined)).rejects.toMatchObject({ code: 'input' });
  expect(await uploads.take([second], async () => 'kept')).toBe('kept');
});
