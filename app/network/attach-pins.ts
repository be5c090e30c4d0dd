import type { Pin, PointM } from '../board/board.ts';
import type { Copper } from './copper.ts';
import type { LooseEnds } from './loose-ends.ts';

/** A trace may end inside a pad, this far from the pin's centre, m. */
export const PAD_REACH_M = 0.6e-3;

/** Pins with the point of the copper each was joined to. */
export type PinPoints = Map<Pin, number>;

/**
 * Joins pins to the copper of their layer: to a trace that passes under the pin (within half its width), and to every
 * loose end within 0.6 mm that has no nearer pin and is not connected to it yet; several such ends meet at the pin's centre.
 */
export function attachPinsToTraces(copper: Copper, looseEnds: LooseEnds, pins: readonly Pin[]): PinPoints {
  const points: PinPoints = new Map();
  for (const pin of pins) {
    const point = nearestCopper(copper, pin, 0);
    if (point === null) continue;
    looseEnds.settle(point);
    points.set(pin, point);
  }
  for (const [pin, ends] of looseEndsByPin(copper, looseEnds, pins)) {
    const known = points.get(pin);
    const parts = new Set(known === undefined ? [] : [copper.partOf(known)]);
    const meeting = ends.filter((end) => {
      const isNew = !parts.has(copper.partOf(end));
      parts.add(copper.partOf(end));
      return isNew;
    });
    if (meeting.length === 0) continue;
    const isAlone = known === undefined && meeting.length === 1;
    const point = known ?? (isAlone ? meeting[0]! : copper.addPoint(pin.atM, pin.layerIndex, 'pad'));
    for (const end of meeting) looseEnds.join(end, point);
    points.set(pin, point);
  }
  return points;
}

/** Joins pins that are still without copper to the nearest within 0.6 mm. */
export function attachRemainingPins(copper: Copper, pins: readonly Pin[], points: PinPoints): void {
  for (const pin of pins) {
    if (points.has(pin)) continue;
    const point = nearestCopper(copper, pin, PAD_REACH_M);
    if (point !== null) points.set(pin, point);
  }
}

export const distanceM = (a: PointM, b: PointM): number => Math.hypot(a[0] - b[0], a[1] - b[1]);

function nearestCopper(copper: Copper, { atM, layerIndex }: Pin, leastReachM: number): number | null {
  const [nearest] = copper.landings(atM, layerIndex, leastReachM);
  return nearest ? copper.stopAt(nearest, copper.pieces[nearest.piece]!.widthM / 2) : null;
}

/** Loose ends of every pin that is the nearest of their layer, nearest first. */
function looseEndsByPin(copper: Copper, looseEnds: LooseEnds, pins: readonly Pin[]): Map<Pin, number[]> {
  const grid = new PinGrid(pins);
  const found = new Map<Pin, number[]>();
  for (const [end] of looseEnds) {
    const { atM, layerIndex } = copper.points[end]!;
    const pin = grid.nearest(atM, layerIndex);
    if (!pin) continue;
    const ends = found.get(pin);
    if (ends) ends.push(end);
    else found.set(pin, [end]);
  }
  const awayM = (pin: Pin, end: number) => distanceM(pin.atM, copper.points[end]!.atM);
  for (const [pin, ends] of found) ends.sort((one, other) => awayM(pin, one) - awayM(pin, other) || one - other);
  return found;
}

/** Pins by square cells as wide as a pad reaches. */
export class PinGrid {
  readonly #cells = new Map<string, Pin[]>();

  constructor(pins: readonly Pin[]) {
    for (const pin of pins) {
      const key = cellKey(pin.layerIndex, Math.floor(pin.atM[0] / PAD_REACH_M), Math.floor(pin.atM[1] / PAD_REACH_M));
      const cell = this.#cells.get(key);
      if (cell) cell.push(pin);
      else this.#cells.set(key, [pin]);
    }
  }

  /** The pin of a layer nearest to a place, within a pad's reach. */
  nearest(atM: PointM, layerIndex: number): Pin | null {
    const column = Math.floor(atM[0] / PAD_REACH_M);
    const row = Math.floor(atM[1] / PAD_REACH_M);
    let best: Pin | null = null;
    let leastM = PAD_REACH_M;
    for (let i = -1; i <= 1; i++) {
      for (let j = -1; j <= 1; j++) {
        for (const pin of this.#cells.get(cellKey(layerIndex, column + i, row + j)) ?? []) {
          const awayM = distanceM(pin.atM, atM);
          if (awayM > leastM || (best && awayM === leastM)) continue;
          best = pin;
          leastM = awayM;
        }
      }
    }
    return best;
  }
}

const cellKey = (layerIndex: number, column: number, row: number): string => `${layerIndex} ${column} ${row}`;
