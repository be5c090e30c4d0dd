import type { Board, Net, StackLayer } from '../board/board.ts';
import { inputError } from '../errors.ts';
import type { CrossSection, Line } from '../lines/cross-section.ts';
import { effectiveDielectric } from '../lines/dielectric.ts';
import { lineOf } from '../lines/line.ts';
import type { ReferencePlane } from '../returns/reference.ts';

/** Cross section of a trace over one plane (surface, covered or embedded microstrip) or between two (stripline). */
export function crossSectionOver(
  board: Board,
  layerIndex: number,
  widthM: number,
  planes: readonly ReferencePlane[],
): CrossSection {
  const thicknessM = board.stackup[layerIndex]!.thicknessM;
  const [first, second] = planes;
  if (!first) throw inputError(`stackup layer ${board.stackup[layerIndex]!.name}`, 'referenced by a plane', 'none');
  for (const { heightM, rows } of planes) {
    if (!(heightM > 0) || rows.length === 0) {
      throw inputError(
        'stackup',
        `a dielectric between ${board.stackup[layerIndex]!.name} and its reference plane`,
        `${planes.map((plane) => board.stackup[plane.layerIndex]!.name).join(', ')} without one`,
      );
    }
  }
  if (second) {
    const below = first.layerIndex > layerIndex ? first : second;
    const above = first.layerIndex > layerIndex ? second : first;
    const { epsilonR, tanDelta } = effectiveDielectric([...below.rows, ...above.rows]);
    return {
      kind: 'stripline',
      widthM,
      thicknessM,
      heightAboveM: above.heightM,
      heightBelowM: below.heightM,
      epsilonR,
      tanDelta,
    };
  }
  const { epsilonR, tanDelta } = effectiveDielectric(first.rows);
  const cover = coverRows(board.stackup, layerIndex, first.layerIndex > layerIndex);
  return {
    kind: 'microstrip',
    widthM,
    thicknessM,
    heightM: first.heightM,
    epsilonR,
    tanDelta,
    ...(cover.length > 0 && { cover: { thicknessM: sumThickness(cover), ...effectiveDielectric(cover) } }),
  };
}

/** Dielectric rows on the far side of the trace, out to the air. */
function coverRows(stackup: readonly StackLayer[], layerIndex: number, isPlaneBelow: boolean): StackLayer[] {
  const side = isPlaneBelow ? stackup.slice(0, layerIndex) : stackup.slice(layerIndex + 1);
  return side.filter((row) => row.kind === 'dielectric' && row.thicknessM > 0);
}

const sumThickness = (rows: readonly StackLayer[]): number => rows.reduce((sum, row) => sum + row.thicknessM, 0);

/** The line of a cross section; a net's measured `z0Ohm` and `epsilonEff` override what the stackup gives. */
export function lineWithOverrides(net: Net, section: CrossSection): Line {
  const line = lineOf(section);
  if (net.z0Ohm === undefined && net.epsilonEff === undefined) return line;
  return { ...line, z0Ohm: net.z0Ohm ?? line.z0Ohm, epsilonEff: net.epsilonEff ?? line.epsilonEff };
}

/** A line known by its measured values alone: no loss is known, none is invented. */
export const statedLine = (z0Ohm: number, epsilonEff: number): Line => ({
  z0Ohm,
  epsilonEff,
  alphaNpPerM: () => 0,
  caveats: [],
});
