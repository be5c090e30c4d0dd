import type { Board, Net } from '../../app/board/board.ts';
import { inputError } from '../../app/errors.ts';
import type { LayoutPart } from '../../app/project/board-parts.ts';
import { PlaneIndex } from '../../app/returns/reference.ts';
import { mToMm } from '../../app/units/convert.ts';

/** Where a net runs on one layer, and over what. */
export interface LayerRun {
  readonly layer: string;
  readonly lengthM: number;
  /** The nearest plane under or over its longest piece; null: none. */
  readonly plane: { readonly layer: string; readonly net: string; readonly heightM: number } | null;
}

/** Layers a net has traces on, from the top. */
export function layerRuns(board: Board, net: Net): LayerRun[] {
  const planes = new PlaneIndex(board);
  const layers = [...new Set(net.traces.map(({ layerIndex }) => layerIndex))].sort((one, other) => one - other);
  return layers.map((layerIndex): LayerRun => {
    const pieces = net.traces
      .filter((trace) => trace.layerIndex === layerIndex)
      .flatMap(({ pointsM }) => pointsM.slice(1).map((toM, i) => ({ fromM: pointsM[i]!, toM })))
      .map((piece) => ({
        ...piece,
        lengthM: Math.hypot(piece.toM[0] - piece.fromM[0], piece.toM[1] - piece.fromM[1]),
      }));
    const longest = pieces.reduce((one, other) => (other.lengthM > one.lengthM ? other : one));
    const found = planes
      .referenceOf(longest.fromM, longest.toM, layerIndex, net.name)
      .planes.toSorted((one, other) => one.heightM - other.heightM)[0];
    return {
      layer: board.stackup[layerIndex]!.name,
      lengthM: pieces.reduce((sum, { lengthM }) => sum + lengthM, 0),
      plane: found ? { layer: board.stackup[found.layerIndex]!.name, net: found.net, heightM: found.heightM } : null,
    };
  });
}

/**
 * The layout with another height between two copper layers: the dielectrics between them become thicker or thinner in
 * proportion, copper between them keeps its thickness. Throws `input` when that copper alone is thicker.
 */
export function withHeight(layout: LayoutPart, one: string, other: string, heightM: number): LayoutPart {
  const places = [one, other].map((name) => layout.stackup.findIndex((row) => row.name === name));
  const [upper, lower] = [Math.min(...places), Math.max(...places)];
  const isBetween = (i: number) => i > upper && i < lower;
  const thicknessMm = (kind: 'copper' | 'dielectric') =>
    layout.stackup.reduce((sum, row, i) => (isBetween(i) && row.kind === kind ? sum + row.thicknessMm : sum), 0);
  const wantedMm = mToMm(heightM) - thicknessMm('copper');
  if (wantedMm <= 0) {
    throw inputError(
      'height',
      `more than the copper between ${one} and ${other} (${thicknessMm('copper')} mm)`,
      heightM,
    );
  }
  const factor = wantedMm / thicknessMm('dielectric');
  return {
    ...layout,
    stackup: layout.stackup.map((row, i) =>
      isBetween(i) && row.kind === 'dielectric'
        ? { ...row, thicknessMm: Number((row.thicknessMm * factor).toPrecision(9)) }
        : row,
    ),
  };
}
