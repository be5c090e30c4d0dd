/**
 * SQLite keeps UTF-8, which has no place for half a surrogate pair; a name from a JSON file may hold one. Such texts (and
 * those that look like it) are kept as a mark and their JSON, all others as they are: equal texts stay equal.
 */
const MARK = '\u0001json:';

export function toColumn(text: string): string {
  return /\p{Surrogate}/u.test(text) || text.startsWith(MARK) ? `${MARK}${JSON.stringify(text)}` : text;
}

export function fromColumn(column: string): string {
  return column.startsWith(MARK) ? (JSON.parse(column.slice(MARK.length)) as string) : column;
}
