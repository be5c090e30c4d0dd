/** Attributes of one element by name. The object has no prototype, so a name like `__proto__` is only a name. */
export type Attributes = Readonly<Record<string, string | undefined>>;

/** Content that breaks the format. Whoever reads the file adds its name and the line. */
export class ContentError extends Error {
  override readonly name = 'ContentError';
}

/** Numbers beyond this are no board in any of the units (10 m in microns), and would overflow when squared. */
const LARGEST_NUMBER = 1e7;
/** Leaves room for `component.pin` in the board file, whose names hold 1000 characters. */
const LONGEST_NAME = 400;
const NUMBER = /^\s*[+-]?(?:\d+\.?\d*|\.\d+)(?:[eE][+-]?\d+)?\s*$/;

/** A number that must be there. Throws ContentError with element and attribute. */
export function numberAttribute(element: string, attributes: Attributes, name: string): number {
  const text = attributes[name];
  if (text === undefined) throw new ContentError(`${element} ${name} must be a number; it is missing`);
  const value = NUMBER.test(text) ? Number(text) : Number.NaN;
  if (!Number.isFinite(value)) {
    throw new ContentError(`${element} ${name} must be a finite number; received ${shown(text)}`);
  }
  if (Math.abs(value) > LARGEST_NUMBER) {
    throw new ContentError(`${element} ${name} must lie within ±${LARGEST_NUMBER}; received ${shown(text)}`);
  }
  return value;
}

/** A number that may be absent or empty; anything else must be finite. */
export function optionalNumber(element: string, attributes: Attributes, name: string): number | undefined {
  const text = attributes[name];
  return text === undefined || text.trim() === '' ? undefined : numberAttribute(element, attributes, name);
}

/** A size that must not be negative. */
export function sizeAttribute(element: string, attributes: Attributes, name: string): number {
  const value = numberAttribute(element, attributes, name);
  if (value < 0) throw new ContentError(`${element} ${name} must not be negative; received ${value}`);
  return value;
}

/** XML Schema boolean, and the upper-case words of revision A. */
export function booleanAttribute(attributes: Attributes, name: string, otherwise: boolean): boolean {
  const text = attributes[name]?.trim().toLowerCase();
  if (text === 'true' || text === '1') return true;
  if (text === 'false' || text === '0') return false;
  return otherwise;
}

/** An enumeration word in upper case; empty when absent. */
export const wordAttribute = (attributes: Attributes, name: string): string =>
  attributes[name]?.trim().toUpperCase() ?? '';

const shown = (text: string): string => {
  const quoted = JSON.stringify(text);
  return quoted.length > 60 ? `${quoted.slice(0, 57)}…` : quoted;
};

/**
 * Keeps one copy of every name. A name cut out of a chunk of the file would keep the whole chunk in memory, so the
 * first one is copied.
 */
export class Names {
  private readonly known = new Map<string, string>();

  /** The name in an attribute; undefined when absent or empty. Throws ContentError on an endless one. */
  read(element: string, attributes: Attributes, name: string): string | undefined {
    const text = attributes[name];
    if (text === undefined || text === '') return undefined;
    const kept = this.known.get(text);
    if (kept !== undefined) return kept;
    if (text.length > LONGEST_NAME) {
      throw new ContentError(`${element} ${name} must have at most ${LONGEST_NAME} characters; it has ${text.length}`);
    }
    const copy = Buffer.from(text, 'utf8').toString('utf8');
    this.known.set(copy, copy);
    return copy;
  }

  /** Like `read`, but the words that stand for "no net" count as absent. */
  readNet(element: string, attributes: Attributes): string | undefined {
    const net = this.read(element, attributes, 'net');
    return net === undefined || net.trim() === '' || net.toLowerCase() === 'no net' ? undefined : net;
  }
}
