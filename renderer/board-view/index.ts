import type { Panel } from '../shell/panel.ts';
import { BOARD_COMMANDS } from './board-commands.ts';
import { BoardView } from './board-view.tsx';

export const boardPanel: Panel = {
  name: 'board',
  label: 'Board',
  place: 'board',
  Content: BoardView,
  commands: BOARD_COMMANDS,
};
