import type { App } from '../app-context.ts';
import type { Run } from '../entities/run.ts';
import { NotFound } from '../errors.ts';
import { isSameGrid } from '../raster/raster-grid.ts';
import { requireResult } from './accuracy.ts';
import { placeScene } from './run-scene.ts';

/** Whether two runs' maps can be laid over each other pixel by pixel. */
export function haveSamePixels(first: Run, second: Run): boolean {
  const [a, b] = [placeScene(first.scene), placeScene(second.scene)];
  return a !== null && b !== null && a.proj4 === b.proj4 && isSameGrid(a.grid, b.grid);
}

/** The code a run's map shows at each of some pixels. */
export async function readCodesAt(
  app: App,
  run: Run,
  pixels: readonly { row: number; column: number }[],
): Promise<number[]> {
  const band = await app.bands.open(await app.files.localPath(requireResult(run).mapKey));
  // From the top, so that each block is decoded once.
  const inOrder = pixels.map((pixel, i) => ({ pixel, i })).sort((a, b) => a.pixel.row - b.pixel.row);
  const codes = new Array<number>(pixels.length).fill(0);
  for (const { pixel, i } of inOrder) {
    const [code] = await band.readWindow(0, pixel.column, pixel.row, 1, 1);
    if (code === undefined) throw new NotFound();
    codes[i] = code;
  }
  return codes;
}
