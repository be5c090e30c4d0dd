import { createHash } from 'node:crypto';
import { brotliCompressSync, brotliDecompressSync, constants } from 'node:zlib';
import { exactJson } from '../../app/project/exact-json.ts';
import { NumberPacker, NumberUnpacker } from './number-codec.ts';
import { replaceNumbers } from './number-columns.ts';

/**
 * JSON-like data as one compressed block, bit for bit:
 *
 *   0   4  "QBPJ"
 *   4   1  version, 1
 *   5   1  layout, 1: shape and numbers
 *   6  16  first bytes of the SHA-256 of all that follows
 *  22   …  brotli of: lengths of the six parts (uint32, little-endian), shape (JSON text, every number 0), codes,
 *          offsets, bases, factors, planes (see number-codec.ts; doubles little-endian)
 */
const MAGIC = Buffer.from('QBPJ');
const VERSION = 1;
const LAYOUT = 1;
const CHECK_AT = 6;
const BODY_AT = 22;
const PARTS = 6;

/** Higher levels take five times as long for 1 %. */
const QUALITY = 5;
/** No block of ours unpacks to more: a damaged one must not take all memory. */
const MOST_BYTES = 2 ** 30;

/** Throws `input` for what JSON cannot hold. */
export function packJson(value: unknown): Buffer {
  const packer = new NumberPacker();
  const shape = replaceNumbers(value, (number, column) => {
    // Refused here, as the shape no longer shows it.
    if (!Number.isFinite(number)) exactJson(value);
    packer.add(number, column);
    return 0;
  });
  const { codes, offsets, bases, factors, planes } = packer.finish();
  const baseBytes = Buffer.alloc(8 * bases.length);
  for (const [i, base] of bases.entries()) baseBytes.writeDoubleLE(base, 8 * i);
  const parts = [Buffer.from(exactJson(shape)), codes, new Uint8Array(offsets.buffer), baseBytes, factors, planes];
  const lengths = Buffer.alloc(4 * PARTS);
  for (const [i, part] of parts.entries()) lengths.writeUInt32LE(part.length, 4 * i);
  const plain = Buffer.concat([lengths, ...parts]);
  const body = brotliCompressSync(plain, {
    params: { [constants.BROTLI_PARAM_QUALITY]: QUALITY, [constants.BROTLI_PARAM_SIZE_HINT]: plain.length },
  });
  return Buffer.concat([MAGIC, Buffer.from([VERSION, LAYOUT]), checkOf(body), body]);
}

const checkOf = (body: Uint8Array): Buffer =>
  createHash('sha256')
    .update(body)
    .digest()
    .subarray(0, BODY_AT - CHECK_AT);

/** The data of a block. Throws RangeError that says what does not match. */
export function unpackJson(block: Uint8Array): unknown {
  const bytes = Buffer.from(block.buffer, block.byteOffset, block.byteLength);
  if (!bytes.subarray(0, MAGIC.length).equals(MAGIC)) throw new RangeError('is no packed data');
  const [version, layout] = [bytes[4], bytes[5]];
  if (version !== VERSION || layout !== LAYOUT) {
    throw new RangeError(`is packed in version ${version}, layout ${layout}; this program reads ${VERSION}, ${LAYOUT}`);
  }
  const body = bytes.subarray(BODY_AT);
  if (!bytes.subarray(CHECK_AT, BODY_AT).equals(checkOf(body))) throw new RangeError('has changed bytes');
  const parts = partsOf(brotliDecompressSync(body, { maxOutputLength: MOST_BYTES }));
  const [shapeText, codes, offsets, bases, factors, planes] = parts as [Buffer, Buffer, Buffer, Buffer, Buffer, Buffer];
  const shape: unknown = JSON.parse(shapeText.toString());
  const counts: number[] = [];
  replaceNumbers(shape, (number, column) => {
    counts[column] = (counts[column] ?? 0) + 1;
    return number;
  });
  const packed = {
    codes,
    offsets: Int8Array.from(offsets, (byte) => (byte << 24) >> 24),
    bases: Float64Array.from({ length: bases.length / 8 }, (_, i) => bases.readDoubleLE(8 * i)),
    factors,
    planes,
  };
  const numbers = new NumberUnpacker(packed, counts);
  return replaceNumbers(shape, (_, column) => numbers.next(column));
}

function partsOf(plain: Buffer): Buffer[] {
  const lengths = Array.from({ length: PARTS }, (_, i) => plain.readUInt32LE(4 * i));
  const ends: number[] = [4 * PARTS];
  for (const length of lengths) ends.push(ends.at(-1)! + length);
  if (ends.at(-1) !== plain.length) throw new RangeError('is cut short');
  return lengths.map((_, i) => plain.subarray(ends[i]!, ends[i + 1]!));
}
