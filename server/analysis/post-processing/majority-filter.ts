export interface MajorityOptions {
  /** Side of the square window in pixels, odd. */
  windowPixels: number;
  /** What a pixel becomes when two or more classes are the most frequent in its window. */
  ties: 'keep-centre' | 'lowest-code';
  nodata: number;
  /** Called now and then with the rows done. */
  onRows?: (rows: number) => void;
}

/**
 * Gives each pixel the most frequent code in the window around it, as read from the map before the filter. The window is clipped at
 * the border; pixels without data stay so and have no vote.
 *
 * @param codes width × height, row-major, one byte a pixel
 * @returns new codes in the same layout
 * @throws RangeError for an even window or a wrong length
 */
export function filterMajority(
  codes: Uint8Array,
  width: number,
  height: number,
  { windowPixels, ties, nodata, onRows }: MajorityOptions,
): Uint8Array {
  if (windowPixels % 2 !== 1 || windowPixels < 1) throw new RangeError(`a window of ${windowPixels} has no centre`);
  if (codes.length !== width * height) throw new RangeError(`${codes.length} codes are not ${width} × ${height}`);
  const reach = (windowPixels - 1) / 2;
  const present = listPresent(codes, nodata);
  const out = new Uint8Array(codes.length);
  const votes = new Int32Array(256);
  for (let row = 0; row < height; row++) {
    const top = Math.max(0, row - reach);
    const bottom = Math.min(height - 1, row + reach);
    votes.fill(0);
    for (let column = 0; column < Math.min(reach, width); column++)
      addColumn(votes, codes, width, column, top, bottom, 1);
    for (let column = 0; column < width; column++) {
      if (column + reach < width) addColumn(votes, codes, width, column + reach, top, bottom, 1);
      if (column - reach > 0) addColumn(votes, codes, width, column - reach - 1, top, bottom, -1);
      const centre = codes[row * width + column];
      out[row * width + column] = centre === nodata ? nodata : pickWinner(votes, present, centre, ties);
    }
    if (row % 64 === 63) onRows?.(row + 1);
  }
  onRows?.(height);
  return out;
}

/** Codes that occur, ascending, without nodata. */
function listPresent(codes: Uint8Array, nodata: number): number[] {
  const seen = new Uint8Array(256);
  for (const code of codes) seen[code] = 1;
  seen[nodata] = 0;
  return Array.from(seen.keys()).filter((code) => seen[code] === 1);
}

function addColumn(
  votes: Int32Array,
  codes: Uint8Array,
  width: number,
  column: number,
  top: number,
  bottom: number,
  weight: 1 | -1,
): void {
  for (let row = top, i = top * width + column; row <= bottom; row++, i += width) votes[codes[i]] += weight;
}

function pickWinner(
  votes: Int32Array,
  present: readonly number[],
  centre: number,
  ties: MajorityOptions['ties'],
): number {
  let winner = centre;
  let most = 0;
  let isTied = false;
  for (const code of present) {
    const n = votes[code];
    if (n > most) {
      most = n;
      winner = code;
      isTied = false;
    } else if (n === most && n > 0) isTied = true;
  }
  return isTied && ties === 'keep-centre' ? centre : winner;
}
