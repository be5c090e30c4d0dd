/**
 * Input deck of NEC-2 (cards GW, GE, GN, LD, EX, FR, NE) for Debian's nec2c.
 * Card formats: G. J. Burke, A. J. Poggio, Numerical Electromagnetics Code (NEC), part III: user's guide, 1981.
 */

export type NecPointM = readonly [xM: number, yM: number, zM: number];

/** Straight wire of equal segments; segments count from 1 at `fromM`. Ends within 1e-3 segment of another end are joined. */
export interface NecWire {
  readonly tag: number;
  readonly segments: number;
  readonly fromM: NecPointM;
  readonly toM: NecPointM;
  readonly radiusM: number;
}

/** Voltage source in a segment, in series with the segment's load; peak phasor, + side towards the wire's `toM`. */
interface NecSource {
  readonly tag: number;
  readonly segment: number;
  readonly voltageRe: number;
  readonly voltageIm?: number;
}

/** Lumped impedance in a segment. Two loads on one segment add. */
interface NecLoad {
  readonly tag: number;
  readonly segment: number;
  readonly resistanceOhm: number;
  readonly reactanceOhm?: number;
}

/** Points firstM + (i, j, k)·stepM, i < counts[0] and so on; i runs fastest in results, then j, then k. */
export interface NecGrid {
  readonly firstM: NecPointM;
  readonly stepM: NecPointM;
  readonly counts: readonly [nx: number, ny: number, nz: number];
}

export interface NecDeck {
  readonly wires: readonly NecWire[];
  /** 'perfect': perfectly conducting plane z = 0 (all wires and observers at z ≥ 0). */
  readonly ground: 'perfect' | 'none';
  readonly sources: readonly NecSource[];
  readonly loads?: readonly NecLoad[];
  readonly frequenciesHz: readonly number[];
  /** Where the near electric field is wanted. */
  readonly grids?: readonly NecGrid[];
}

/** A grid of one point. */
export const necPoint = (pointM: NecPointM): NecGrid => ({ firstM: pointM, stepM: [0, 0, 0], counts: [1, 1, 1] });

/** A vertical column of observers at azimuth `angleRad` (from +x) and distance `radiusM` from the z axis. */
export const necColumn = (
  radiusM: number,
  angleRad: number,
  lowestM: number,
  stepM: number,
  count: number,
): NecGrid => ({
  firstM: [radiusM * Math.cos(angleRad), radiusM * Math.sin(angleRad), lowestM],
  stepM: [0, 0, stepM],
  counts: [1, 1, count],
});

const necWireLengthM = ({ fromM, toM }: NecWire): number =>
  Math.hypot(toM[0] - fromM[0], toM[1] - fromM[1], toM[2] - fromM[2]);

/**
 * Text of the deck. Throws when a wire breaks the thin-wire rules of the user's guide, section on wire modelling:
 * segment at most λ/10, at least two radii; wires and observers above the ground.
 */
export function necDeckText(deck: NecDeck): string {
  for (const wire of deck.wires) checkWire(wire, deck);
  const lines = ['CM quietboard reference model', 'CE'];
  for (const { tag, segments, fromM, toM, radiusM } of deck.wires) {
    lines.push(card('GW', tag, segments, ...fromM, ...toM, radiusM));
  }
  lines.push(deck.ground === 'perfect' ? 'GE 1' : 'GE 0');
  if (deck.ground === 'perfect') lines.push('GN 1');
  for (const { tag, segment, resistanceOhm, reactanceOhm = 0 } of deck.loads ?? []) {
    lines.push(card('LD', 4, tag, segment, segment, resistanceOhm, reactanceOhm));
  }
  for (const { tag, segment, voltageRe, voltageIm = 0 } of deck.sources) {
    lines.push(card('EX', 0, tag, segment, 0, voltageRe, voltageIm));
  }
  for (const frequencyHz of deck.frequenciesHz) {
    lines.push(card('FR', 0, 1, 0, 0, frequencyHz / 1e6, 0));
    // One NE card an execution: with several frequencies on one FR card NEC keeps the last NE card only.
    for (const { firstM, stepM, counts } of deck.grids ?? []) lines.push(card('NE', 0, ...counts, ...firstM, ...stepM));
    if ((deck.grids ?? []).length === 0) lines.push('XQ');
  }
  lines.push('EN');
  return `${lines.join('\n')}\n`;
}

/** Nine digits: nec2c reads lines of at most 132 characters. */
const card = (name: string, ...values: number[]): string =>
  `${name} ${values.map((value) => String(Number(value.toPrecision(9)))).join(' ')}`;

function checkWire(wire: NecWire, deck: NecDeck): void {
  const segmentM = necWireLengthM(wire) / wire.segments;
  const shortestWavelengthM = 299_792_458 / Math.max(...deck.frequenciesHz);
  const refuse = (why: string): never => {
    throw new Error(`NEC wire ${wire.tag}: ${why}`);
  };
  if (!(segmentM >= 2 * wire.radiusM))
    refuse(`segment of ${segmentM} m is shorter than two radii of ${wire.radiusM} m`);
  if (!(segmentM <= shortestWavelengthM / 10))
    refuse(`segment of ${segmentM} m is longer than a tenth of a wavelength`);
  if (deck.ground === 'perfect' && Math.min(wire.fromM[2], wire.toM[2]) < 0) refuse('below the ground plane');
}
