import type { Mechanism } from './mechanisms.ts';
import type { RadiatingLine, Radiation } from './radiation.ts';

/** A stretch of the spectrum in which one mechanism is the strongest, or nearly so. */
export interface RulingBand {
  readonly mechanism: Mechanism;
  /** Its ends for a reader: round numbers between (or within 0.5 % of) the last line of one band and the first of the next. */
  readonly fromHz: number;
  readonly toHz: number;
  readonly lines: readonly RadiatingLine[];
  /** Lines at which the mechanism is the strongest. */
  readonly ruledCount: number;
}

/** Steps of the frequency axis, an octave; in each only the strongest line of every mechanism is looked at. */
const STEPS_PER_OCTAVE = 6;
/** A change of mechanism must win more than this, summed over the steps: brief or slight changes make no band. */
const CHANGE_COST_DB = 6;
/** More than this below the strongest counts as this much: one deep null must not decide. */
const MOST_DEFICIT_DB = 40;

interface Step {
  readonly lines: readonly RadiatingLine[];
  /** How far each mechanism stays below the strongest, dB. */
  readonly deficitDb: readonly number[];
}

/**
 * Divides the spectrum into bands with one mechanism each: the division with the least sum of (deficit against the strongest
 * mechanism, by steps) + (a fixed cost for each change), found by dynamic programming (A. Viterbi 1967). Then each edge
 * moves to the line where the change comes.
 */
export function rulingBands({ lines, mechanisms }: Radiation): RulingBand[] {
  const steps = stepsOf(lines, mechanisms);
  const stretches: Stretch[] = [];
  for (const [i, index] of cheapestPath(steps, mechanisms.length).entries()) {
    const mechanism = mechanisms[index]!;
    const last = stretches.at(-1);
    if (last?.mechanism === mechanism) last.steps.push(steps[i]!.lines);
    else stretches.push({ mechanism, steps: [steps[i]!.lines] });
  }
  for (const [i, after] of stretches.slice(1).entries()) moveEdge(stretches[i]!, after);
  const bands = stretches.map(({ mechanism, steps }) => ({ mechanism, lines: steps.flat() }));
  const edgesHz = bands
    .slice(1)
    .map((band, i) => roundBetween(bands[i]!.lines.at(-1)!.frequencyHz, band.lines[0]!.frequencyHz));
  return bands.map((band, i) => ({
    ...band,
    fromHz: edgesHz[i - 1] ?? threeDigits(band.lines[0]!.frequencyHz),
    toHz: edgesHz[i] ?? threeDigits(band.lines.at(-1)!.frequencyHz),
    ruledCount: band.lines.filter(({ ruler }) => ruler === band.mechanism).length,
  }));
}

function stepsOf(lines: readonly RadiatingLine[], mechanisms: readonly Mechanism[]): Step[] {
  const groups = new Map<number, RadiatingLine[]>();
  for (const line of lines) {
    const step = Math.floor(Math.log2(line.frequencyHz) * STEPS_PER_OCTAVE);
    const group = groups.get(step);
    if (group) group.push(line);
    else groups.set(step, [line]);
  }
  return [...groups.values()].map((own) => {
    const bestDb = mechanisms.map((mechanism) =>
      own.reduce((best, { excessDb }) => Math.max(best, excessDb.get(mechanism) ?? -Infinity), -Infinity),
    );
    const topDb = Math.max(...bestDb);
    return { lines: own, deficitDb: bestDb.map((db) => Math.min(MOST_DEFICIT_DB, topDb - db)) };
  });
}

/** For each step the index of its mechanism. */
function cheapestPath(steps: readonly Step[], count: number): number[] {
  let costs = new Array<number>(count).fill(0);
  const cameFrom: number[][] = [];
  for (const { deficitDb } of steps) {
    const cheapest = costs.indexOf(Math.min(...costs));
    const changedCost = costs[cheapest]! + CHANGE_COST_DB;
    cameFrom.push(costs.map((cost, i) => (cost <= changedCost ? i : cheapest)));
    costs = costs.map((cost, i) => Math.min(cost, changedCost) + deficitDb[i]!);
  }
  const path: number[] = [];
  let index = costs.indexOf(Math.min(...costs));
  for (const from of cameFrom.toReversed()) {
    path.unshift(index);
    index = from[index]!;
  }
  return path;
}

interface Stretch {
  readonly mechanism: Mechanism;
  readonly steps: (readonly RadiatingLine[])[];
}

/** Divides the lines of the two steps at an edge anew, where the sum of the lines' own deficits is least. */
function moveEdge(before: Stretch, after: Stretch): void {
  const lines = [...before.steps.at(-1)!, ...after.steps[0]!];
  const deficitDb = ({ excessDb, ruler }: RadiatingLine, mechanism: Mechanism) =>
    Math.min(MOST_DEFICIT_DB, excessDb.get(ruler)! - (excessDb.get(mechanism) ?? -Infinity));
  let costDb = 0;
  let leastDb = Infinity;
  let split = 1;
  for (const [i, line] of lines.slice(0, -1).entries()) {
    costDb += deficitDb(line, before.mechanism) - deficitDb(line, after.mechanism);
    if (costDb >= leastDb) continue;
    leastDb = costDb;
    split = i + 1;
  }
  before.steps[before.steps.length - 1] = lines.slice(0, split);
  after.steps[0] = lines.slice(split);
}

const threeDigits = (frequencyHz: number): number => Number(frequencyHz.toPrecision(3));

/** A number of few digits between two frequencies, near their geometric mean; of three where they are too close for that. */
function roundBetween(lowHz: number, highHz: number): number {
  const middleHz = Math.sqrt(lowHz * highHz);
  for (let stepHz = 10 ** Math.floor(Math.log10(highHz)); stepHz > highHz / 1000; stepHz /= 10) {
    const rounded = Math.round(middleHz / stepHz) * stepHz;
    if (rounded > lowHz && rounded < highHz) return rounded;
  }
  return threeDigits(middleHz);
}
