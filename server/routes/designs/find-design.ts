import { z } from 'zod';
import { idSchema } from '../../../shared/contracts/common.ts';
import type { Design } from '../../../shared/contracts/reference.ts';
import type { App } from '../../app-context.ts';
import type { ReferenceDesign } from '../../entities/reference-design.ts';
import type { ReferencePoint } from '../../entities/reference-point.ts';
import { NotFound } from '../../errors.ts';
import type { Viewer } from '../../policies/viewer.ts';
import { presentDesign } from '../../presenters/present-design.ts';
import { findReferencePoint } from '../../services/design-answers.ts';
import { areMapsWithheld } from '../../services/design-blindness.ts';
import { measureDesignProgress } from '../../services/design-progress.ts';
import { findDesign } from '../../services/designs.ts';
import { placeScene, type PlacedScene } from '../../services/run-scene.ts';
import { findRun } from '../../services/runs.ts';

export const designParams = z.object({ designId: idSchema });
export const pointParams = z.object({ pointId: idSchema });

export async function findDesignTarget(
  app: App,
  params: { designId: string },
): Promise<{ projectId: string; design: ReferenceDesign } | null> {
  const design = await findDesign(app, params.designId);
  return design ? { projectId: design.projectId, design } : null;
}

export async function findPointTarget(
  app: App,
  params: { pointId: string },
): Promise<{ projectId: string; design: ReferenceDesign; point: ReferencePoint } | null> {
  const found = await findReferencePoint(app, params.pointId);
  return found ? { projectId: found.design.projectId, ...found } : null;
}

/** A design with its progress, as the viewer may see it. */
export async function showDesign(app: App, viewer: Viewer, design: ReferenceDesign): Promise<Design> {
  const progress = await measureDesignProgress(app, design, viewer.userId);
  return presentDesign(design, viewer, {
    progress,
    isMapWithheld: await areMapsWithheld(app, design.projectId, viewer),
  });
}

/** The grid the points were drawn from. */
export async function findPlace(app: App, design: ReferenceDesign): Promise<PlacedScene> {
  const run = await findRun(app, design.runId);
  const placed = run && placeScene(run.scene);
  if (!placed) throw new NotFound();
  return placed;
}
