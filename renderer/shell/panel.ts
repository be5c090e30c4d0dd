import type { ComponentType } from 'react';
import type { Command } from '../commands/command.ts';

/** Where a part sits in the window. */
export type PanelPlace = 'strip' | 'board' | 'spectrum' | 'tab';

/** A part of the window, as its folder's `index.ts` offers it to the shell. */
export interface Panel {
  /** Stable, for what is remembered about it. */
  readonly name: string;
  readonly label: string;
  readonly place: PanelPlace;
  /** Fills its place; mounted only while a document is open. May be `lazy`, where it brings much code. */
  readonly Content: ComponentType;
  readonly commands?: readonly Command[];
}
