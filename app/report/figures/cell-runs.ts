/** Rectangle of equal cells on the grid, in cells. */
export interface CellRun {
  readonly column: number;
  readonly row: number;
  readonly width: number;
  readonly height: number;
}

interface PlacedCell {
  readonly column: number;
  readonly row: number;
  readonly step: number;
}

/**
 * Gathers the cells of each colour step into rectangles: neighbours in a row become a run, equal runs of following rows one
 * rectangle. Every cell lies in exactly one rectangle. Where two cells have one place, the last counts.
 */
export function cellRuns(cells: readonly PlacedCell[]): Map<number, CellRun[]> {
  const byPlace = new Map(cells.map((cell) => [`${cell.column} ${cell.row}`, cell]));
  const ordered = [...byPlace.values()].sort((one, other) => one.row - other.row || one.column - other.column);
  const runs = new Map<number, (CellRun & { height: number })[]>();
  // Runs that ended in the row before, by place, width and step: they may grow.
  let above = new Map<string, CellRun & { height: number }>();
  let current = new Map<string, CellRun & { height: number }>();
  let rowNumber = Number.NaN;
  for (let i = 0; i < ordered.length; ) {
    const { column, row, step } = ordered[i]!;
    let width = 1;
    while (isNext(ordered[i + width], column + width, row, step)) width++;
    i += width;
    if (row !== rowNumber) {
      above = row === rowNumber + 1 ? current : new Map();
      current = new Map();
      rowNumber = row;
    }
    const key = `${column} ${width} ${step}`;
    let run = above.get(key);
    if (run) run.height++;
    else {
      run = { column, row, width, height: 1 };
      const own = runs.get(step);
      if (own) own.push(run);
      else runs.set(step, [run]);
    }
    current.set(key, run);
  }
  return new Map([...runs].sort(([one], [other]) => one - other));
}

const isNext = (cell: PlacedCell | undefined, column: number, row: number, step: number): boolean =>
  cell?.column === column && cell.row === row && cell.step === step;
