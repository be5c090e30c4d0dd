import { mmToM } from '../units/convert.ts';
import type { Board } from './board.ts';
import type { BoardFile } from './board-file.ts';
import { convertCables, convertLoops } from './convert-cables.ts';
import { convertNets, convertOutline, convertPlanes } from './convert-copper.ts';
import { convertDrives } from './convert-drives.ts';
import { CopperLayers, convertStackup } from './convert-stackup.ts';
import { convertWaveforms, type SamplesByFile } from './convert-waveforms.ts';

/**
 * The board of a parsed file in SI units, every name in it looked up, and notes on what the program chose.
 *
 * `samples` holds the columns of every waveform file by the `file` text that names it (reading is the caller's).
 * Throws `input` with the path in the file for whatever does not fit together.
 */
export function toBoard(
  file: BoardFile,
  options: { readonly samples?: SamplesByFile } = {},
): { board: Board; notes: string[] } {
  const notes: string[] = [];
  const stackup = convertStackup(file.stackup);
  const layers = new CopperLayers(stackup);
  const nets = convertNets(file.nets, layers, notes);
  const outlineM = convertOutline(file, nets, notes);
  const waveforms = convertWaveforms(file, options.samples ?? new Map(), notes);
  const board: Board = {
    name: file.name,
    revision: file.revision,
    notes: file.notes ?? '',
    outlineM,
    stackup,
    planes: convertPlanes(file.planes ?? [], layers, outlineM),
    nets,
    waveforms,
    ...convertDrives(file, nets, waveforms, notes),
    loops: convertLoops(file, waveforms),
    cables: convertCables(file.cables ?? []),
    structure: {
      planes: file.structure?.planes ?? 'solved',
      ...(file.structure?.cellMm !== undefined && { cellM: mmToM(file.structure.cellMm) }),
    },
  };
  return { board, notes };
}
