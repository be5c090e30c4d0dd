import { AppError, describe, inputError } from '../errors.ts';
import { mmToM } from '../units/convert.ts';
import type { Net, Pin, Plane, RingM, Trace, Via } from './board.ts';
import type { BoardFile } from './board-file.ts';
import type { CopperLayers } from './convert-stackup.ts';
import { refuseDuplicates } from './references.ts';
import { BoundingBox, toPointM, toRingM, withoutRepeats } from './rings.ts';

type NetFile = BoardFile['nets'][number];
type PlaneFile = NonNullable<BoardFile['planes']>[number];

/**
 * Nets in metres, layers looked up. Traces without any length (dots some programs export) are left out and noted.
 * Throws `input` for doubled net names, doubled pins of a net, layers that are no copper, vias that end where they start.
 */
export function convertNets(nets: readonly NetFile[], layers: CopperLayers, notes: string[]): Net[] {
  refuseDuplicates(
    nets.map((net) => net.name),
    (i) => `nets[${i}].name`,
  );
  const dots: string[] = [];
  const converted = nets.map((net, i): Net => {
    const path = `nets[${i}]`;
    const traces = (net.traces ?? []).flatMap((trace, n) => {
      const pointsM = withoutRepeats(trace.pointsMm).map(toPointM);
      const layerIndex = layers.index(trace.layer, `${path}.traces[${n}].layer`);
      if (pointsM.length < 2) dots.push(`${path}.traces[${n}]`);
      return pointsM.length < 2 ? [] : [{ layerIndex, widthM: mmToM(trace.widthMm), pointsM } satisfies Trace];
    });
    return {
      name: net.name,
      traces,
      vias: (net.vias ?? []).map((via, n) => convertVia(via, `${path}.vias[${n}]`, layers)),
      pins: convertPins(net, path, layers),
      ...(net.z0Ohm !== undefined && { z0Ohm: net.z0Ohm }),
      ...(net.epsilonEff !== undefined && { epsilonEff: net.epsilonEff }),
      ...(net.returnPath !== undefined && { returnPath: convertReturn(net.returnPath, `${path}.returnPath`, layers) }),
    };
  });
  if (dots.length > 0) notes.push(`Traces without length left out: ${dots.length} (first: ${dots[0]}).`);
  return converted;
}

function convertVia(via: NonNullable<NetFile['vias']>[number], path: string, layers: CopperLayers): Via {
  const from = layers.index(via.fromLayer, `${path}.fromLayer`);
  const to = layers.index(via.toLayer, `${path}.toLayer`);
  if (from === to) throw inputError(`${path}.toLayer`, 'another layer than fromLayer', via.toLayer);
  const [fromLayerIndex, toLayerIndex] = from < to ? [from, to] : [to, from];
  return { atM: toPointM(via.atMm), fromLayerIndex, toLayerIndex, drillM: mmToM(via.drillMm) };
}

function convertPins(net: NetFile, path: string, layers: CopperLayers): Pin[] {
  const pins = net.pins ?? [];
  refuseDuplicates(
    pins.map((pin) => pin.name),
    (n) => `${path}.pins[${n}].name`,
  );
  return pins.map((pin, n) => ({
    name: pin.name,
    atM: toPointM(pin.atMm),
    layerIndex: layers.index(pin.layer, `${path}.pins[${n}].layer`),
  }));
}

function convertReturn(
  given: NonNullable<NetFile['returnPath']>,
  path: string,
  layers: CopperLayers,
): NonNullable<Net['returnPath']> {
  const pointsM = withoutRepeats(given.pointsMm).map(toPointM);
  if (pointsM.length < 2)
    throw inputError(`${path}.pointsMm`, 'a line of at least two different points', pointsM.length);
  return { layerIndex: layers.index(given.layer, `${path}.layer`), pointsM };
}

/** Planes in metres; one without points covers the whole outline (one plane for each ring of it). */
export function convertPlanes(planes: readonly PlaneFile[], layers: CopperLayers, outlineM: readonly RingM[]): Plane[] {
  return planes.flatMap((plane, i) => {
    const path = `planes[${i}]`;
    const layerIndex = layers.index(plane.layer, `${path}.layer`);
    const cutoutsM = (plane.cutoutsMm ?? []).map((points, n) => toRingM(points, `${path}.cutoutsMm[${n}]`));
    const rings = plane.pointsMm === undefined ? outlineM : [toRingM(plane.pointsMm, `${path}.pointsMm`)];
    return rings.map((ringM) => ({ layerIndex, net: plane.net, ringM, cutoutsM }));
  });
}

/**
 * The board's outline; where the file has none, the bounding box of the copper (with trace widths and drills), noted.
 * Throws `input` when there is no copper with an extent either.
 */
export function convertOutline(file: BoardFile, nets: readonly Net[], notes: string[]): RingM[] {
  if (file.outline !== undefined) {
    return file.outline.map((ring, i) => toRingM(ring.pointsMm, `outline[${i}].pointsMm`));
  }
  const box = new BoundingBox();
  for (const net of nets) {
    for (const trace of net.traces) for (const point of trace.pointsM) box.add(point, trace.widthM / 2);
    for (const via of net.vias) box.add(via.atM, via.drillM / 2);
    for (const pin of net.pins) box.add(pin.atM, 0);
  }
  for (const plane of file.planes ?? []) for (const point of plane.pointsMm ?? []) box.add(toPointM(point), 0);
  const [widthM, heightM] = box.sizeM;
  if (!(widthM > 0 && heightM > 0)) {
    throw new AppError(
      'input',
      'outline must be given, as the board has no copper with an extent; received nothing',
      'outline',
    );
  }
  notes.push(`Board ${describe(file.name)} has no outline: the bounding box of its copper counts as the outline.`);
  return [box.ringM];
}
