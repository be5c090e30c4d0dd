import { inputError } from '../errors.ts';
import { hzToMhz, mhzToHz } from '../units/convert.ts';
import { allLimitLines } from './catalogue.ts';
import { isStandard } from './limit-line.ts';

export interface UpperFrequency {
  /** Upper end of the measured range, Hz. */
  readonly maxHz: number;
  readonly rule: string;
}

/** Above the last row of every table: this many times the clock, up to the table's cap. */
const HARMONIC = 5;
/** Relative distance below which a clock counts as the one in the table: 1.705e6 Hz is not exact in MHz. */
const SAME_CLOCK = 1e-9;

/** Rows up to a clock, then the cap. */
interface Table {
  readonly name: string;
  readonly rows: readonly (readonly [upToClockMhz: number, maxMhz: number])[];
  /** A clock below this has its own, lower end; undefined where the table has no such row. */
  readonly belowMhz?: readonly [clockMhz: number, maxMhz: number];
  readonly capMhz: number;
}

const rows = [
  [108, 1000],
  [500, 2000],
  [1000, 5000],
] as const;
const CISPR_TABLE: Table = { name: 'CISPR 32 table 1 (from memory)', rows, capMhz: 6000 };
const FCC_TABLE: Table = { name: '47 CFR 15.33(b)(1)', rows, belowMhz: [1.705, 30], capMhz: 40_000 };
const ICES_TABLE: Table = { ...FCC_TABLE, name: 'ICES-003, as 47 CFR 15.33(b)(1) (from memory)' };

const TABLES: ReadonlyMap<string, Table> = new Map([
  ['CISPR 32', CISPR_TABLE],
  ['VCCI-CISPR 32', CISPR_TABLE],
  ['IEC 61000-6-3', { ...CISPR_TABLE, name: 'as CISPR 32 table 1 (from memory)' }],
  ['IEC 61000-6-4', { ...CISPR_TABLE, name: 'as CISPR 32 table 1 (from memory)' }],
  ['FCC 15.109', FCC_TABLE],
  ['ICES-003', ICES_TABLE],
]);
/** Standards whose lines held here end at 1 GHz whatever the clock. */
const TO_ONE_GHZ: ReadonlySet<string> = new Set(['CISPR 11', 'CISPR 14-1']);

/**
 * Upper end of the measured range from the highest frequency generated or used (0: no clock known, then the table's
 * widest range).
 *
 *   highest clock    up to 108 MHz   up to 500 MHz   up to 1 GHz   above
 *   measured to      1 GHz           2 GHz           5 GHz         5 × clock, at most 6 GHz (CISPR) or 40 GHz (FCC)
 *
 * FCC below 1.705 MHz: 30 MHz. CISPR 11 and CISPR 14-1: 1 GHz, where the lines held here end. A standard not known here
 * (a limit file's own) is treated as CISPR 32, in words. Throws `input` for a negative or infinite clock.
 */
export function upperFrequency(standard: string, highestClockHz: number): UpperFrequency {
  if (!(highestClockHz >= 0 && highestClockHz < Infinity)) {
    throw inputError('highest clock frequency', 'a frequency of at least 0 Hz', `${highestClockHz} Hz`);
  }
  const known = allLimitLines.find((line) => isStandard(line, standard))?.standard;
  if (known !== undefined && TO_ONE_GHZ.has(known)) {
    return { maxHz: mhzToHz(1000), rule: `${known}: the lines held here end at 1 GHz` };
  }
  const table = TABLES.get(known ?? '') ?? {
    ...CISPR_TABLE,
    name: 'no rule known for the standard; as CISPR 32 table 1',
  };
  const { maxMhz, reason } = fromTable(table, hzToMhz(highestClockHz));
  return { maxHz: mhzToHz(maxMhz), rule: `${table.name}: ${reason}` };
}

function fromTable(table: Table, clockMhz: number): { maxMhz: number; reason: string } {
  const to = (maxMhz: number) => `to ${maxMhz >= 1000 ? `${maxMhz / 1000} GHz` : `${maxMhz} MHz`}`;
  if (clockMhz === 0) return { maxMhz: table.capMhz, reason: `highest clock not known, ${to(table.capMhz)}` };
  const clock = `highest clock ${Number(clockMhz.toPrecision(6))} MHz`;
  if (table.belowMhz !== undefined && clockMhz < table.belowMhz[0] * (1 - SAME_CLOCK)) {
    const [limitMhz, maxMhz] = table.belowMhz;
    return { maxMhz, reason: `${clock} below ${limitMhz} MHz, ${to(maxMhz)}` };
  }
  const row = table.rows.find(([upToMhz]) => clockMhz <= upToMhz * (1 + SAME_CLOCK));
  if (row !== undefined) return { maxMhz: row[1], reason: `${clock} up to ${row[0]} MHz, ${to(row[1])}` };
  const maxMhz = Math.min(HARMONIC * clockMhz, table.capMhz);
  return { maxMhz, reason: `${clock} above 1 GHz, ${HARMONIC} times it but at most ${table.capMhz / 1000} GHz` };
}
