import { describe, expect, it } from 'vitest';
import { findingCount, importParts, LAYERS, line, netOf, onLayer } from './fixture.ts';

const TRACES = onLayer('TOP', line('A', '1,1 9,1') + line('B', '1,3 9,3'));
const pad = (x: number, y: number, component: string, pin: string): string =>
  `<Pad padstackDefRef="P"><Location x="${x}" y="${y}"/><StandardPrimitiveRef id="R"/><PinRef componentRef="${component}" pin="${pin}"/></Pad>`;
const padSet = (net: string, pads: string): string => `<Set net="${net}">${pads}</Set>`;
const component = (refDes: string, layer: string): string =>
  `<Component refDes="${refDes}" packageRef="X" layerRef="${layer}" part="p" mountType="SMT"><Location x="1" y="1"/></Component>`;

describe('pins', () => {
  it('lie where their pads are, named component.pin', async () => {
    const step = `${component('U3', 'TOP')}${onLayer('TOP', line('A', '1,1 9,1') + padSet('A', pad(10, 5, 'U3', '7')))}`;
    const imported = await importParts({ step });
    expect(netOf(imported, 'A').pins).toEqual([{ name: 'U3.7', atMm: [10, 5], layer: 'TOP' }]);
    expect(imported.summary.components).toBe(1);
  });

  it('come from pad stacks too, whose pads on mask and paste count for nothing', async () => {
    const layerPad = (layer: string, pin = '1'): string =>
      `<LayerPad layerRef="${layer}"><Location x="10" y="5"/><StandardPrimitiveRef id="R"/><PinRef componentRef="R9" pin="${pin}"/></LayerPad>`;
    const imported = await importParts({
      layers: `${LAYERS}<Layer name="PASTE" layerFunction="PASTEMASK" side="TOP"/>`,
      step: `<PadStack net="A">${layerPad('PASTE')}${layerPad('BOT')}</PadStack><PadStack net="No Net">${layerPad('TOP', '2')}</PadStack>${TRACES}`,
    });
    expect(netOf(imported, 'A').pins).toEqual([{ name: 'R9.1', atMm: [10, 5], layer: 'BOT' }]);
    expect(imported.summary.nets).toBe(2);
  });

  it('take their net from the net list when the Set has none', async () => {
    const step = `<LogicalNet name="A"><PinRef componentRef="U3" pin="7"/><PinRef componentRef="U9" pin="1"/></LogicalNet>
      <LogicalNet name="UNROUTED"><PinRef componentRef="U4" pin="2"/></LogicalNet>
      ${onLayer('TOP', `${line('A', '1,1 9,1')}<Set>${pad(10, 5, 'U3', '7')}${pad(12, 5, 'U4', '2')}${pad(14, 5, 'U5', '1')}</Set>`)}`;
    const imported = await importParts({ step });
    expect(netOf(imported, 'A').pins).toEqual([{ name: 'U3.7', atMm: [10, 5], layer: 'TOP' }]);
    expect(findingCount(imported, 'pins-without-pad')).toBe(1); // U9.1
    expect(findingCount(imported, 'nets-without-copper')).toBe(1);
    expect(imported.board.nets.map(({ name }) => name)).toEqual(['A']);
  });

  it('through all layers are one pin, on the side of their component', async () => {
    const step = `${component('J1', 'BOT')}${onLayer('TOP', line('A', '1,1 9,1') + padSet('A', pad(10, 5, 'J1', '1') + pad(20, 5, 'J2', '1')))}
      ${onLayer('BOT', padSet('A', pad(10, 5, 'J1', '1') + pad(20, 5, 'J2', '1')))}`;
    const imported = await importParts({ step });
    expect(netOf(imported, 'A').pins).toEqual([
      { name: 'J1.1', atMm: [10, 5], layer: 'BOT' },
      { name: 'J2.1', atMm: [20, 5], layer: 'TOP' },
    ]);
  });

  it('with several pads have a number for each further one', async () => {
    const sets = padSet('A', pad(10, 5, 'J3', 'SH') + pad(20, 5, 'J3', 'SH') + pad(30, 5, 'J3', 'SH'));
    // Two pins whose names come out alike, and one that looks like a numbered one.
    const alike = padSet('A', pad(40, 5, 'J3.SH', '1') + pad(50, 5, 'J3', 'SH.1') + pad(60, 5, 'J3', 'SH#2'));
    const imported = await importParts({ step: onLayer('TOP', line('A', '1,1 9,1') + sets + alike) });
    expect(netOf(imported, 'A').pins!.map(({ name }) => name)).toEqual([
      'J3.SH',
      'J3.SH#2',
      'J3.SH#3',
      'J3.SH.1',
      'J3.SH.1#2',
      'J3.SH#2#2',
    ]);
  });
});
