import type { ImportFinding } from '../../../../app/board/import-summary.ts';

/** Collects what the reader guessed, left out or repaired. */
export class Findings {
  readonly list: ImportFinding[] = [];

  /** Adds a finding unless it concerns nothing. */
  add(code: string, count: number, message: string): void {
    if (count > 0) this.list.push({ code, message, count });
  }
}

/** Up to five names, quoted; hostile ones are cut. */
export function nameList(names: readonly string[]): string {
  const shown = names.slice(0, 5).map((name) => JSON.stringify(name.length > 60 ? `${name.slice(0, 57)}…` : name));
  return names.length > 5 ? `${shown.join(', ')} and ${names.length - 5} more` : shown.join(', ');
}
