/** A tile and where it lies in the picture, in CSS pixels. */
interface ThumbnailTile {
  z: number;
  x: number;
  y: number;
  left: number;
  top: number;
  size: number;
}

export interface ThumbnailLayout {
  tiles: ThumbnailTile[];
  /** The scene's place in the picture. */
  left: number;
  top: number;
  width: number;
  height: number;
}

const MOST_ZOOM = 18;
const DEG = Math.PI / 180;

/**
 * The few Web Mercator tiles that show a scene whole within a box, sharp at twice its pixels at most.
 *
 * @param bounds [west, south, east, north], unwrapped
 * @param boxWidth width of the picture in CSS pixels
 * @param boxHeight its height
 */
export function layThumbnail(
  [west, south, east, north]: readonly [number, number, number, number],
  boxWidth: number,
  boxHeight: number,
): ThumbnailLayout {
  // The world as a square of side 1, its origin in the north-west.
  const [x0, x1] = [(west + 180) / 360, (east + 180) / 360];
  const [y0, y1] = [mercatorY(north), mercatorY(south)];
  const scale = Math.min(boxWidth / (x1 - x0), boxHeight / (y1 - y0));
  const z = Math.max(0, Math.min(MOST_ZOOM, Math.ceil(Math.log2(scale / 256))));
  const nTiles = 2 ** z;
  const size = scale / nTiles;
  const width = (x1 - x0) * scale;
  const height = (y1 - y0) * scale;
  const left = (boxWidth - width) / 2;
  const top = (boxHeight - height) / 2;
  const tiles: ThumbnailTile[] = [];
  for (let y = Math.floor(y0 * nTiles); y < y1 * nTiles; y++) {
    for (let x = Math.floor(x0 * nTiles); x < x1 * nTiles; x++) {
      tiles.push({
        z,
        x: ((x % nTiles) + nTiles) % nTiles,
        y,
        left: left + (x - x0 * nTiles) * size,
        top: top + (y - y0 * nTiles) * size,
        size,
      });
    }
  }
  return { tiles, left, top, width, height };
}

function mercatorY(latitudeDeg: number): number {
  const sine = Math.sin(latitudeDeg * DEG);
  return 0.5 - Math.atanh(sine) / (2 * Math.PI);
}
