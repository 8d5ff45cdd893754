/** Pixel values of one band, row-major. */
export type BandValues = Uint8Array | Uint16Array | Int16Array | Uint32Array | Int32Array | Float32Array | Float64Array;

/** Whether a value counts as no data: the band's nodata value (`null` when it has none), or not a finite number. */
export function isNodata(value: number, nodata: number | null): boolean {
  return value === nodata || !Number.isFinite(value);
}
