/** Something the user can do; menu, keys and palette all work on the same list. */
export interface Command {
  /** Stable; native menus send it. */
  readonly name: string;
  readonly label: string;
  /** Heading in menu and palette. */
  readonly group: 'File' | 'Edit' | 'Estimate' | 'View' | 'Help';
  /** As in `Mod+Shift+Z`; Mod is Ctrl, or Command on a Mac. The first one is shown. */
  readonly keys?: readonly string[];
  readonly isEnabled?: () => boolean;
  readonly run: () => void | Promise<void>;
}
