import { LEVEL_COLOURS } from './figures/level-colours.ts';

/**
 * Colours of the report by what they are for, on a light and on a dark page. Categories are Okabe–Ito; `s0` … `s15` are the
 * sequential map, reversed on a dark page, so that the strongest stands out most on both.
 */

const levels = (colours: readonly string[]): [string, string][] => colours.map((colour, i) => [`s${i}`, colour]);

export const LIGHT: ReadonlyMap<string, string> = new Map([
  ['paper', '#fff'],
  ['ink', '#16191d'],
  ['quiet', '#5c646d'],
  ['hair', '#c9ced4'],
  ['grid', '#e3e6ea'],
  ['plane', '#ececec'],
  ['copper', '#bfc3c8'],
  ['over', '#d55e00'],
  ['short', '#b87700'],
  ['short-fill', '#e69f00'],
  ['h', '#0072b2'],
  ['v', '#009e73'],
  ['loop', '#a3457a'],
  ['bar', '#5a6570'],
  ['bar-path', '#9aa3ad'],
  ['bar-back', '#eef0f2'],
  ...levels(LEVEL_COLOURS),
]);

export const DARK: ReadonlyMap<string, string> = new Map([
  ['paper', '#14171a'],
  ['ink', '#e4e7ea'],
  ['quiet', '#98a1ab'],
  ['hair', '#3d444c'],
  ['grid', '#272c32'],
  ['plane', '#22272c'],
  ['copper', '#4a525b'],
  ['over', '#ff8a3c'],
  ['short', '#e69f00'],
  ['short-fill', '#e69f00'],
  ['h', '#56b4e9'],
  ['v', '#2fc79b'],
  ['loop', '#d995ba'],
  ['bar', '#aab3bd'],
  ['bar-path', '#6c7681'],
  ['bar-back', '#23282d'],
  ...levels(LEVEL_COLOURS.toReversed()),
]);
