/** All items of a list share one column. */
const ITEM = '[]';

interface Column {
  readonly children: Map<string, Column>;
  /** By first appearance of a number; −1 before it. */
  index: number;
}

const newColumn = (): Column => ({ children: new Map(), index: -1 });

function childOf(column: Column, key: string): Column {
  let child = column.children.get(key);
  if (child === undefined) {
    child = newColumn();
    column.children.set(key, child);
  }
  return child;
}

/**
 * Gives every number of JSON-like data to `visit`, with its column, and puts the answer in its place. A column is a path
 * without list indices (`points[].frequencyHz`), so that numbers of one kind come together; columns count by first
 * appearance. The order of the walk follows from the data alone. Keys with `undefined` are left out.
 */
export function replaceNumbers(value: unknown, visit: (number: number, column: number) => number): unknown {
  let columns = 0;
  const walk = (item: unknown, column: Column): unknown => {
    if (typeof item === 'number') {
      if (column.index < 0) column.index = columns++;
      return visit(item, column.index);
    }
    if (typeof item !== 'object' || item === null) return item;
    if (Array.isArray(item)) {
      const child = childOf(column, ITEM);
      return item.map((entry) => walk(entry, child));
    }
    const copy: Record<string, unknown> = {};
    for (const key of Object.keys(item)) {
      const entry = (item as Record<string, unknown>)[key];
      if (entry === undefined) continue;
      const replaced = walk(entry, childOf(column, `.${key}`));
      // Assigning to "__proto__" would set the prototype.
      if (key === '__proto__') Object.defineProperty(copy, key, { value: replaced, ...OWN });
      else copy[key] = replaced;
    }
    return copy;
  };
  return walk(value, newColumn());
}

const OWN = { enumerable: true, configurable: true, writable: true };
