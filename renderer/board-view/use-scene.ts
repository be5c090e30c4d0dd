import { useMemo } from 'react';
import type { Board } from '../../app/board/board.ts';
import type { Finding } from '../../app/estimate/result.ts';
import { useApp } from '../state/app-store.ts';
import { useDetail, useSelection, useWork } from '../state/hooks.ts';
import { useRemembered } from '../state/remembered.ts';
import { usePalette } from '../theme/palette.ts';
import { batchCopper } from './copper-batches.ts';
import { indexCopper } from './copper-index.ts';
import { copperLayers, drawingOrder, sightOf } from './layer-sight.ts';
import { levelStep } from './levels.ts';
import { netShapeOf } from './net-shape.ts';
import { indexPieces, type PickScene } from './pick.ts';
import { ALL_LAYERS, EVERYTHING, layersSchema, shownSchema } from './remembered-view.ts';
import type { LiveScene, PieceDetail, StillScene } from './scene.ts';

const NO_PIECES: readonly PieceDetail[] = [];
const NO_FINDINGS: readonly Finding[] = [];

export const useLayers = () => useRemembered('board-view.layers', layersSchema, ALL_LAYERS);
export const useShownThings = () => useRemembered('board-view.shown', shownSchema, EVERYTHING);

/** Is the result about the copper that is shown? Another layout may have been opened since. */
export function useIsOfThisCopper(): boolean {
  const resultBase = useApp((state) => state.result?.work.baseId);
  const baseId = useWork()?.baseId;
  return resultBase !== undefined && resultBase === baseId;
}

export function useFindings(): readonly Finding[] {
  const findings = useApp((state) => state.result?.result.findings ?? NO_FINDINGS);
  return useIsOfThisCopper() ? findings : NO_FINDINGS;
}

/** The chosen line's detail, when it is there and about this copper. */
export function useReadyDetail() {
  const detail = useDetail();
  const { lineHz } = useSelection();
  const isOfThisCopper = useIsOfThisCopper();
  return isOfThisCopper && detail.kind === 'ready' && detail.lineHz === lineHz ? detail.detail : null;
}

export interface Scenes {
  readonly still: StillScene;
  readonly pick: PickScene;
}

/** What is drawn and what can be hit, from the store. */
export function useScenes(board: Board, isFromBottom: boolean): Scenes {
  const { nets, planes, stackup, outlineM, drives } = board;
  const palette = usePalette();
  const [layers] = useLayers();
  const [shown] = useShownThings();
  const detail = useReadyDetail();
  const allFindings = useFindings();
  const copper = useMemo(() => batchCopper({ nets, planes, outlineM }), [nets, planes, outlineM]);
  const index = useMemo(() => indexCopper(nets), [nets]);
  const copperNames = useMemo(() => copperLayers(stackup), [stackup]);
  const sight = useMemo(() => sightOf(copperNames, layers, isFromBottom), [copperNames, layers, isFromBottom]);
  const cables = useMemo(() => (shown.cables ? board.cables : []), [shown.cables, board.cables]);
  const findings = shown.findings ? allFindings : NO_FINDINGS;
  const pieces = detail?.pieces ?? NO_PIECES;
  const { colouring } = shown;

  const still = useMemo((): StillScene => {
    const isDriven = new Set(drives.map(({ net }) => net));
    const map = detail?.currentMap ?? null;
    return {
      board: { stackup },
      copper,
      driven: nets.filter(({ name }) => isDriven.has(name)).map((net) => netShapeOf(net, planes)),
      sight,
      layerOrder: drawingOrder(copperNames, sight),
      pieces,
      currentMap: map === null || cables.length > 0 ? map : { ...map, cables: [] },
      colouring,
      cables,
      palette,
    };
  }, [drives, detail, stackup, copper, nets, planes, sight, copperNames, pieces, colouring, cables, palette]);

  const pieceIndex = useMemo(() => {
    if (colouring !== 'shares' || pieces.length === 0) return null;
    const topDb = pieces[0]!.levelDbuvPerM;
    const layerOf = new Map(stackup.map(({ name }, i) => [name, i]));
    return indexPieces(
      pieces,
      ({ layer, levelDbuvPerM }) =>
        levelStep(levelDbuvPerM, topDb, 1) !== null && (layer === '' || sight.isShown(layerOf.get(layer) ?? -1)),
    );
  }, [colouring, pieces, stackup, sight]);
  const pick = useMemo(
    (): PickScene => ({ board, index, sight, findings, cables, pieces: pieceIndex }),
    [board, index, sight, findings, cables, pieceIndex],
  );
  return { still, pick };
}

/** What follows pointer and choice. */
export function useLiveScene({ board, sight, cables, findings }: PickScene): LiveScene {
  const { nets, planes } = board;
  const palette = usePalette();
  const selection = useSelection();
  const hovered = useApp((state) => state.hover);
  const pieces = useReadyDetail()?.pieces ?? NO_PIECES;
  const byName = useMemo(() => new Map(nets.map((net) => [net.name, net])), [nets]);
  return useMemo(() => {
    const shapeOf = (name: string | null) => {
      const net = name === null ? undefined : byName.get(name);
      return net === undefined ? null : netShapeOf(net, planes);
    };
    return {
      sight,
      selected: shapeOf(selection.net),
      hovered: hovered.net === selection.net ? null : shapeOf(hovered.net),
      cables,
      selectedCable: selection.cable,
      hoveredCable: hovered.cable === selection.cable ? null : hovered.cable,
      piece: selection.piece === null ? null : (pieces[selection.piece] ?? null),
      findings,
      selectedFinding: selection.finding,
      palette,
    };
  }, [byName, planes, sight, selection, hovered.net, hovered.cable, cables, pieces, findings, palette]);
}
