import { createReadStream } from 'node:fs';
import { SaxesParser } from 'saxes';
import { fileError } from '../../../app/errors.ts';
import { fileFailure } from '../file-failure.ts';
import { type Attributes, ContentError } from './attributes.ts';

/** Reads one element. Whatever its children need is kept in the reader, not in a tree. */
export interface ElementReader {
  /** Called for each child with its local name. Returns the reader for the child's own children, or nothing to skip them. */
  child(name: string, attributes: Attributes): ElementReader | undefined;
  /** Called once at the end tag. */
  end?(): void;
}

export interface XmlOptions {
  /** Encoding label; UTF-8 when absent. */
  readonly encoding?: string;
  readonly onBytes?: (readBytes: number) => void;
}

export interface XmlResult {
  /** Chunks in which bytes did not fit the encoding: those characters were replaced. */
  readonly damagedChunks: number;
}

const CHUNK_BYTES = 256 * 1024;
const DEEPEST = 64;
const MOST_ELEMENTS = 20_000_000;
/**
 * From one start tag to the end of the next: no real element with its attributes is that long, nor a comment. It caps
 * number and length of attributes together, for an attribute without end would fill the memory.
 */
const LONGEST_GAP_BYTES = 4 * 1024 * 1024;

/**
 * Reads an XML file as a stream of elements. The only place that knows the parser.
 *
 * Strict: the first error of well-formedness ends it, and so do a document type (no real board has one, and entities
 * come that way), nesting, elements or attributes beyond any real file. Throws AppError `file` with file and line.
 */
export async function readXml(file: string, root: ElementReader, options: XmlOptions = {}): Promise<XmlResult> {
  const parser = new SaxesParser<{ xmlns: false; position: false }>({ xmlns: false, position: false });
  const handler = new ElementHandler(root);
  parser.on('error', (error) => {
    throw new ContentError(`is not well-formed XML: ${error.message}`);
  });
  parser.on('doctype', () => {
    throw new ContentError('holds a document type (DOCTYPE), which board files do not have');
  });
  parser.on('opentag', (tag) => handler.open(tag.name, tag.attributes));
  parser.on('closetag', () => handler.close());

  const decoder = new TextDecoder(options.encoding ?? 'utf-8');
  let readBytes = 0;
  let damagedChunks = 0;
  try {
    for await (const chunk of createReadStream(file, { highWaterMark: CHUNK_BYTES })) {
      const bytes = chunk as Buffer;
      readBytes += bytes.length;
      const text = decoder.decode(bytes, { stream: true });
      if (text.includes('\uFFFD')) damagedChunks++;
      parser.write(text);
      handler.checkGap(bytes.length);
      options.onBytes?.(readBytes);
    }
    parser.write(decoder.decode());
    parser.close();
  } catch (error) {
    if (error instanceof ContentError) throw fileError(file, `line ${parser.line}: ${error.message}`, { cause: error });
    throw isSystemError(error) ? fileFailure(file, 'read', error) : error;
  }
  return { damagedChunks };
}

/** A failed read of the disk; anything else is a fault of this program and passes. */
const isSystemError = (error: unknown): boolean => error instanceof Error && 'syscall' in error;

/** Hands elements to the reader on top of the stack, skipping what no reader wants. */
class ElementHandler {
  private readonly stack: ElementReader[];
  private skippedDepth = 0;
  private elements = 0;
  private gapBytes = 0;

  constructor(root: ElementReader) {
    this.stack = [root];
  }

  open(qualifiedName: string, attributes: Attributes): void {
    this.gapBytes = 0;
    if (++this.elements > MOST_ELEMENTS) throw new ContentError(`holds more than ${MOST_ELEMENTS} elements`);
    if (this.stack.length + this.skippedDepth > DEEPEST) throw new ContentError(`is nested deeper than ${DEEPEST}`);
    if (this.skippedDepth > 0) {
      this.skippedDepth++;
      return;
    }
    const name = qualifiedName.slice(qualifiedName.lastIndexOf(':') + 1);
    const reader = this.stack[this.stack.length - 1]!.child(name, attributes);
    if (reader === undefined) this.skippedDepth = 1;
    else this.stack.push(reader);
  }

  close(): void {
    if (this.skippedDepth > 0) this.skippedDepth--;
    else this.stack.pop()!.end?.();
  }

  checkGap(bytes: number): void {
    this.gapBytes += bytes;
    if (this.gapBytes > LONGEST_GAP_BYTES) throw new ContentError(`holds no element in ${LONGEST_GAP_BYTES} bytes`);
  }
}
