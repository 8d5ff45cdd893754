/** Bytes that are not a model of the kind wanted, or are damaged. */
export class ModelBytesError extends Error {
  override readonly name = 'ModelBytesError';
}

/** 'GMDL' as a number in the machine's byte order: bytes from a machine of the other order are refused, not misread. */
const MAGIC = 0x4c444d47;
const HEADER_BYTES = 16;

type NumberArray = Uint8Array | Int16Array | Uint32Array | Int32Array | Float32Array | Float64Array;

/**
 * Packs arrays into one block of bytes: magic, format version, CRC-32 of the rest, length of kind, kind, then each
 * array with its length in bytes before it, each at a multiple of eight bytes.
 */
export function packArrays(kind: string, version: number, arrays: readonly NumberArray[]): Uint8Array {
  const kindBytes = new TextEncoder().encode(kind);
  let size = roundUp(HEADER_BYTES + kindBytes.length);
  for (const array of arrays) size += 8 + roundUp(array.byteLength);
  const bytes = new Uint8Array(size);
  const header = new Uint32Array(bytes.buffer, 0, 4);
  bytes.set(kindBytes, HEADER_BYTES);
  let offset = roundUp(HEADER_BYTES + kindBytes.length);
  for (const array of arrays) {
    new Uint32Array(bytes.buffer, offset, 1)[0] = array.byteLength;
    bytes.set(new Uint8Array(array.buffer, array.byteOffset, array.byteLength), offset + 8);
    offset += 8 + roundUp(array.byteLength);
  }
  header[0] = MAGIC;
  header[1] = version;
  header[3] = kindBytes.length;
  header[2] = crc32(bytes.subarray(12));
  return bytes;
}

/** Kind of packed bytes, after checking magic and checksum. @throws ModelBytesError when they are wrong. */
export function readKind(bytes: Uint8Array): string {
  return open(bytes).kind;
}

/**
 * Reads packed arrays back one after the other.
 * @throws ModelBytesError when magic, checksum, kind or version are not the ones wanted.
 */
export function unpackArrays(bytes: Uint8Array, kind: string, version: number): ArrayReader {
  const found = open(bytes);
  if (found.kind !== kind) throw new ModelBytesError(`These bytes hold a "${found.kind}", a "${kind}" is wanted.`);
  if (found.version !== version) {
    throw new ModelBytesError(`This ${kind} has format version ${found.version}, only ${version} can be read.`);
  }
  return new ArrayReader(bytes, roundUp(HEADER_BYTES + kind.length));
}

/** Hands out the arrays of packed bytes in order, as copies. */
export class ArrayReader {
  readonly #bytes: Uint8Array;
  #offset: number;

  constructor(bytes: Uint8Array, offset: number) {
    this.#bytes = bytes;
    this.#offset = offset;
  }

  /** Next array as the given type. @throws ModelBytesError when there is none or its length does not fit. */
  next<T>(type: { new (buffer: ArrayBuffer): T; readonly BYTES_PER_ELEMENT: number }, wantedLength?: number): T {
    const lengthAt = this.#offset;
    if (lengthAt + 8 > this.#bytes.length) throw new ModelBytesError('The bytes end before the last array.');
    const byteLength = new Uint32Array(this.#bytes.slice(lengthAt, lengthAt + 4).buffer)[0];
    const from = lengthAt + 8;
    const fits =
      from + byteLength <= this.#bytes.length &&
      byteLength % type.BYTES_PER_ELEMENT === 0 &&
      (wantedLength === undefined || byteLength === wantedLength * type.BYTES_PER_ELEMENT);
    if (!fits) throw new ModelBytesError(`An array of ${byteLength} bytes does not fit where it stands.`);
    this.#offset = from + roundUp(byteLength);
    return new type(this.#bytes.slice(from, from + byteLength).buffer);
  }
}

function open(bytes: Uint8Array): { kind: string; version: number } {
  if (bytes.length < HEADER_BYTES) throw new ModelBytesError(`${bytes.length} bytes are too few for a model.`);
  const [magic, version, checksum, kindLength] = new Uint32Array(bytes.slice(0, HEADER_BYTES).buffer);
  if (magic !== MAGIC) throw new ModelBytesError('These bytes are not a model: the first four are not "GMDL".');
  if (crc32(bytes.subarray(12)) !== checksum) {
    throw new ModelBytesError('The model is damaged or cut short: its checksum is wrong.');
  }
  return { version, kind: new TextDecoder().decode(bytes.subarray(HEADER_BYTES, HEADER_BYTES + kindLength)) };
}

function roundUp(length: number): number {
  return (length + 7) & ~7;
}

const crcTable = Uint32Array.from({ length: 256 }, (_, n) => {
  let c = n;
  for (let bit = 0; bit < 8; bit++) c = c & 1 ? 0xedb88320 ^ (c >>> 1) : c >>> 1;
  return c;
});

/** CRC-32 as in ISO 3309 and RFC 1952. */
function crc32(bytes: Uint8Array): number {
  let crc = 0xffffffff;
  for (let i = 0; i < bytes.length; i++) crc = crcTable[(crc ^ bytes[i]) & 255] ^ (crc >>> 8);
  return (crc ^ 0xffffffff) >>> 0;
}
