/** A north-up raster grid: `originX`,`originY` is the outer corner of the top-left pixel; both pixel sizes are positive, in CRS units. */
export interface RasterGrid {
  width: number;
  height: number;
  originX: number;
  originY: number;
  pixelWidth: number;
  pixelHeight: number;
}

/** Whether two grids have the same size and agree on every corner to a thousandth of a pixel. */
export function isSameGrid(a: RasterGrid, b: RasterGrid): boolean {
  const toleranceX = a.pixelWidth * 1e-3;
  const toleranceY = a.pixelHeight * 1e-3;
  return (
    a.width === b.width &&
    a.height === b.height &&
    Math.abs(a.originX - b.originX) <= toleranceX &&
    Math.abs(a.originY - b.originY) <= toleranceY &&
    Math.abs(a.pixelWidth - b.pixelWidth) * a.width <= toleranceX &&
    Math.abs(a.pixelHeight - b.pixelHeight) * a.height <= toleranceY
  );
}

/** Corner of pixel (col, row) in CRS units; fractional positions are allowed, and col + 0.5, row + 0.5 is the centre. */
export function pixelToMap(grid: RasterGrid, col: number, row: number): [number, number] {
  return [grid.originX + col * grid.pixelWidth, grid.originY - row * grid.pixelHeight];
}

/** Position of a map point in pixels, measured from the outer corner of the top-left pixel (floor gives the pixel). */
export function mapToPixel(grid: RasterGrid, x: number, y: number): [number, number] {
  return [(x - grid.originX) / grid.pixelWidth, (grid.originY - y) / grid.pixelHeight];
}
