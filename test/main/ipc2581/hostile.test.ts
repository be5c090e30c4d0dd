import { describe, expect, it } from 'vitest';
import {
  findingCount,
  HEADER,
  importError,
  importParts,
  importText,
  ipcFile,
  LAYERS,
  line,
  onLayer,
  PROFILE,
  WIDTH,
} from './fixture.ts';

const stroke = (attributes: string): string =>
  ipcFile({ step: onLayer('TOP', `<Set net="A">\n<Features><Line ${attributes}>${WIDTH}</Line></Features></Set>`) });

describe('broken files', () => {
  const whole = ipcFile();

  it('are never imported by halves, wherever they break off', async () => {
    const start = whole.indexOf('<IPC-2581');
    for (let at = start + 10; at < whole.length - 1; at += 97) {
      const error = await importError(whole.slice(0, at));
      expect(error.code).toBe('file');
      expect(error.message).toMatch(/invented\.xml: line \d+: is not well-formed XML/);
    }
  });

  it.each([
    ['tags that do not match', whole.replace('</CadData>', '</CadDate>'), 'not well-formed'],
    ['text behind the root', `${whole}<more/>`, 'not well-formed'],
    ['an attribute twice', whole.replace('<Set net="SIG"', '<Set net="SIG" net="B"'), 'duplicate attribute'],
    ['an unknown entity', whole.replace('net="SIG"', 'net="&boom;"'), 'undefined entity'],
    ['a forbidden character', whole.replace('net="SIG"', 'net="&#0;"'), 'not well-formed'],
    [
      'a document type',
      whole.replace('<IPC-2581', '<!DOCTYPE IPC-2581 SYSTEM "file:///etc/passwd">\n<IPC-2581'),
      'DOCTYPE',
    ],
    [
      'an entity bomb',
      whole
        .replace('<IPC-2581', '<!DOCTYPE IPC-2581 [<!ENTITY a "ha"><!ENTITY b "&a;&a;&a;&a;">]>\n<IPC-2581')
        .replace('net="SIG"', 'net="&b;"'),
      'DOCTYPE',
    ],
    ['another root behind the head', whole.replaceAll('IPC-2581', 'x:IPC-2581-X'), 'another kind (IPC-2581-X)'],
  ])('%s are refused', async (_name, text, words) => {
    const error = await importError(text);
    expect(error.code).toBe('file');
    expect(error.message).toContain(words);
  });

  it('name file and line', async () => {
    const lines = whole.split('\n');
    const at = lines.findIndex((text) => text.includes('<StackupLayer layerOrGroupRef="CORE"'));
    const error = await importError(whole.replace('thickness="1.53"', 'thickness="thin"'));
    expect(error.message).toContain(
      `invented.xml: line ${at + 1}: StackupLayer thickness must be a finite number; received "thin"`,
    );
  });

  it('nested without end are refused', async () => {
    const deep = `${'<UserSpecial>'.repeat(200)}${'</UserSpecial>'.repeat(200)}`;
    const error = await importError(
      ipcFile({ step: onLayer('TOP', `<Set net="A"><Features>${deep}</Features></Set>`) }),
    );
    expect(error.message).toContain('nested deeper than 64');
    const skipped = await importError(whole.replace('<CadData>', `<CadData>${'<X>'.repeat(200)}${'</X>'.repeat(200)}`));
    expect(skipped.message).toContain('nested deeper than 64');
  });

  it('with an attribute or comment of many megabytes are refused', async () => {
    const long = 'x'.repeat(5 * 1024 * 1024);
    expect((await importError(whole.replace('net="SIG"', `net="${long}"`))).message).toContain('no element in');
    expect((await importError(whole.replace('<CadData>', `<CadData><!--${long}-->`))).message).toContain(
      'no element in',
    );
  });

  it('whose references multiply are refused', async () => {
    const entry = (id: number): string =>
      `<EntryUser id="U${id}"><UserSpecial>${`<UserPrimitiveRef id="U${id + 1}"/>`.repeat(12)}</UserSpecial></EntryUser>`;
    const content = `<DictionaryUser units="INCH">${Array.from({ length: 12 }, (_, i) => entry(i)).join('')}
      <EntryUser id="U12"><Circle diameter="1"/></EntryUser></DictionaryUser>`;
    const step = onLayer('TOP', '<Set net="A"><Features><UserPrimitiveRef id="U0"/></Features></Set>');
    expect((await importError(ipcFile({ content, step }))).message).toContain('by reference');
  });

  it('whose references go round in circles lose only those', async () => {
    const content = `<DictionaryUser units="INCH"><EntryUser id="A"><UserPrimitiveRef id="B"/></EntryUser>
      <EntryUser id="B"><UserPrimitiveRef id="A"/></EntryUser></DictionaryUser>`;
    const step = onLayer(
      'TOP',
      `${line('A', '1,1 9,1')}<Set net="A"><Features><UserPrimitiveRef id="A"/></Features></Set>`,
    );
    const imported = await importParts({ content, step });
    expect(findingCount(imported, 'unresolved-references')).toBe(1);
    expect(imported.summary.segments).toBe(1);
  });

  it('whose arcs hold too many points are refused', async () => {
    const arc = `<Set net="A"><Features><Arc startX="2000" startY="0" endX="2000" endY="0" centerX="0" centerY="0">${WIDTH}</Arc></Features></Set>`;
    expect((await importError(ipcFile({ step: onLayer('TOP', arc.repeat(2000)) }))).message).toContain('points');
  });
});

describe('numbers that are none', () => {
  it.each(['NaN', 'Infinity', '-INF', '1e999', '', ' ', '0x10', '1,5', '1 2', '1e7777', '12mm', '.', '20000000'])(
    'are refused with element and attribute: %j',
    async (text) => {
      const error = await importError(stroke(`startX="1" startY="${text}" endX="3" endY="4"`));
      expect(error.message).toMatch(/invented\.xml: line \d+: Line startY must/);
      expect(error.message).toContain(JSON.stringify(text));
    },
  );

  it.each([['1.5'], ['-1.5'], ['+1.5'], [' 1.5 '], ['.5'], ['1.'], ['1E-3'], ['1.5e+1']])(
    'are not refused when they are some: %j',
    async (text) => {
      const imported = await importText(stroke(`startX="1" startY="${text}" endX="3" endY="40"`));
      expect(imported.board.nets[0]!.traces![0]!.pointsMm[0]![1]).toBe(Number(text));
    },
  );

  it('are told when they are missing', async () => {
    const error = await importError(stroke('startX="1" startY="2" endX="3"'));
    expect(error.message).toContain('Line endY must be a number; it is missing');
  });

  it('may stand on layers that are not read', async () => {
    const layers = `${LAYERS}<Layer name="SILK" layerFunction="SILKSCREEN"/>`;
    const silk = onLayer('SILK', '<Set><Features><Line startX="NaN"/></Features></Set>');
    expect((await importParts({ layers, step: silk + onLayer('TOP', line('A', '1,1 9,1')) })).summary.segments).toBe(1);
  });

  it('in the profile, in holes and in widths are refused', async () => {
    expect((await importError(ipcFile({ profile: PROFILE.replace('x="80"', 'x="NaN"') }))).message).toContain(
      'PolyStepSegment x',
    );
    const hole = '<Set net="A"><Hole name="H" diameter="-0.3" platingStatus="VIA" x="1" y="1"/></Set>';
    expect((await importError(ipcFile({ step: onLayer('DRILL', hole) }))).message).toContain(
      'Hole diameter must not be negative',
    );
    const wide = onLayer('TOP', line('A', '1,1 9,1', '<LineDesc lineWidth="wide"/>'));
    expect((await importError(ipcFile({ step: wide }))).message).toContain('LineDesc lineWidth');
  });
});

describe('units', () => {
  const sizes = (units: string, size: string) =>
    importParts({
      header: HEADER.replace('MILLIMETER', units),
      profile: PROFILE.replaceAll('"80"', `"${size}"`).replaceAll('"50"', `"${size}"`),
      step: onLayer('TOP', line('A', `0,0 ${size},0`, `<LineDesc lineWidth="${size}"/>`)),
    });

  it.each([
    ['MILLIMETER', '3', 3],
    ['INCH', '3', 76.2],
    ['MICRON', '3000', 3],
    ['micron', '3000', 3],
  ])('%s', async (units, size, expectedMm) => {
    const { board, summary } = await sizes(units, size);
    expect(summary.boardMm).toEqual([expectedMm, expectedMm]);
    expect(summary.traceLengthMm).toBeCloseTo(expectedMm, 9);
    expect(summary.source.units).toBe(units.toUpperCase());
    expect(board.nets[0]!.traces![0]!.widthMm).toBe(expectedMm);
  });

  it('that are unknown, missing or too late are refused', async () => {
    expect((await importError(ipcFile({ header: '<CadHeader units="MIL"/>' }))).message).toContain(
      'CadHeader units must be MILLIMETER, INCH or MICRON; received "MIL"',
    );
    expect((await importError(ipcFile({ header: '<CadHeader/>' }))).message).toContain('received nothing');
    expect((await importError(ipcFile({ header: '' }))).message).toContain(
      'CadHeader with its units must come before CadData',
    );
    const dictionary = '<DictionaryLineDesc units="FOOT"><EntryLineDesc id="A"/></DictionaryLineDesc>';
    expect((await importError(ipcFile({ content: dictionary }))).message).toContain('DictionaryLineDesc units must be');
  });
});

describe('files without copper', () => {
  it.each([
    ['nothing in the step', ''],
    ['only document layers', onLayer('DRILL', '')],
    ['empty copper layers', onLayer('TOP', '') + onLayer('BOT', '<Set/>')],
  ])('are refused with the mode they were exported in: %s', async (_name, step) => {
    const error = await importError(ipcFile({ step }));
    expect(error.message).toContain('holds no copper (exported as USERDEF): export the board with all copper layers');
  });

  it('are refused when there is no step or no Ecad', async () => {
    expect((await importError(ipcFile({ steps: '' }))).message).toContain('holds no copper');
    expect((await importError('<IPC-2581 revision="C"><Content/></IPC-2581>')).message).toContain('holds no copper');
  });

  it('without nets are imported with a word', async () => {
    const imported = await importParts({ step: onLayer('TOP', line('No Net', '1,1 9,1')) });
    expect(findingCount(imported, 'no-nets')).toBe(1);
    expect(imported.board.nets).toEqual([]);
  });
});
