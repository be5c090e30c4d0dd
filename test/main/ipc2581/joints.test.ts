import { describe, expect, it } from 'vitest';
import { findingCount, importParts, LAYERS, line, netOf, onLayer, polygon } from './fixture.ts';

const TRACES = onLayer('TOP', line('A', '1,1 9,1') + line('B', '1,3 9,3'));
const hole = (x: number, y: number, diameter: string, plating = 'VIA'): string =>
  `<Hole name="H" diameter="${diameter}" platingStatus="${plating}" plusTol="0" minusTol="0" x="${x}" y="${y}"/>`;
const holeSet = (net: string, holes: string): string => `<Set net="${net}">${holes}</Set>`;
const FOUR = `${['TOP', 'IN1', 'IN2', 'BOT'].map((name) => `<Layer name="${name}" layerFunction="SIGNAL" side="INTERNAL"/>`).join('')}
  <Layer name="CORE" layerFunction="DIELCORE"/>`;
const FOUR_STACKUP = `<Stackup name="P" overallThickness="0"><StackupGroup name="G">${[
  'TOP',
  'CORE',
  'IN1',
  'CORE',
  'IN2',
  'CORE',
  'BOT',
]
  .map((name) => `<StackupLayer layerOrGroupRef="${name}" thickness="0.2"/>`)
  .join('')}</StackupGroup></Stackup>`;

describe('vias', () => {
  it('take the span of their drill layer, the upper layer first', async () => {
    const imported = await importParts({
      layers: `${FOUR}<Layer name="BLIND" layerFunction="DRILL"><Span fromLayer="IN1" toLayer="TOP"/></Layer>`,
      stackup: FOUR_STACKUP,
      step: `${TRACES}${onLayer('BLIND', holeSet('A', hole(5, 6, '0.3')))}`,
    });
    expect(netOf(imported, 'A').vias).toEqual([{ atMm: [5, 6], fromLayer: 'TOP', toLayer: 'IN1', drillMm: 0.3 }]);
    expect(imported.summary.vias).toBe(1);
  });

  it('count once when a pad stack and the drill layer both hold them; net and span come from whichever has them', async () => {
    const stack = `<PadStack net="B"><LayerHole name="V" diameter="0.3" platingStatus="VIA" x="5" y="6">
      <Span fromLayer="TOP" toLayer="IN2"/></LayerHole></PadStack>`;
    const imported = await importParts({
      layers: `${FOUR}<Layer name="Drill Guide" layerFunction="DRILL"/>`,
      stackup: FOUR_STACKUP,
      step: `${stack}${TRACES}${onLayer('Drill Guide', `<Set>${hole(5, 6, '0.3')}</Set>`)}`,
    });
    expect(imported.summary.vias).toBe(1);
    expect(netOf(imported, 'B').vias).toEqual([{ atMm: [5, 6], fromLayer: 'TOP', toLayer: 'IN2', drillMm: 0.3 }]);
  });

  it('take net and span from the second mention too', async () => {
    const stack = `<PadStack net="B"><LayerHole name="V" diameter="0.3" platingStatus="VIA" x="5" y="6">
      <Span fromLayer="TOP" toLayer="IN2"/></LayerHole></PadStack>`;
    const imported = await importParts({
      layers: `${FOUR}<Layer name="Drill Guide" layerFunction="DRILL"/>`,
      stackup: FOUR_STACKUP,
      step: `${onLayer('Drill Guide', `<Set>${hole(5, 6, '0.3')}</Set>`)}${TRACES}${stack}`,
    });
    expect(netOf(imported, 'B').vias).toEqual([{ atMm: [5, 6], fromLayer: 'TOP', toLayer: 'IN2', drillMm: 0.3 }]);
  });

  it('stacked at one place keep their spans and count as one place', async () => {
    const imported = await importParts({
      layers: `${FOUR}<Layer name="V1" layerFunction="DRILL"><Span fromLayer="TOP" toLayer="IN1"/></Layer>
        <Layer name="V2" layerFunction="DRILL"><Span fromLayer="IN1" toLayer="IN2"/></Layer>`,
      stackup: FOUR_STACKUP,
      step: `${TRACES}${onLayer('V1', holeSet('A', hole(5, 6, '0.1')))}${onLayer('V2', holeSet('A', hole(5, 6, '0.1')))}`,
    });
    expect(netOf(imported, 'A').vias!.map(({ fromLayer, toLayer }) => `${fromLayer}-${toLayer}`)).toEqual([
      'TOP-IN1',
      'IN1-IN2',
    ]);
    expect(imported.summary.vias).toBe(1);
  });

  it.each([
    ['DRILL_2-3', 'IN1', 'IN2'],
    ['drill 1 - 4', 'TOP', 'BOT'],
    ['DRILL_1-6', 'TOP', 'BOT'], // there is no layer 6: through
    ['DRILL', 'TOP', 'BOT'],
  ])('without a span follow the numbers of the layer name: %s', async (name, fromLayer, toLayer) => {
    const imported = await importParts({
      layers: `${FOUR}<Layer name="${name}" layerFunction="DRILL"/>`,
      stackup: FOUR_STACKUP,
      step: `${TRACES}${onLayer(name, holeSet('A', hole(5, 6, '0.3')))}`,
    });
    expect(netOf(imported, 'A').vias).toEqual([{ atMm: [5, 6], fromLayer, toLayer, drillMm: 0.3 }]);
  });

  it('of two sizes at one place are two; capped ones are vias; those without net are only counted', async () => {
    const holes = `${holeSet('A', hole(5, 6, '0.3') + hole(5, 6, '0.4') + hole(7, 6, '0.3', 'VIA_CAPPED'))}<Set>${hole(8, 8, '0.3')}</Set>`;
    const imported = await importParts({ step: `${TRACES}${onLayer('DRILL', holes)}` });
    expect(imported.summary.vias).toBe(4);
    expect(netOf(imported, 'A').vias).toHaveLength(3);
    expect(findingCount(imported, 'vias-without-net')).toBe(1);
  });
});

describe('plated holes and slots', () => {
  it('join the layers of their net but are no vias in the count; others join nothing', async () => {
    const holes = holeSet(
      'A',
      hole(5, 6, '0.9', 'PLATED') + hole(15, 6, '3', 'NONPLATED') + hole(25, 6, '0', 'PLATED'),
    );
    const imported = await importParts({ step: `${TRACES}${onLayer('DRILL', holes)}` });
    expect(imported.summary.vias).toBe(0);
    expect(netOf(imported, 'A').vias).toEqual([{ atMm: [5, 6], fromLayer: 'TOP', toLayer: 'BOT', drillMm: 0.9 }]);
    expect(findingCount(imported, 'plated-holes')).toBe(1);
    expect(findingCount(imported, 'holes-without-size')).toBe(1);
  });

  it('of slots lie in their middle, as wide as the slot is narrow', async () => {
    const outline = `<Outline><Polygon>${polygon('10,20 12,20 12,21 10,21 10,20')}</Polygon><LineDesc lineWidth="0"/></Outline>`;
    const lower = outline.replaceAll('y="2', 'y="1');
    const slots = `<Set net="A"><SlotCavity name="S" platingStatus="PLATED"><Location x="0" y="0"/>${outline}</SlotCavity></Set>
      <Set net="B"><Slot name="T" platingStatus="PLATED">${lower}</Slot></Set>
      <Set net="B"><SlotCavity name="U" platingStatus="PLATED"><Xform rotation="90"/><Location x="30" y="30"/><StandardPrimitiveRef id="OVAL"/></SlotCavity></Set>
      <Set net="B"><SlotCavity name="N" platingStatus="NONPLATED"><Location x="0" y="0"/>${outline}</SlotCavity></Set>`;
    const imported = await importParts({
      content:
        '<DictionaryStandard units="MILLIMETER"><EntryStandard id="OVAL"><Oval width="3" height="1.2"/></EntryStandard></DictionaryStandard>',
      layers: `${LAYERS}<Layer name="ROUT" layerFunction="ROUT"><Span fromLayer="TOP" toLayer="BOT"/></Layer>`,
      step: `${TRACES}${onLayer('ROUT', slots)}`,
    });
    expect(netOf(imported, 'A').vias).toEqual([{ atMm: [11, 20.5], fromLayer: 'TOP', toLayer: 'BOT', drillMm: 1 }]);
    expect(netOf(imported, 'B').vias).toEqual([
      { atMm: [11, 10.5], fromLayer: 'TOP', toLayer: 'BOT', drillMm: 1 },
      { atMm: [30, 30], fromLayer: 'TOP', toLayer: 'BOT', drillMm: 1.2 },
    ]);
  });
});
