import type { Polarization } from '../estimate/result.ts';
import { type Markup, shortName } from './markup.ts';
import type { Standing } from './verdict.ts';

/**
 * What a report says, free of how it is laid out: sections of blocks, blocks of text. The page for a screen
 * (`html/`) and the printed pages are two renderings of the same blocks.
 */

/** Text with the little emphasis a report needs. Strings are shown as they are, control characters written out. */
export type Text = string | Part | false | undefined | readonly Text[];

type Part =
  | { readonly kind: 'name'; readonly text: string }
  | { readonly kind: 'strong' | 'quiet' | 'code'; readonly text: Text }
  /** Verdict mark of a reading, and what it says. */
  | { readonly kind: 'mark'; readonly standing: Standing; readonly label: string }
  /** The dash that stands for a polarisation in the figures. */
  | { readonly kind: 'dash'; readonly polarization: Polarization }
  | { readonly kind: 'break' };

/** A name from a file, cut to so many characters: kept apart from the direction of its surroundings. */
export const name = (text: string, length?: number): Part => ({ kind: 'name', text: shortName(text, length) });
export const strong = (text: Text): Part => ({ kind: 'strong', text });
export const quiet = (text: Text): Part => ({ kind: 'quiet', text });
/** Hashes and codes, in a font of equal widths. */
export const code = (text: string): Part => ({ kind: 'code', text });
export const mark = (standing: Standing, label: string): Part => ({ kind: 'mark', standing, label });
export const dash = (polarization: Polarization): Part => ({ kind: 'dash', polarization });
export const BREAK: Part = { kind: 'break' };

/** Texts with a separator between them. */
export const joined = (texts: readonly Text[], separator: string): Text =>
  texts.map((text, i) => (i === 0 ? text : [separator, text]));

export interface Column {
  readonly head: Text;
  /** Share of the table's width on paper; a screen fits columns to what they hold. */
  readonly width: number;
  /** Numbers: aligned right, never broken. */
  readonly isNumber?: boolean;
  /** Never broken. */
  readonly isWhole?: boolean;
  readonly isStrong?: boolean;
}

/** Kinds of tables that are laid out in their own way. */
export type TableKind = 'points' | 'findings' | 'bands' | 'narrow' | 'plain';

export interface Fact {
  readonly term: string;
  readonly value: Text;
  /** Takes the whole width. */
  readonly isWide?: boolean;
}

/** One part of a level, as a bar. */
export interface ShareRow {
  readonly text: Text;
  readonly levelDbuvPerM: number;
  /** A path of the contributor above it. */
  readonly isPath: boolean;
}

/** What one reading is made of. */
export interface ShareGroup {
  readonly title: string;
  readonly remark: string;
  readonly levelDbuvPerM: number;
  /** Level of a full bar. */
  readonly topDbuvPerM: number;
  readonly rows: readonly ShareRow[];
  /** Contributors that are not listed. */
  readonly left: number;
}

export type Block =
  | { readonly kind: 'heading'; readonly text: Text }
  /** `lead` stays with what follows. */
  | { readonly kind: 'paragraph'; readonly text: Text; readonly style?: 'note' | 'lead' }
  | { readonly kind: 'facts'; readonly facts: readonly Fact[] }
  | {
      readonly kind: 'table';
      readonly table: TableKind;
      readonly columns: readonly Column[];
      readonly rows: readonly (readonly Text[])[];
    }
  | { readonly kind: 'list'; readonly items: readonly Text[]; readonly isNumbered?: boolean }
  /** Pictures one under the other, then the key. */
  | { readonly kind: 'figure'; readonly pictures: readonly Markup[]; readonly captions: readonly Text[] }
  | { readonly kind: 'shares'; readonly groups: readonly ShareGroup[] }
  /** Stays on one page. */
  | { readonly kind: 'together'; readonly blocks: readonly Block[] }
  | { readonly kind: 'side by side'; readonly columns: readonly (readonly Block[])[] };

export interface Section {
  readonly title: string;
  readonly blocks: readonly Block[];
  /** Stays on one page. */
  readonly isKept?: boolean;
  readonly className?: 'cautions';
}

export const heading = (...text: readonly Text[]): Block => ({ kind: 'heading', text });
export const paragraph = (...text: readonly Text[]): Block => ({ kind: 'paragraph', text });
export const note = (...text: readonly Text[]): Block => ({ kind: 'paragraph', text, style: 'note' });
export const lead = (...text: readonly Text[]): Block => ({ kind: 'paragraph', text, style: 'lead' });
export const list = (items: readonly Text[]): Block => ({ kind: 'list', items });
export const table = (
  columns: readonly Column[],
  rows: readonly (readonly Text[])[],
  kind: TableKind = 'plain',
): Block => ({ kind: 'table', table: kind, columns, rows });
