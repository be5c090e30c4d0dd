import { AppError } from '../../app/errors.ts';

type Structure = 'solved' | 'pair-only';

/** What is used when neither the command line nor the board file says. */
export const STRUCTURE_DEFAULT: Structure = 'pair-only';

/**
 * Whether planes and cables are solved for. This version computes the pair alone, so `solved` on the command line is
 * refused (throws `input`), and a board file that asks for it is told in the notes.
 */
export function chooseStructure(
  option: string | undefined,
  inFile: Structure | undefined,
): { choice: Structure; notes: string[] } {
  if (option === 'solved') {
    const text = '--structure solved is not in this version: it comes with the structure solver. Use pair-only';
    throw new AppError('input', text, '--structure');
  }
  const isUnmet = option === undefined && inFile === 'solved';
  const notes = isUnmet ? ['The board file asks for solved planes; this version computes trace and return alone.'] : [];
  return { choice: STRUCTURE_DEFAULT, notes };
}
