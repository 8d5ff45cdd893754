/** The sample types a band file may have. */
export type BandDtype = 'int8' | 'uint8' | 'int16' | 'uint16' | 'int32' | 'uint32' | 'float32' | 'float64';

/** A flat, row-major array of band samples. */
export type BandArray =
  Int8Array | Uint8Array | Int16Array | Uint16Array | Int32Array | Uint32Array | Float32Array | Float64Array;

const constructors = {
  int8: Int8Array,
  uint8: Uint8Array,
  int16: Int16Array,
  uint16: Uint16Array,
  int32: Int32Array,
  uint32: Uint32Array,
  float32: Float32Array,
  float64: Float64Array,
} as const;

const integerRanges: Partial<Record<BandDtype, readonly [number, number]>> = {
  int8: [-128, 127],
  uint8: [0, 255],
  int16: [-32768, 32767],
  uint16: [0, 65535],
  int32: [-2147483648, 2147483647],
  uint32: [0, 4294967295],
};

/** Bytes of one sample. */
export function getSampleBytes(dtype: BandDtype): number {
  return constructors[dtype].BYTES_PER_ELEMENT;
}

/** A zeroed array of `length` samples. */
export function createBandArray(dtype: BandDtype, length: number): BandArray {
  return new constructors[dtype](length);
}

/** Views `buffer` (machine byte order) as samples, without a copy. */
export function viewBandArray(dtype: BandDtype, buffer: ArrayBuffer): BandArray {
  return new constructors[dtype](buffer);
}

/** Smallest and largest value of an integer type, or null for a floating-point type. */
export function getIntegerRange(dtype: BandDtype): readonly [number, number] | null {
  return integerRanges[dtype] ?? null;
}

/** Whether `value` can occur in a band of this type; a declared nodata value that cannot is meaningless. */
export function isRepresentable(dtype: BandDtype, value: number): boolean {
  const range = getIntegerRange(dtype);
  if (range === null) return dtype === 'float64' || !Number.isFinite(value) || Number.isFinite(Math.fround(value));
  return Number.isInteger(value) && value >= range[0] && value <= range[1];
}

/** The sample type for GDAL's type name, or null where it is one that is not supported (complex and 64-bit integer types). */
export function readGdalType(gdalType: string, pixelType: string | undefined): BandDtype | null {
  switch (gdalType) {
    case 'Byte':
      return pixelType === 'SIGNEDBYTE' ? 'int8' : 'uint8';
    case 'Int8':
    case 'Int16':
    case 'UInt16':
    case 'Int32':
    case 'UInt32':
    case 'Float32':
    case 'Float64':
      return gdalType.toLowerCase() as BandDtype;
    default:
      return null;
  }
}

/** GDAL's name for the type as a raw file's VRT needs it; int8 is written as Byte with a pixel type before GDAL 3.7. */
export function getGdalType(dtype: BandDtype): string {
  const names: Record<BandDtype, string> = {
    int8: 'Byte',
    uint8: 'Byte',
    int16: 'Int16',
    uint16: 'UInt16',
    int32: 'Int32',
    uint32: 'UInt32',
    float32: 'Float32',
    float64: 'Float64',
  };
  return names[dtype];
}
