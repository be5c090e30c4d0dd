import { AppError, inputError } from '../errors.ts';
import { mhzToHz, mmToM, nsToS, uaToA } from '../units/convert.ts';
import type { Cable, CurrentLoop, Point3M, Waveform } from './board.ts';
import type { BoardFile } from './board-file.ts';
import { References, refuseDuplicates } from './references.ts';
import { openRing, toPoint3M, withoutRepeats } from './rings.ts';

type CableFile = NonNullable<BoardFile['cables']>[number];

/** Cables in SI. Throws `input` for doubled names, pieces without length, tables that do not rise in frequency. */
export function convertCables(cables: readonly CableFile[]): Cable[] {
  refuseDuplicates(
    cables.map((cable) => cable.name),
    (i) => `cables[${i}].name`,
  );
  return cables.map((cable, i): Cable => {
    const path = `cables[${i}]`;
    const pointsM = withoutRepeats(cable.pointsMm).map(toPoint3M);
    if (pointsM.length < cable.pointsMm.length) {
      const at = cable.pointsMm.findIndex(
        (point, n) => n > 0 && point.every((x, k) => x === cable.pointsMm[n - 1]![k]),
      );
      throw inputError(`${path}.pointsMm[${at}]`, 'another point than the one before it', cable.pointsMm[at]);
    }
    if (cable.seriesOhm !== undefined && cable.seriesImpedance !== undefined) {
      throw inputError(`${path}.seriesOhm`, 'left out beside seriesImpedance', cable.seriesOhm);
    }
    requireRisingMhz(cable.seriesImpedance ?? [], `${path}.seriesImpedance`);
    requireRisingMhz(cable.commonModeUa ?? [], `${path}.commonModeUa`);
    return {
      name: cable.name,
      pointsM,
      radiusM: mmToM(cable.radiusMm),
      farEnd: cable.farEnd,
      seriesOhm: cable.seriesOhm ?? 0,
      ...(cable.seriesImpedance && {
        seriesImpedance: cable.seriesImpedance.map(([frequencyMhz, resistanceOhm, reactanceOhm]) => ({
          frequencyHz: mhzToHz(frequencyMhz),
          resistanceOhm,
          reactanceOhm,
        })),
      }),
      ...(cable.commonModeUa && {
        commonModeRms: cable.commonModeUa.map(([frequencyMhz, currentRmsUa]) => ({
          frequencyHz: mhzToHz(frequencyMhz),
          currentRmsA: uaToA(currentRmsUa),
        })),
      }),
    };
  });
}

function requireRisingMhz(rows: readonly (readonly number[])[], path: string): void {
  const at = rows.findIndex((row, n) => n > 0 && row[0]! <= rows[n - 1]![0]!);
  if (at > 0)
    throw inputError(
      `${path}[${at}][0]`,
      `a frequency above the row before it (${rows[at - 1]![0]} MHz)`,
      rows[at]![0],
    );
}

/** Current loops in SI. Throws `input` for doubled names, a voltage waveform, a loop that encloses no area. */
export function convertLoops(file: BoardFile, waveforms: readonly Waveform[]): CurrentLoop[] {
  const loops = file.loops ?? [];
  refuseDuplicates(
    loops.map((loop) => loop.name),
    (i) => `loops[${i}].name`,
  );
  const references = new References(file.nets, waveforms);
  return loops.map((loop, i): CurrentLoop => {
    const path = `loops[${i}]`;
    references.waveform(loop.waveform, `${path}.waveform`, 'A');
    const pointsM = openRing(loop.pointsMm).map(toPoint3M);
    if (pointsM.length < 3 || isFlatLoop(pointsM)) {
      const text = `${path}.pointsMm must be a loop that encloses an area; received ${pointsM.length} points without one`;
      throw new AppError('input', text, `${path}.pointsMm`);
    }
    return {
      name: loop.name,
      pointsM,
      waveform: loop.waveform,
      delayS: nsToS(loop.delayNs),
      isInverted: loop.inverted,
    };
  });
}

/** All points on one straight line, to rounding: then go and return cancel. */
function isFlatLoop(pointsM: readonly Point3M[]): boolean {
  const [x0, y0, z0] = pointsM[0]!;
  const fromFirst = pointsM.slice(1).map(([x, y, z]) => [x - x0, y - y0, z - z0] as const);
  const [ux, uy, uz] = fromFirst[0]!;
  return fromFirst.every(([x, y, z]) => {
    const offLine = Math.hypot(uy * z - uz * y, uz * x - ux * z, ux * y - uy * x);
    return offLine <= 1e-9 * Math.hypot(ux, uy, uz) * Math.hypot(x, y, z);
  });
}
