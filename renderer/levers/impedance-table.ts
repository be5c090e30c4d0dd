/** Impedance at a connector over frequency: [MHz, R ohm, X ohm] rows, rising in frequency. */
export type ImpedanceRow = [frequencyMhz: number, resistanceOhm: number, reactanceOhm: number];

/** What data sheets of ferrites state. */
export const FERRITE_MHZ = [25, 100, 300] as const;

export const impedanceText = (rows: readonly ImpedanceRow[]): string => rows.map((row) => row.join(' ')).join('\n');

/** The rows of a pasted table, or what must be typed instead. Cells are parted by spaces, tabs, semicolons or commas. */
export function parseImpedance(text: string): ImpedanceRow[] | string {
  const lines = text.split('\n').filter((line) => line.trim() !== '');
  const rows: ImpedanceRow[] = [];
  for (const [i, line] of lines.entries()) {
    const cells = line
      .trim()
      .split(/[\s;,]+/)
      .map(Number);
    const where = `Line ${i + 1}`;
    const [mhz, ohm, reactanceOhm] = cells;
    if (cells.length !== 3 || !cells.every(Number.isFinite)) {
      return `${where} must be three numbers (MHz, R, X in Ω), for example "100 120 45"; it is "${line.trim().slice(0, 40)}"`;
    }
    if (mhz! <= (rows.at(-1)?.[0] ?? 0)) return `${where} must have a higher frequency than the line before`;
    if (ohm! < 0) return `${where} must have a resistance of at least 0`;
    rows.push([mhz!, ohm!, reactanceOhm!]);
  }
  return rows.length === 0 ? 'Must be at least one line of MHz, R and X' : rows;
}
