/**
 * Colours of a sequential map, weakest first, for a light page; a dark page takes them in reverse order, so that the strongest
 * always stands out most. Points of a helix in CIELAB (D65): lightness L* = 96 … 18 and hue h = 100° … −60° both linear,
 * chroma 30, rounded to 8 bits. Every step is equally large (ΔE*ab ≈ 7.6), and lightness alone orders them in grey.
 */
export const LEVEL_COLOURS: readonly string[] = [
  '#fff5ba',
  '#fbe2ab',
  '#f5d09f',
  '#eebf94',
  '#e5ad8c',
  '#dc9c85',
  '#d08c7f',
  '#c37d7a',
  '#b56e76',
  '#a56172',
  '#94546f',
  '#81496a',
  '#6e3f66',
  '#593660',
  '#432e59',
  '#2b2652',
];

/** Decibels of one colour. */
export const LEVEL_STEP_DB = 2.5;

/** Classes `s0` … `s15` fill with the colours; the stroke closes the seams between neighbouring shapes. */
export const LEVEL_STYLES = `${LEVEL_COLOURS.map((_, i) => `.s${i}{fill:var(--s${i});stroke:var(--s${i})}`).join('')}
.cells path{stroke-width:.05}.colour-bar rect{stroke-width:.3}`;
