import fc from 'fast-check';
import { expect, it } from 'vitest';
import { AppError } from '../../../app/errors.ts';
import { contour, importText, ipcFile, LAYERS, line, onLayer } from './fixture.ts';

/** One of everything that is read, so that a change anywhere meets code. */
const text = ipcFile({
  content: `<DictionaryLineDesc units="INCH"><EntryLineDesc id="W"><LineDesc lineEnd="ROUND" lineWidth="0.008"/></EntryLineDesc></DictionaryLineDesc>
    <DictionaryStandard units="MILLIMETER"><EntryStandard id="R"><RectRound width="2" height="1" radius="0.3"/></EntryStandard></DictionaryStandard>
    <DictionaryUser units="MILLIMETER"><EntryUser id="U"><UserSpecial><StandardPrimitiveRef id="R"/></UserSpecial></EntryUser></DictionaryUser>`,
  layers: `${LAYERS}<Layer name="NEG" layerFunction="PLANE" side="INTERNAL" polarity="NEGATIVE"/>`,
  step: `<Component refDes="U1" layerRef="BOT"/><LogicalNet name="A"><PinRef componentRef="U1" pin="1"/></LogicalNet>
    <PadStack net="A"><LayerHole name="V" diameter="0.3" platingStatus="VIA" x="5" y="6"><Span fromLayer="TOP" toLayer="BOT"/></LayerHole>
      <LayerPad layerRef="BOT"><Xform rotation="90" mirror="true"/><Location x="5" y="6"/><PinRef componentRef="U1" pin="1"/></LayerPad></PadStack>
    ${onLayer(
      'TOP',
      `${line('A', '1,1 9,1 9,9', '<LineDescRef id="W"/>')}${contour('net="B"', '10,10 40,10 40,30 10,30', ['15,15 20,15 20,20'])}
      <Set polarity="NEGATIVE"><Features><Location x="20" y="20"/><UserPrimitiveRef id="U"/></Features></Set>
      <Set net="A"><Features><Arc startX="5" startY="5" endX="7" endY="7" centerX="5" centerY="7"><LineDesc lineWidth="0.2"/></Arc></Features></Set>`,
    )}
    ${onLayer('NEG', '<Set><Features><Location x="9" y="9"/><Circle diameter="2"/></Features></Set>')}
    ${onLayer('DRILL', '<Set net="A"><Hole name="H" diameter="0.9" platingStatus="PLATED" x="8" y="8"/></Set>')}`,
});

/** Values that break naive readers. */
const NASTY = ['', '0', '-1', '1e9', 'NaN', 'TOP', 'BOT', 'CORE', 'NEG', 'A', 'true', '__proto__', '9'.repeat(500)];
const VALUES = [...text.matchAll(/="([^"]*)"/g)].map((match) => [match.index + 2, match[1]!.length] as const);

it('gives a valid board or a file error for any change of the file', async () => {
  const change = fc.oneof(
    fc.record({
      at: fc.nat(text.length - 1),
      length: fc.nat(60),
      by: fc.constantFrom('', '<', '>', '"', '/', ' ', 'x', '&'),
    }),
    fc
      .tuple(fc.nat(VALUES.length - 1), fc.constantFrom(...NASTY))
      .map(([i, by]) => ({ at: VALUES[i]![0], length: VALUES[i]![1], by })),
  );
  let boards = 0;
  await fc.assert(
    fc.asyncProperty(change, async ({ at, length, by }) => {
      try {
        await importText(text.slice(0, at) + by + text.slice(at + length));
        boards++;
      } catch (error) {
        expect(error).toBeInstanceOf(AppError);
        expect((error as AppError).code).toBe('file');
      }
    }),
    { seed: 2581, numRuns: 400 },
  );
  // Both outcomes must occur, or the changes test nothing.
  expect(boards).toBeGreaterThan(50);
  expect(boards).toBeLessThan(350);
});
