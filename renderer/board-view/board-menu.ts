import type { Board } from '../../app/board/board.ts';
import { shortName } from '../../app/report/markup.ts';
import { keysOf, runCommand } from '../commands/run-command.ts';
import type { MenuEntry, MenuGroup } from '../components/menu.tsx';
import { attempt } from '../state/notices.ts';
import { prefersReducedMotion } from '../theme/motion.ts';
import type { BoardCamera } from './board-camera.ts';
import { boardCommand } from './board-commands.ts';
import { boxOf, netBox } from './boxes.ts';
import { choose } from './choosing.ts';
import type { Pick } from './pick.ts';

const VIEW = ['fit', 'fit-cables', 'turn', 'copy-picture'];

/** What can be done with the board as a whole. */
export const viewEntries = (): readonly MenuEntry[] =>
  VIEW.map(boardCommand).map((command) => ({
    name: command.name,
    label: command.label,
    keys: keysOf(command),
    run: () => runCommand(command),
  }));

/** What can be done where it was pointed at. */
export function menuOf(board: Board, camera: BoardCamera, pick: Pick | null): readonly MenuGroup[] {
  const view = { label: 'Board', entries: viewEntries() };
  const name = nameOf(pick);
  if (pick === null || name === null) return [view];
  return [
    {
      label: shortName(name),
      entries: [
        { name: 'select', label: 'Select', run: () => choose(pick.kind === 'piece' ? netOf(pick.net) : pick) },
        { name: 'fit', label: 'Fit', run: () => showNamed(board, camera, pick) },
        {
          name: 'copy',
          label: 'Copy name',
          run: () => void attempt('Copy name', () => navigator.clipboard.writeText(name)),
        },
      ],
    },
    view,
  ];
}

const netOf = (net: string): Pick => ({ kind: 'net', net, layerIndex: -1 });

function nameOf(pick: Pick | null): string | null {
  if (pick === null || pick.kind === 'finding') return null;
  return pick.kind === 'cable' ? pick.cable : pick.net;
}

function showNamed(board: Board, camera: BoardCamera, pick: Pick): void {
  if (pick.kind === 'cable') {
    const cable = board.cables.find(({ name }) => name === pick.cable);
    const box = cable && boxOf(cable.pointsM);
    if (box) camera.show(box, prefersReducedMotion());
  } else if (pick.kind !== 'finding') showNet(board, camera, pick.net);
}

/** Brings a whole net into the picture. */
export function showNet(board: Board, camera: BoardCamera, name: string): void {
  const net = board.nets.find((candidate) => candidate.name === name);
  const box = net && netBox(board, net);
  if (box) camera.show(box, prefersReducedMotion());
}
