/** Gzip, ZIP, Zstandard and 7z by their first bytes. */
export function isArchive(head: Buffer): boolean {
  const magic = head.subarray(0, 4).toString('hex');
  return magic.startsWith('1f8b') || ['504b0304', '28b52ffd', '377abcaf'].includes(magic);
}

/** Encoding of an XML file by byte-order mark, else by its declaration, else UTF-8; undefined when it is unknown. */
export function encodingOf(head: Buffer): string | undefined {
  if (head[0] === 0xff && head[1] === 0xfe) return 'utf-16le';
  if (head[0] === 0xfe && head[1] === 0xff) return 'utf-16be';
  if (head[0] === 0xef && head[1] === 0xbb) return 'utf-8';
  const declared = /^<\?xml[^>]{0,200}?encoding\s*=\s*["']([\w.:-]+)["']/.exec(
    head.subarray(0, 300).toString('latin1'),
  );
  if (declared === null) return 'utf-8';
  try {
    return new TextDecoder(declared[1]).encoding;
  } catch (error) {
    if (error instanceof RangeError) return undefined;
    throw error;
  }
}

/** Local name of the first element, or of the one a document type announces; undefined when the text is no XML. */
export function rootElementName(head: string): string | undefined {
  let rest = head.replace(/^\uFEFF/, '').trimStart();
  while (rest.startsWith('<?') || rest.startsWith('<!--')) {
    const close = rest.startsWith('<?') ? '?>' : '-->';
    const end = rest.indexOf(close);
    if (end < 0) return undefined;
    rest = rest.slice(end + close.length).trimStart();
  }
  const name = /^<(?:!DOCTYPE\s+)?([A-Za-z_][\w.:-]*)/.exec(rest)?.[1];
  return name?.slice(name.lastIndexOf(':') + 1);
}
