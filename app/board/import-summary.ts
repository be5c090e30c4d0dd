/**
 * What an import found, exactly as printed by `import --json`. Lengths in millimetres, like the board file.
 *
 * Counting rules: a segment is one straight copper piece and an arc one curved piece, both on a copper layer and with
 * a net; a via is one distinct (x, y, diameter) of a hole drilled as a via; nets are the names on drawn features; the
 * board's size is the bounding box of the outline's vertices.
 */
export interface ImportSummary {
  readonly format: 'quietboard-import';
  readonly source: ImportSource;
  readonly copperLayers: number;
  readonly nets: number;
  readonly netsWithTraces: number;
  readonly segments: number;
  readonly arcs: number;
  readonly vias: number;
  readonly components: number;
  readonly boardMm: readonly [widthMm: number, heightMm: number];
  readonly traceLengthMm: number;
  /** Nets that have traces, longest first; ties by name. */
  readonly netLengths: readonly NetLength[];
  readonly findings: readonly ImportFinding[];
}

interface ImportSource {
  readonly format: string;
  /** As written in the file; empty when it states none. */
  readonly revision: string;
  readonly units: string;
}

export interface NetLength {
  readonly name: string;
  readonly lengthMm: number;
}

/** Something the reader guessed, left out or repaired: never silence. */
export interface ImportFinding {
  /** Stable kebab-case code. */
  readonly code: string;
  readonly message: string;
  /** How many things it concerns, at least 1. */
  readonly count: number;
}
