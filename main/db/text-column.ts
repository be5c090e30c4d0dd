import { DamagedDocument } from './damaged-document.ts';

/**
 * SQLite keeps UTF-8, which has no place for half a surrogate pair; a name from a JSON file may hold one. Such texts (and
 * those that look like it) are kept as a mark and their JSON, all others as they are: equal texts stay equal.
 */
const MARK = '\u0001json:';

export function toColumn(text: string): string {
  return /\p{Surrogate}/u.test(text) || text.startsWith(MARK) ? `${MARK}${JSON.stringify(text)}` : text;
}

/** Throws `DamagedDocument`. */
export function fromColumn(column: string): string {
  if (!column.startsWith(MARK)) return column;
  return jsonOfColumn(column.slice(MARK.length)) as string;
}

/** JSON kept in a column. Throws `DamagedDocument`. */
export function jsonOfColumn(text: string): unknown {
  try {
    return JSON.parse(text) as unknown;
  } catch (error) {
    throw new DamagedDocument('a text has changed bytes', { cause: error });
  }
}

/** A row as its table promises it: a damaged page may give nulls where none can be. Throws `DamagedDocument`. */
export function soundRow<Row extends object>(row: Row, nullable: readonly (keyof Row)[] = []): Row {
  for (const [column, value] of Object.entries(row)) {
    if (value === null && !nullable.includes(column as keyof Row)) throw new DamagedDocument(`${column} is missing`);
  }
  return row;
}
