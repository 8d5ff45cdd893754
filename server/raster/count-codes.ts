/** Pixels and area of each code 0–255. */
export interface CodeCounts {
  pixels: Float64Array;
  areaM2: Float64Array;
}

export function createCodeCounts(): CodeCounts {
  return { pixels: new Float64Array(256), areaM2: new Float64Array(256) };
}

/**
 * Adds whole rows of codes to the counts; a pixel of row r (from `firstRow`) has the area rowAreaM2[r].
 * @throws {RangeError} when the codes are not whole rows or leave the raster.
 */
export function addCodeCounts(
  counts: CodeCounts,
  codes: Uint8Array,
  width: number,
  firstRow: number,
  rowAreaM2: Float64Array,
): void {
  const nRows = codes.length / width;
  if (!Number.isInteger(nRows) || firstRow + nRows > rowAreaM2.length) {
    throw new RangeError(`${codes.length} codes from row ${firstRow} do not fit ${rowAreaM2.length} rows of ${width}`);
  }
  const inRow = new Float64Array(256);
  for (let row = 0; row < nRows; row++) {
    inRow.fill(0);
    for (let i = row * width; i < (row + 1) * width; i++) inRow[codes[i]]++;
    for (let code = 0; code < 256; code++) {
      counts.pixels[code] += inRow[code];
      counts.areaM2[code] += inRow[code] * rowAreaM2[firstRow + row];
    }
  }
}

/**
 * Counts the codes of chosen pixels by owner: counts[owner · 256 + code].
 * `pixels` are ascending flat indices of the whole raster; those within the codes from `offset` on are counted, starting at place `from`.
 * @returns the place of the first pixel beyond the codes.
 */
export function addOwnedCodes(
  counts: Uint32Array,
  owned: { pixels: Uint32Array; owners: Uint32Array },
  codes: Uint8Array,
  offset: number,
  from: number,
): number {
  const { pixels, owners } = owned;
  let i = from;
  for (; i < pixels.length && pixels[i] < offset + codes.length; i++)
    counts[owners[i] * 256 + codes[pixels[i] - offset]]++;
  return i;
}
