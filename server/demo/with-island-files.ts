import type { App } from '../app-context.ts';
import { createWorkerPool } from '../jobs/worker-pool.ts';
import { runGdal } from '../raster/gdal-process.ts';
import type { IslandFiles } from './make-island-files.ts';

/** Makes the island in a thread of its own, hands its files to `use`, and removes what `use` did not take over. */
export async function withIslandFiles<T>(app: App, use: (island: IslandFiles) => Promise<T>): Promise<T> {
  const { stdout: wkt } = await runGdal('gdalsrsinfo', ['-o', 'wkt2', 'EPSG:32628'], { origin: 'own' });
  const scratch = await app.files.scratch('demo');
  const pool = createWorkerPool<{ dir: string; wkt: string }, IslandFiles>({
    entry: new URL('./make-island-files.ts', import.meta.url),
    threads: 1,
  });
  try {
    const island = await pool.run({ dir: scratch.path, wkt: wkt.trim() });
    return await use(island);
  } finally {
    await pool.destroy();
    await scratch.dispose();
  }
}
