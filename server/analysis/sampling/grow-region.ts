/** Values of a window of pixels, row-major, all features of a pixel together. */
export interface FeatureWindow {
  width: number;
  height: number;
  nFeatures: number;
  values: Float32Array;
  /** 1 where a pixel has data and may be taken. */
  isUsable: Uint8Array;
}

export interface GrownRegion {
  /** 1 for each pixel of the region, row-major. */
  region: Uint8Array;
  nPixels: number;
  /** Whether the region reaches the window's edge and might go on beyond. */
  reachesEdge: boolean;
}

/**
 * The connected pixels about a seed whose spectrum is like the seed's: the root of the mean over the features of
 * ((value − seed's value) / scale)² is at most `distance`. Pixels are connected by their sides; holes of fewer than `fillBelow`
 * pixels are filled, unless they hold a pixel that may not be taken.
 * @param scales what counts as one unit of each feature, such as its standard deviation over the scene
 * @throws RangeError when the seed is outside or the arrays do not fit
 */
export function growRegion(
  window: FeatureWindow,
  seed: { column: number; row: number },
  scales: ArrayLike<number>,
  distance: number,
  fillBelow = 9,
): GrownRegion {
  const { width, height, nFeatures, values, isUsable } = window;
  if (
    values.length !== width * height * nFeatures ||
    isUsable.length !== width * height ||
    scales.length !== nFeatures
  ) {
    throw new RangeError(`A window of ${width} × ${height} pixels and ${nFeatures} features needs other arrays.`);
  }
  const start = seed.row * width + seed.column;
  if (!(seed.column >= 0 && seed.column < width && seed.row >= 0 && seed.row < height)) {
    throw new RangeError(`The seed ${seed.column}, ${seed.row} lies outside the window.`);
  }
  const limit = distance ** 2 * nFeatures;
  const isLike = (pixel: number): boolean => {
    if (isUsable[pixel] === 0) return false;
    let sum = 0;
    for (let f = 0; f < nFeatures; f++) {
      sum += ((values[pixel * nFeatures + f] - values[start * nFeatures + f]) / scales[f]) ** 2;
    }
    return sum <= limit;
  };
  const region = new Uint8Array(width * height);
  if (isUsable[start] === 0) return { region, nPixels: 0, reachesEdge: false };
  flood(width, height, start, isLike, (pixel) => (region[pixel] = 1));
  fillHoles(region, window, fillBelow);
  let nPixels = 0;
  let reachesEdge = false;
  region.forEach((held, pixel) => {
    if (held === 0) return;
    nPixels++;
    const [column, row] = [pixel % width, Math.floor(pixel / width)];
    reachesEdge ||= column === 0 || row === 0 || column === width - 1 || row === height - 1;
  });
  return { region, nPixels, reachesEdge };
}

/** Visits all pixels connected to a start by their sides that pass a test. */
function flood(
  width: number,
  height: number,
  start: number,
  passes: (pixel: number) => boolean,
  visit: (pixel: number) => void,
): void {
  const seen = new Uint8Array(width * height);
  const queue = [start];
  seen[start] = 1;
  while (queue.length > 0) {
    const pixel = queue.pop()!;
    visit(pixel);
    const column = pixel % width;
    const neighbours = [
      column > 0 ? pixel - 1 : -1,
      column < width - 1 ? pixel + 1 : -1,
      pixel - width,
      pixel + width < width * height ? pixel + width : -1,
    ];
    for (const next of neighbours) {
      if (next < 0 || seen[next] === 1 || !passes(next)) continue;
      seen[next] = 1;
      queue.push(next);
    }
  }
}

function fillHoles(region: Uint8Array, { width, height, isUsable }: FeatureWindow, fillBelow: number): void {
  const isKnown = new Uint8Array(width * height);
  for (let pixel = 0; pixel < region.length; pixel++) {
    if (region[pixel] === 1 || isKnown[pixel] === 1) continue;
    const hole: number[] = [];
    let isOpen = false;
    flood(
      width,
      height,
      pixel,
      (next) => region[next] === 0,
      (next) => {
        isKnown[next] = 1;
        hole.push(next);
        const column = next % width;
        isOpen ||= column === 0 || column === width - 1 || next < width || next >= width * (height - 1);
        isOpen ||= isUsable[next] === 0;
      },
    );
    if (!isOpen && hole.length < fillBelow) for (const next of hole) region[next] = 1;
  }
}
