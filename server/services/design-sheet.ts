import type { z } from 'zod';
import type { answerSheetSchema } from '../../shared/contracts/reference.ts';
import type { App } from '../app-context.ts';
import type { ReferenceDesign } from '../entities/reference-design.ts';
import { ReferencePoint } from '../entities/reference-point.ts';
import { NotFound } from '../errors.ts';
import { pixelToMap } from '../raster/raster-grid.ts';
import { findRun } from './runs.ts';
import { placeScene } from './run-scene.ts';

/** The points of a design by number, in degrees and in the scene's own coordinates. */
export async function listSheetPoints(app: App, design: ReferenceDesign): Promise<z.input<typeof answerSheetSchema>> {
  const run = await findRun(app, design.runId);
  const placed = run && placeScene(run.scene);
  if (!run || !placed) throw new NotFound();
  const points = await app.db
    .getRepository(ReferencePoint)
    .find({ where: { designId: design.id }, order: { number: 'ASC' } });
  return {
    crsName: run.scene.crsName ?? 'the scene’s reference system',
    points: points.map(({ number, lon, lat, pixelRow, pixelColumn }) => ({
      ...{ number, position: [lon, lat] as [number, number] },
      projected: pixelToMap(placed.grid, pixelColumn + 0.5, pixelRow + 0.5) as [number, number],
    })),
  };
}
