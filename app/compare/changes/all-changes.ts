import type { BoardFile } from '../../board/board-file.ts';
import type { StoredRun } from '../../project/stored-run.ts';
import { shortName } from '../../report/markup.ts';
import type { Renames } from '../own-levels.ts';
import { type Draft, draft } from './draft.ts';
import { driveChanges, loadChanges } from './drive-changes.ts';
import { cableChanges, loopChanges } from './loop-cable-changes.ts';
import { netChanges, netRenames } from './net-changes.ts';
import { outlineChanges } from './outline-changes.ts';
import { planeChanges } from './plane-changes.ts';
import { setupChanges } from './setup-changes.ts';
import { layerRenames, stackupChanges, structureChanges } from './stackup-changes.ts';
import { waveformChanges, waveformSets } from './waveform-changes.ts';
import { wordChange } from './words.ts';

/** Everything that is different about what two runs estimated, and what nets are called now. */
export function allChanges(before: StoredRun, after: StoredRun): { drafts: Draft[]; renames: Renames } {
  const layers = layerRenames(before.document.board, after.document.board);
  const renames = netRenames(withLayers(before.document.board, layers), after.document.board);
  const one = { ...before.document, board: withNets(withLayers(before.document.board, layers), renames) };
  const other = after.document;
  const sets = waveformSets(one, other);
  const name = wordChange('board name', one.board.name, other.board.name);
  const drafts = [
    ...setupChanges(before, after),
    ...(name === undefined ? [] : [draft('board', name)]),
    ...stackupChanges(one.board, other.board, layers),
    ...outlineChanges(one.board, other.board),
    ...planeChanges(one.board, other.board),
    ...structureChanges(one.board, other.board),
    ...cableChanges(one.board, other.board),
    ...loopChanges(one.board, other.board, sets),
    ...waveformChanges(one, other, sets),
    ...driveChanges(one.board, other.board, sets),
    ...loadChanges(one.board, other.board),
    ...[...renames].map(([from, to]) =>
      draft('net', `net ${shortName(from)} is now named ${shortName(to)} (same copper)`, { nets: [to] }),
    ),
    ...netChanges(one.board, other.board),
  ];
  return { drafts, renames };
}

/** The board with its layers under their new names. */
function withLayers(board: BoardFile, renames: ReadonlyMap<string, string>): BoardFile {
  if (renames.size === 0) return board;
  const named = (layer: string) => renames.get(layer) ?? layer;
  const onLayer = <T extends { layer: string }>(items: T[] | undefined): T[] | undefined =>
    items?.map((item) => ({ ...item, layer: named(item.layer) }));
  return {
    ...board,
    stackup: board.stackup.map((layer) => ({ ...layer, name: named(layer.name) })),
    planes: onLayer(board.planes),
    nets: board.nets.map((net) => ({
      ...net,
      traces: onLayer(net.traces),
      pins: onLayer(net.pins),
      vias: net.vias?.map((via) => ({ ...via, fromLayer: named(via.fromLayer), toLayer: named(via.toLayer) })),
      returnPath: net.returnPath && { ...net.returnPath, layer: named(net.returnPath.layer) },
    })),
  };
}

/** The board with its nets under their new names. */
function withNets(board: BoardFile, renames: Renames): BoardFile {
  if (renames.size === 0) return board;
  const named = (net: string) => renames.get(net) ?? net;
  const ofNet = <T extends { net: string }>(items: T[] | undefined): T[] | undefined =>
    items?.map((item) => ({ ...item, net: named(item.net) }));
  return {
    ...board,
    planes: ofNet(board.planes),
    drives: ofNet(board.drives),
    loads: ofNet(board.loads),
    nets: board.nets.map((net) => ({ ...net, name: named(net.name) })),
  };
}
