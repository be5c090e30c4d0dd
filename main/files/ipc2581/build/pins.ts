import type { BoardFileInput } from '../../../../app/board/board-file.ts';
import { type PinPad, pinKey, type Step } from '../document.ts';
import type { Findings } from './findings.ts';
import type { BoardFrame } from './frame.ts';
import { UniqueNames } from './unique-names.ts';

export type FilePin = NonNullable<BoardFileInput['nets'][number]['pins']>[number];

/**
 * Pins by net, named `component.pin`, where their pads are. The net is that of the pad's Set, else that of the net
 * list. A through-hole pin has a pad on every layer: it is one pin, on its component's side. Further pads of a pin at
 * other places (shield tabs, divided thermal pads) are `component.pin#2` and so on.
 */
export function buildPins(
  step: Step,
  coppers: readonly string[],
  frame: BoardFrame,
  findings: Findings,
): Map<string, FilePin[]> {
  const layerRank = new Map(coppers.map((name, rank) => [name, rank]));
  const places = new Map<string, Map<string, PinPad>>();
  for (const pad of step.pads) {
    if (!layerRank.has(pad.layer)) continue;
    const key = pinKey(pad.component, pad.pin);
    const pads = places.get(key) ?? new Map<string, PinPad>();
    places.set(key, pads);
    const place = frame.point([pad.xMm, pad.yMm]).join(' ');
    const known = pads.get(place);
    pads.set(place, known === undefined ? pad : preferred(step, layerRank, known, pad));
  }

  const byNet = new Map<string, FilePin[]>();
  const names = new UniqueNames();
  for (const [key, pads] of places) {
    for (const pad of pads.values()) {
      const net = pad.net ?? step.pinNets.get(key);
      if (net === undefined) continue;
      const name = names.free(pad.component === '' ? pad.pin : `${pad.component}.${pad.pin}`);
      const pins = byNet.get(net) ?? [];
      byNet.set(net, pins);
      pins.push({ name, atMm: frame.point([pad.xMm, pad.yMm]), layer: pad.layer });
    }
  }
  const lost = [...step.pinNets.keys()].filter((key) => !places.has(key)).length;
  findings.add('pins-without-pad', lost, `${lost} pins of the net list have no pad on a copper layer and are left out`);
  return byNet;
}

/** Of two pads of one pin at one place: the one on the component's side, else the upper one; a net is never lost. */
function preferred(step: Step, rank: ReadonlyMap<string, number>, p: PinPad, q: PinPad): PinPad {
  const side = step.componentLayers.get(p.component);
  const first = p.layer === side ? p : q.layer === side ? q : rank.get(p.layer)! <= rank.get(q.layer)! ? p : q;
  return { ...first, net: first.net ?? p.net ?? q.net };
}
