/**
 * Replaces codes by a table of 256 entries, everywhere or at some pixels only.
 *
 * @param codes row-major; changed in place
 * @param pixels flat indices of the pixels it is about; null is all
 */
export function recode(codes: Uint8Array, table: Uint8Array, pixels: Iterable<number> | null = null): void {
  if (pixels) for (const pixel of pixels) codes[pixel] = table[codes[pixel]];
  else for (let i = 0; i < codes.length; i++) codes[i] = table[codes[i]];
}

/** A table for `recode`: the codes named change, all others stay. */
export function makeRecodeTable(pairs: Iterable<readonly [from: number, to: number]>): Uint8Array {
  const table = Uint8Array.from({ length: 256 }, (_, code) => code);
  for (const [from, to] of pairs) table[from] = to;
  return table;
}
