import type { NecDeck } from './nec2c-deck.ts';

export interface NecComplex {
  readonly re: number;
  readonly im: number;
}

interface NecCurrent {
  readonly tag: number;
  /** Counts from 1 within the tag. */
  readonly segment: number;
  /** At the segment's centre, positive from the wire's `fromM` to its `toM`. */
  readonly currentA: NecComplex;
}

interface NecSourceResult {
  readonly tag: number;
  /** Counts from 1 over the whole model. */
  readonly absoluteSegment: number;
  readonly voltageV: NecComplex;
  readonly currentA: NecComplex;
  /** V/I of the source, the load of its own segment included. */
  readonly impedanceOhm: NecComplex;
}

export interface NecFrequencyResult {
  readonly frequencyHz: number;
  readonly sources: readonly NecSourceResult[];
  readonly currents: readonly NecCurrent[];
  readonly inputPowerW: number;
  /** Input power less the loads' loss. */
  readonly radiatedPowerW: number;
  /** [grid][point][x, y, z], V/m, in the order of `NecGrid`. */
  readonly electricVPerM: readonly (readonly (readonly [NecComplex, NecComplex, NecComplex])[])[];
}

/**
 * Reads nec2c's listing. Numbers are printed with five digits (0.001 dB); printed coordinates are coarser, so observers
 * are taken by order. Throws when a table is missing, short or holds anything but finite numbers.
 */
export function parseNecOutput(text: string, deck: NecDeck): NecFrequencyResult[] {
  const blocks = text.split(/^ *-+ FREQUENCY -+ *$/m).slice(1);
  if (blocks.length !== deck.frequenciesHz.length) {
    throw new Error(
      `nec2c answered ${blocks.length} of ${deck.frequenciesHz.length} frequencies:\n${text.slice(-2000)}`,
    );
  }
  return blocks.map((block, index) => parseBlock(block, deck.frequenciesHz[index]!, deck));
}

function parseBlock(block: string, frequencyHz: number, deck: NecDeck): NecFrequencyResult {
  const sources = table(block, 'ANTENNA INPUT PARAMETERS', 3, 11).map((row) => ({
    tag: row[0]!,
    absoluteSegment: row[1]!,
    voltageV: { re: row[2]!, im: row[3]! },
    currentA: { re: row[4]!, im: row[5]! },
    impedanceOhm: { re: row[6]!, im: row[7]! },
  }));
  const currents = readCurrents(block);
  const segments = deck.wires.reduce((sum, wire) => sum + wire.segments, 0);
  expectCount('currents', currents.length, segments);
  expectCount('sources', sources.length, deck.sources.length);
  const grids = deck.grids ?? [];
  const fieldTexts = block.split(/-+ NEAR ELECTRIC FIELDS -+/).slice(1);
  expectCount('near-field tables', fieldTexts.length, grids.length);
  const electricVPerM = fieldTexts.map((fieldText, gridIndex) => {
    const rows = readRows(fieldText.split('\n').slice(4), 9);
    expectCount(
      'near-field points',
      rows.length,
      grids[gridIndex]!.counts.reduce((product, count) => product * count, 1),
    );
    return rows.map((row) => [polar(row[3]!, row[4]!), polar(row[5]!, row[6]!), polar(row[7]!, row[8]!)] as const);
  });
  const inputPowerW = power(block, 'INPUT POWER');
  return { frequencyHz, sources, currents, inputPowerW, radiatedPowerW: power(block, 'RADIATED POWER'), electricVPerM };
}

function readCurrents(block: string): NecCurrent[] {
  const segmentOfTag = new Map<number, number>();
  return table(block, 'CURRENTS AND LOCATION', 5, 10).map((row) => {
    const tag = row[1]!;
    const segment = (segmentOfTag.get(tag) ?? 0) + 1;
    segmentOfTag.set(tag, segment);
    return { tag, segment, currentA: { re: row[6]!, im: row[7]! } };
  });
}

/** Rows of the table under a heading; `skip` lines lie between the heading's line and the first row. */
function table(block: string, heading: string, skip: number, columns: number): number[][] {
  const at = block.indexOf(heading);
  if (at < 0) throw new Error(`nec2c printed no "${heading}":\n${block.slice(-2000)}`);
  return readRows(block.slice(at).split('\n').slice(skip), columns);
}

/** Numbers of consecutive lines, up to the first empty line or other text. */
function readRows(lines: readonly string[], columns: number): number[][] {
  const rows: number[][] = [];
  for (const line of lines) {
    const words = line.trim().split(/\s+/);
    // A new card's echo or a heading ends the table; a row that starts like a number must be one.
    if (!/^[-+.\dni]/.test(words[0]!)) break;
    const row = words.map(Number);
    if (row.length !== columns || !row.every(Number.isFinite))
      throw new Error(`nec2c printed an unreadable row: ${line}`);
    rows.push(row);
  }
  return rows;
}

function power(block: string, name: string): number {
  const watts = Number(new RegExp(`${name} *= *(\\S+) Watts`).exec(block)?.[1]);
  if (!Number.isFinite(watts)) throw new Error(`nec2c printed no finite ${name}`);
  return watts;
}

function expectCount(what: string, count: number, expected: number): void {
  if (count !== expected) throw new Error(`nec2c printed ${count} ${what} instead of ${expected}`);
}

const polar = (magnitude: number, angleDeg: number): NecComplex => ({
  re: magnitude * Math.cos((angleDeg * Math.PI) / 180),
  im: magnitude * Math.sin((angleDeg * Math.PI) / 180),
});
