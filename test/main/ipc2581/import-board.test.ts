import { mkdtemp, rm, writeFile } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { gzipSync } from 'node:zlib';
import { describe, expect, it } from 'vitest';
import { importBoard } from '../../../main/files/import-board.ts';
import { importError, importText, ipcFile, line, onLayer } from './fixture.ts';

describe('what is no board', () => {
  it.each([
    ['empty', '', 'is empty'],
    ['blank', '  \n ', 'is not an XML file'],
    ['text', 'G04 hello*\nD10*', 'is not an XML file'],
    ['JSON', '{"format":"quietboard-board"}', 'is not an XML file'],
    ['other XML', '<?xml version="1.0"?><!-- a > b --><svg width="3"/>', 'is an XML file of another kind (svg)'],
    ['a zip', Buffer.from('504b03040a00', 'hex'), 'is compressed'],
    ['gzip', gzipSync(ipcFile()), 'is compressed'],
    ['an unknown encoding', '<?xml version="1.0" encoding="x-klingon"?><IPC-2581/>', 'encoding'],
  ])('%s: says what is accepted', async (_name, text, words) => {
    const error = await importError(text);
    expect(error.code).toBe('file');
    expect(error.message).toContain('invented.xml: ');
    expect(error.message).toContain(words);
    if (words !== 'encoding') expect(error.message).toContain('accepted are IPC-2581 files');
  });

  it('a missing file, a folder', async () => {
    const folder = await mkdtemp(join(tmpdir(), 'quietboard-import-'));
    try {
      const missing = join(folder, 'none.xml');
      await expect(importBoard(missing)).rejects.toMatchObject({ code: 'file', path: missing });
      await expect(importBoard(folder)).rejects.toMatchObject({
        code: 'file',
        message: expect.stringContaining('folder'),
      });
    } finally {
      await rm(folder, { recursive: true });
    }
  });
});

describe('progress', () => {
  it('goes up to the size of the file', async () => {
    const folder = await mkdtemp(join(tmpdir(), 'quietboard-import-'));
    try {
      const file = join(folder, 'long.xml');
      const text = ipcFile({ step: onLayer('TOP', line('A', '1,1 9,1').repeat(4000)) });
      await writeFile(file, text);
      const seen: [number, number][] = [];
      await importBoard(file, { onProgress: (readBytes, totalBytes) => seen.push([readBytes, totalBytes]) });
      expect(seen.length).toBeGreaterThan(2);
      expect(seen.at(-1)).toEqual([text.length, text.length]);
      const reads = seen.map(([readBytes]) => readBytes);
      expect(reads).toEqual(reads.toSorted((p, q) => p - q));
    } finally {
      await rm(folder, { recursive: true });
    }
  });
});

describe('the same board written in other ways', () => {
  const text = ipcFile({ step: onLayer('TOP', line('A&lt;7&gt;', '1,1 9,1')) });
  const plain = importText(text);

  it.each([
    ['with CRLF', text.replaceAll('\n', '\r\n')],
    ['with a byte-order mark', `\uFEFF${text}`],
    ['in UTF-16 LE', Buffer.from(`\uFEFF${text.replace('UTF-8', 'UTF-16')}`, 'utf16le')],
    ['in UTF-16 BE', Buffer.from(`\uFEFF${text.replace('UTF-8', 'UTF-16')}`, 'utf16le').swap16()],
    ['with comments and instructions', text.replaceAll('<Set', '<!-- <Set> --><?x y?><Set')],
    ['without declaration', text.slice(text.indexOf('<IPC'))],
    ['under another name', text],
  ])('%s gives the same', async (_name, other) => {
    expect(await importText(other, 'board.any')).toEqual(await plain);
  });

  it('with prefixed namespaces gives the same', async () => {
    const prefixed = text.replace(/<(\/?)([A-Z])/g, '<$1ipc:$2').replace('xmlns=', 'xmlns:ipc=');
    expect(prefixed).toContain('<ipc:PolyStepSegment');
    expect(await importText(prefixed)).toEqual(await plain);
  });

  it('under any revision, or none, gives the same but for the revision', async () => {
    for (const root of ['<IPC-2581 revision="13.1">', '<IPC-2581>', '<IPC-2581 revision="A">']) {
      const { board, summary } = await importText(text.replace(/<IPC-2581[^>]*>/, root));
      expect(board).toEqual((await plain).board);
      expect(summary.source.revision).toBe(/revision="(.*)"/.exec(root)?.[1] ?? '');
    }
  });

  it('reads other encodings that are declared, and says when bytes do not fit', async () => {
    const named = text.replace('A&lt;7&gt;', 'µP');
    const latin = Buffer.from(named.replace('UTF-8', 'ISO-8859-1'), 'latin1');
    expect((await importText(latin)).board.nets[0]!.name).toBe('µP');
    const { board, summary } = await importText(Buffer.from(named, 'latin1'));
    expect(board.nets[0]!.name).toBe('\uFFFDP');
    expect(summary.findings.map(({ code }) => code)).toContain('damaged-text');
  });
});

describe('names', () => {
  it('are kept as written: escapes, case, signs, and words that are something in JavaScript', async () => {
    const names = [
      'R_ADDR&lt;7&gt;',
      '+3V3',
      '/RD*',
      'a b [c]',
      'CLK',
      'clk',
      '__proto__',
      'constructor',
      'toString',
      '&#x3BC;C',
    ];
    const { board } = await importText(
      ipcFile({ step: onLayer('TOP', names.map((name, i) => line(name, `1,${i} 9,${i}`)).join('')) }),
    );
    expect(board.nets.map(({ name }) => name)).toEqual([
      'R_ADDR<7>',
      '+3V3',
      '/RD*',
      'a b [c]',
      'CLK',
      'clk',
      '__proto__',
      'constructor',
      'toString',
      'μC',
    ]);
    for (const net of board.nets) expect(net.traces).toHaveLength(1);
  });

  it('without end are refused', async () => {
    const error = await importError(ipcFile({ step: onLayer('TOP', line('N'.repeat(401), '1,1 9,1')) }));
    expect(error.message).toMatch(/line \d+: Set net must have at most 400 characters; it has 401/);
  });
});
