import type { Command } from '../commands/command.ts';
import { notify } from '../state/notices.ts';
import { currentPalette } from '../theme/palette.ts';
import { boardHandle } from './board-handle.ts';

const isEnabled = (): boolean => boardHandle() !== null;
const ZOOM_STEP = 1.5;

/** Puts the board as it is seen on the clipboard. */
async function copyPicture(): Promise<void> {
  const picture = boardHandle()!.painter.picture(currentPalette().color('paper'));
  const blob = await new Promise<Blob | null>((resolve) => picture.toBlob(resolve, 'image/png'));
  await navigator.clipboard.write([new ClipboardItem({ 'image/png': blob! })]);
  notify({ tone: 'plain', text: 'Picture of the board copied.' });
}

const command = (name: string, label: string, run: Command['run'], keys?: readonly string[]): Command => ({
  name: `board.${name}`,
  label,
  group: 'View',
  isEnabled,
  run,
  ...(keys && { keys }),
});

export const BOARD_COMMANDS: readonly Command[] = [
  command('search', 'Find a net…', () => boardHandle()!.search(), ['Mod+F']),
  command('fit', 'Fit the board', () => boardHandle()!.camera.fit('board'), ['F']),
  command('fit-cables', 'Fit the board with its cables', () => boardHandle()!.camera.fit('cables'), ['Shift+F']),
  command('zoom-in', 'Enlarge the board', () => boardHandle()!.camera.zoom(ZOOM_STEP)),
  command('zoom-out', 'Make the board smaller', () => boardHandle()!.camera.zoom(1 / ZOOM_STEP)),
  command('turn', 'Look at the board from the other side', () => boardHandle()!.camera.turn()),
  command('copy-picture', 'Copy picture of the board', copyPicture),
];

export const boardCommand = (name: string): Command => BOARD_COMMANDS.find((one) => one.name === `board.${name}`)!;
