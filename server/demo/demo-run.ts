import { recipeSchema } from '../../shared/contracts/run.ts';
import type { App } from '../app-context.ts';
import { Project } from '../entities/project.ts';
import { startRun } from '../services/runs.ts';
import { loadSceneRow } from '../services/scenes.ts';

/** Starts the demo's run: all bands of the scene, all classes, everything else as the form offers it. */
export async function startDemoRun(
  app: App,
  projectId: string,
  byId: string,
  sceneId: string,
  classIds: string[],
): Promise<string> {
  const project = await app.db.getRepository(Project).findOneByOrFail({ id: projectId });
  const { scene } = await loadSceneRow(app, sceneId);
  const recipe = recipeSchema.parse({
    sceneId,
    bandIds: scene.bands.map(({ id }) => id),
    classIds,
    classifier: { kind: 'random-forest' },
  });
  const run = await startRun(app, project, byId, {
    name: 'First map',
    note: 'All seven bands of the late-summer scene.',
    recipe,
  });
  return run.id;
}
