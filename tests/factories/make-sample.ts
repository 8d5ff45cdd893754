import { randomUUID } from 'node:crypto';
import type { App } from '../../server/app-context.ts';
import type { LandClass } from '../../server/entities/land-class.ts';
import { Project } from '../../server/entities/project.ts';
import { SampleVersion } from '../../server/entities/sample-version.ts';
import { Sample } from '../../server/entities/sample.ts';
import type { Scene } from '../../server/entities/scene.ts';
import { ellipsoidalPolygonAreaM2 } from '../../server/analysis/sampling/ellipsoidal-area.ts';
import { getCrsTransform } from '../../server/raster/crs-transform.ts';
import { pixelToMap } from '../../server/raster/raster-grid.ts';
import { requireGrid } from '../../server/services/scenes.ts';
import type { Polygon } from '../../shared/contracts/geometry.ts';

/** The rectangle of pixels from (column, row), drawn a tenth of a pixel within its outer edges. */
export function pixelRectangle(scene: Scene, column: number, row: number, width: number, height: number): Polygon {
  return pixelPolygon(scene, [
    [column + 0.1, row + 0.1],
    [column + 0.1, row + height - 0.1],
    [column + width - 0.1, row + height - 0.1],
    [column + width - 0.1, row + 0.1],
  ]);
}

/** A polygon from an open ring of pixel positions. */
export function pixelPolygon(scene: Scene, corners: [column: number, row: number][]): Polygon {
  const { grid, crs } = requireGrid(scene);
  const transform = getCrsTransform(crs);
  const ring = corners.map(([column, row]) => transform.toLonLat(...pixelToMap(grid, column, row)));
  return { type: 'Polygon', coordinates: [[...ring, ring[0]]] };
}

export interface SamplePlace {
  column: number;
  row: number;
  width?: number;
  height?: number;
}

/** A stored sample over a rectangle of pixels, 3 × 3 unless said, straight into the database. */
export async function makeSample(
  app: App,
  scene: Scene,
  landClass: LandClass,
  { column, row, width = 3, height = 3 }: SamplePlace,
  overrides: Partial<Sample> = {},
): Promise<Sample> {
  const geometry = overrides.geometry ?? pixelRectangle(scene, column, row, width, height);
  const id = overrides.id ?? randomUUID();
  const { projectId } = scene;
  await app.db.transaction(async (manager) => {
    await manager.increment(Project, { id: projectId }, 'lastSampleNumber', 1);
    const { lastSampleNumber } = await manager.findOneByOrFail(Project, { id: projectId });
    const content = {
      classId: landClass.id,
      geometry,
      confidence: 'medium' as const,
      note: '',
      pixelCount: width * height,
      areaHa: ellipsoidalPolygonAreaM2(geometry.coordinates) / 10_000,
    };
    await manager.insert(Sample, {
      id,
      projectId,
      number: lastSampleNumber,
      sceneId: scene.id,
      createdById: null,
      updatedAt: new Date(),
      deletedAt: null,
      ...content,
      ...overrides,
    });
    const byId = overrides.createdById ?? null;
    await manager.insert(SampleVersion, { sampleId: id, versionNumber: 1, change: 'created', byId, ...content });
  });
  return app.db.getRepository(Sample).findOneByOrFail({ id });
}
