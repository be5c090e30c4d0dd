import { describe, expect, it } from 'vitest';
import { ringAreaMm2 } from '../../../main/files/ipc2581/build/frame.ts';
import { guessPlaneNet } from '../../../main/files/ipc2581/build/plane-net.ts';
import { contour, findingCount, findingMessage, importParts, LAYERS, line, onLayer, PROFILE } from './fixture.ts';

const SQUARE = '10,10 40,10 40,30 10,30 10,10';

describe('planes', () => {
  it('are the filled areas with a net, without the closing point, cutouts kept', async () => {
    const imported = await importParts({
      step: onLayer(
        'BOT',
        contour('net="GND"', SQUARE, ['20,15 25,15 25,20 20,20 20,15', '30,15 31,15 30,15', '30,16 31,17 32,18 33,19']),
      ),
    });
    expect(imported.board.planes).toEqual([
      {
        layer: 'BOT',
        net: 'GND',
        pointsMm: [
          [10, 10],
          [40, 10],
          [40, 30],
          [10, 30],
        ],
        // The other cutouts have no area.
        cutoutsMm: [
          [
            [20, 15],
            [25, 15],
            [25, 20],
            [20, 20],
          ],
        ],
      },
    ]);
    // The sides of a plane are no traces.
    expect(imported.summary).toMatchObject({ nets: 1, netsWithTraces: 0, segments: 0, traceLengthMm: 0 });
  });

  it('are found in UserSpecial, and keep slits that join holes to the outside', async () => {
    const slit = '10,10 40,10 40,20 30,20 30,15 28,15 28,20 30,20 40,20 40,30 10,30 10,10';
    const set = contour('net="GND"', slit)
      .replace('<Contour>', '<UserSpecial><Contour>')
      .replace('</Contour>', '</Contour></UserSpecial>');
    const imported = await importParts({ step: onLayer('TOP', set) });
    const ring = imported.board.planes![0]!.pointsMm!;
    expect(ring).toHaveLength(11);
    expect(ring.filter(([x, y]) => x === 40 && y === 20)).toHaveLength(2);
  });

  it('are no teardrops, thermal reliefs, text, thieving, hollow areas or areas without net', async () => {
    const usages = ['TEARDROP', 'THERMAL_RELIEF', 'TEXT', 'THIEVING'].map((usage) =>
      contour(`net="GND" geometryUsage="${usage}"`, SQUARE),
    );
    const hollow = contour('net="GND"', SQUARE).replace('</Polygon>', '<FillDesc fillProperty="HOLLOW"/></Polygon>');
    const byReference = contour('net="GND"', SQUARE).replace('</Polygon>', '<FillDescRef id="NOFILL"/></Polygon>');
    const imported = await importParts({
      content:
        '<DictionaryFillDesc units="MILLIMETER"><EntryFillDesc id="NOFILL"><FillDesc fillProperty="HOLLOW"/></EntryFillDesc></DictionaryFillDesc>',
      step: onLayer(
        'TOP',
        [...usages, hollow, byReference, contour('', SQUARE), contour('net="No Net"', SQUARE)].join(''),
      ),
    });
    expect(imported.board.planes).toBeUndefined();
    expect(findingCount(imported, 'hollow-areas')).toBe(2);
    expect(findingCount(imported, 'copper-without-net')).toBe(2);
  });

  it('are at least 25 mm² or 2 % of the board, cutouts off', async () => {
    // The board has 4000 mm²: 25 mm² counts.
    const sets = [
      contour('net="YES"', '1,1 6.1,1 6.1,6 1,6'),
      contour('net="NO"', '10,1 14.9,1 14.9,6 10,6'),
      contour('net="HOLED"', '20,1 26,1 26,6 20,6', ['21,2 24,2 24,4.5 21,4.5']),
    ].join('');
    const large = await importParts({ step: onLayer('TOP', sets) });
    expect(large.board.planes!.map(({ net }) => net)).toEqual(['YES']);
    expect(findingCount(large, 'small-areas')).toBe(2);
    // A board of 20 × 10 mm: 4 mm² counts.
    const small = await importParts({
      profile: PROFILE.replaceAll('"80"', '"20"').replaceAll('"50"', '"10"'),
      step: onLayer('TOP', contour('net="A"', '1,1 3,1 3,3.1 1,3.1') + contour('net="B"', '5,1 7,1 7,2.9 5,2.9')),
    });
    expect(small.board.planes!.map(({ net }) => net)).toEqual(['A']);
  });

  it('lose what is drawn negative behind them, not before', async () => {
    const hole = (at: string): string =>
      `<Set polarity="NEGATIVE"><Features><Location x="${at}" y="20"/><Circle diameter="4"/></Features></Set>`;
    const cutLine = `<Set polarity="NEGATIVE"><Features><Line startX="30" startY="12" endX="30" endY="28"><LineDesc lineWidth="0.5"/></Line></Features></Set>`;
    const imported = await importParts({
      step: onLayer('TOP', `${hole('15')}${contour('net="GND"', SQUARE)}${hole('20')}${cutLine}${hole('70')}`),
    });
    const cutouts = imported.board.planes![0]!.cutoutsMm!;
    expect(cutouts).toHaveLength(2);
    expect(findingCount(imported, 'negative-sets')).toBe(2);
    // Circle and round-ended line; chords of 5 µm sagitta take about 1 % off circles this small.
    expect(Math.abs(ringAreaMm2(cutouts[0]!) - Math.PI * 4)).toBeLessThan(0.02 * Math.PI * 4);
    expect(Math.abs(ringAreaMm2(cutouts[1]!) - (16 * 0.5 + Math.PI * 0.0625))).toBeLessThan(0.02);
    expect(cutouts[0]!.every(([x]) => x >= 18 - 1e-6 && x <= 22 + 1e-6)).toBe(true);
    // Void strokes are no traces.
    expect(imported.summary.segments).toBe(0);
  });
});

const NEGATIVE = `<Layer name="L2_GND" layerFunction="PLANE" side="INTERNAL" polarity="NEGATIVE"/>`;
const STACKUP = `<Stackup name="PRIMARY" overallThickness="0"><StackupGroup name="G">${[
  'TOP',
  'CORE',
  'L2_GND',
  'CORE',
  'BOT',
]
  .map((name) => `<StackupLayer layerOrGroupRef="${name}" thickness="0.1"/>`)
  .join('')}</StackupGroup></Stackup>`;
const negative = (sets: string, layer = 'L2_GND', more = '') =>
  importParts({
    layers: LAYERS + NEGATIVE.replace('L2_GND', layer),
    stackup: STACKUP.replace('L2_GND', layer),
    step: `${onLayer('TOP', line('GND', '1,1 9,1') + line('VCC', '1,3 9,3') + line('SIG', '1,5 9,5'))}${onLayer(layer, sets)}${more}`,
  });

describe('negative planes', () => {
  it('cover the whole outline but for what is drawn: contours, circles, pads, lines', async () => {
    const sets = [
      contour('', '10,10 20,10 20,20 10,20 10,10'),
      '<Set><Features><Location x="30" y="20"/><Circle diameter="3"/></Features></Set>',
      '<Set net="SIG"><Pad><Location x="50" y="20"/><StandardPrimitiveRef id="ANTI"/></Pad></Set>',
      '<Set><Features><Polyline><PolyBegin x="60" y="0"/><PolyStepSegment x="60" y="20"/><PolyStepSegment x="80" y="20"/><LineDesc lineWidth="0.2"/></Polyline></Features></Set>',
    ].join('');
    const imported = await importParts({
      content:
        '<DictionaryStandard units="MILLIMETER"><EntryStandard id="ANTI"><RectCenter width="2" height="1"/></EntryStandard></DictionaryStandard>',
      layers: LAYERS + NEGATIVE,
      stackup: STACKUP,
      step: `${onLayer('TOP', line('GND', '1,1 9,1'))}${onLayer('L2_GND', sets)}`,
    });
    expect(imported.board.planes).toHaveLength(1);
    const plane = imported.board.planes![0]!;
    expect(plane).toMatchObject({ layer: 'L2_GND', net: 'GND' });
    expect(plane.pointsMm).toBeUndefined();
    expect(plane.cutoutsMm!.map((ring) => Math.round(ringAreaMm2(ring) * 10) / 10)).toEqual([100, 7, 2, 4, 4]);
    expect(plane.cutoutsMm![2]).toContainEqual([51, 20.5]);
    expect(findingCount(imported, 'negative-plane-net-guessed')).toBe(1);
    expect(imported.summary.segments).toBe(1);
  });

  it('take the net of their thermal reliefs before the name of the layer', async () => {
    const thermal = (net: string): string =>
      `<Set net="${net}" geometryUsage="THERMAL_RELIEF"><Features><Circle diameter="2"/></Features></Set>`;
    const flash = `<Set net="VCC"><Pad><Location x="5" y="5"/><Thermal shape="ROUND" outerDiameter="2" innerDiameter="1.5" spokeStartAngle="45"/></Pad></Set>`;
    const imported = await negative(`${thermal('SIG')}${thermal('VCC')}${flash}`);
    expect(imported.board.planes![0]).toMatchObject({ net: 'VCC' });
    // Spokes bridge a thermal relief: it cuts nothing out.
    expect(imported.board.planes![0]!.cutoutsMm).toBeUndefined();
    expect(findingMessage(imported, 'negative-plane-net-guessed')).toContain('VCC');
  });

  it('say that the net is unknown when nothing tells', async () => {
    const imported = await negative('<Set/>', 'LAYER_2');
    expect(imported.board.planes).toEqual([{ layer: 'LAYER_2', net: 'unknown net (LAYER_2)' }]);
    expect(findingCount(imported, 'negative-plane-net-unknown')).toBe(1);
    expect(findingCount(imported, 'copper-layers-empty')).toBe(1); // BOT, not the whole plane
  });

  it('are not invented when the layer was not exported', async () => {
    const imported = await importParts({
      layers: LAYERS + NEGATIVE,
      stackup: STACKUP,
      step: onLayer('TOP', line('GND', '1,1 9,1')),
    });
    expect(imported.board.planes).toBeUndefined();
    expect(findingMessage(imported, 'copper-layers-empty')).toContain('L2_GND');
  });

  it('are open where the board is', async () => {
    const opening = '30,20 40,20 40,30 30,30';
    const imported = await importParts({
      profile: PROFILE.replace(
        '</Profile>',
        `<Cutout><PolyBegin x="30" y="20"/><PolyStepSegment x="40" y="20"/><PolyStepSegment x="40" y="30"/><PolyStepSegment x="30" y="30"/></Cutout></Profile>`,
      ),
      layers: LAYERS + NEGATIVE,
      stackup: STACKUP,
      step: `${onLayer('TOP', line('GND', '1,1 9,1'))}${onLayer('L2_GND', '')}`,
    });
    expect(imported.board.planes![0]!.cutoutsMm).toEqual([
      opening.split(' ').map((point) => point.split(',').map(Number)),
    ]);
    expect(findingCount(imported, 'board-cutouts')).toBe(1);
  });
});

describe('guessPlaneNet', () => {
  it.each([
    ['GND', ['VCC', 'GND'], 'GND'],
    ['gnd', ['VCC', 'GND'], 'GND'],
    ['L3_VCC_PLANE', ['VCC', 'GND'], 'VCC'],
    ['GND2', ['GND', 'SIG'], 'GND'],
    ['L2-GND2', ['GND', 'GND2'], 'GND2'],
    ['PWR_+3.3V', ['+3.3V', 'PWR'], '+3.3V'],
    ['GROUND', ['SIG', 'AGND'], 'AGND'],
    ['VSS1', ['SIG', 'GND'], 'GND'],
    ['LAYER_2', ['GND', 'L'], undefined],
    ['MIGNDX', ['GND'], undefined],
  ])('layer %s among %j is %s', (layer, nets, expected) => {
    expect(guessPlaneNet(layer, [], nets)).toBe(expected);
  });

  it('prefers the most frequent thermal relief', () => {
    expect(guessPlaneNet('GND', ['A', 'B', 'B'], ['GND', 'A', 'B'])).toBe('B');
  });
});
