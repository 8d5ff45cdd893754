import { IsNull } from 'typeorm';
import type { Overview } from '../../shared/contracts/project.ts';
import type { App } from '../app-context.ts';
import { LandClass } from '../entities/land-class.ts';
import type { Project } from '../entities/project.ts';
import { Run } from '../entities/run.ts';
import { Sample } from '../entities/sample.ts';
import { Scene } from '../entities/scene.ts';
import { can } from '../policies/policy-table.ts';
import type { Viewer } from '../policies/viewer.ts';
import { areMapsWithheld } from './design-blindness.ts';
import { listWaitingSamples } from './sample-waiting.ts';
import { listWaitingDesigns } from './design-waiting.ts';

/** Figures, and what waits for the viewer. */
export async function buildOverview(app: App, project: Project, viewer: Viewer): Promise<Omit<Overview, 'activity'>> {
  const scenes = await app.db
    .getRepository(Scene)
    .find({ where: { projectId: project.id }, select: { id: true, name: true, state: true } });
  const samplesPerClass = await countSamples(app, project.id);
  const runs = await app.db
    .getRepository(Run)
    .find({ where: { projectId: project.id }, relations: { job: true }, order: { number: 'DESC' } });
  const finished = runs.filter((run) => run.job.state === 'finished' && run.result);
  const best = finished.toSorted((a, b) => (b.result?.overallAccuracy ?? -1) - (a.result?.overallAccuracy ?? -1))[0];
  const readsAccuracy = can('accuracy.read', viewer.roles) && !(await areMapsWithheld(app, project.id, viewer));
  return {
    waiting: [
      ...listWaiting(project, viewer, scenes, samplesPerClass, runs),
      ...(await listWaitingSamples(app, project.id, viewer)),
      ...(await listWaitingDesigns(app, project.id, viewer)),
    ],
    figures: {
      sceneCount: scenes.length,
      sampleCount: samplesPerClass.reduce((sum, row) => sum + row.samples, 0),
      samplesPerClass,
      bestRun:
        best && readsAccuracy
          ? {
              id: best.id,
              number: best.number,
              overallAccuracy: best.result?.overallAccuracy ?? null,
              low: best.result?.overallLow ?? null,
              high: best.result?.overallHigh ?? null,
            }
          : null,
    },
  };
}

async function countSamples(app: App, projectId: string) {
  const classes = await app.db.getRepository(LandClass).find({ where: { projectId }, order: { position: 'ASC' } });
  const counts = await app.db
    .getRepository(Sample)
    .createQueryBuilder('sample')
    .select('sample.classId', 'classId')
    .addSelect('COUNT(*)', 'samples')
    .addSelect('SUM(sample.pixelCount)', 'pixels')
    .where({ projectId, deletedAt: IsNull() })
    .groupBy('sample.classId')
    .getRawMany<{ classId: string; samples: string; pixels: string }>();
  return classes.map(({ id, name, colour, code }) => {
    const row = counts.find(({ classId }) => classId === id);
    return { classId: id, name, colour, code, samples: Number(row?.samples ?? 0), pixels: Number(row?.pixels ?? 0) };
  });
}

/** The next steps this person can take, most pressing first. */
function listWaiting(
  project: Project,
  viewer: Viewer,
  scenes: Pick<Scene, 'state' | 'name'>[],
  samplesPerClass: { name: string; samples: number }[],
  runs: Run[],
): Overview['waiting'] {
  const waiting: Overview['waiting'] = [];
  if (can('scene.manage', viewer.roles)) {
    for (const scene of scenes.filter(({ state }) => state === 'failed')) {
      waiting.push({ text: `Scene “${scene.name}” could not be taken in: see why`, path: 'scenes' });
    }
    if (scenes.length === 0) waiting.push({ text: 'Upload the first scene', path: 'scenes' });
  }
  if (can('class.manage', viewer.roles) && samplesPerClass.length < 2)
    waiting.push({ text: 'Define the class scheme: at least two classes', path: 'classes' });
  if (can('sample.draw', viewer.roles) && scenes.some(({ state }) => state === 'ready')) {
    const wanted = project.targetSamplesPerClass ?? 2;
    const thin = samplesPerClass.filter(({ samples }) => samples < wanted);
    if (thin.length > 0) {
      const names = thin.slice(0, 3).map(({ name, samples }) => `${name} (${samples} of ${wanted})`);
      const more = thin.length > 3 ? ` and ${thin.length - 3} more` : '';
      waiting.push({ text: `Draw samples of ${names.join(', ')}${more}`, path: 'samples' });
    }
  }
  if (
    can('run.start', viewer.roles) &&
    runs.length === 0 &&
    samplesPerClass.filter(({ samples }) => samples >= 2).length >= 2
  ) {
    waiting.push({ text: 'Start the first run: two classes have enough samples', path: 'runs' });
  }
  const failed = runs[0]?.job.state === 'failed' ? runs[0] : null;
  if (failed && can('run.start', viewer.roles))
    waiting.push({ text: `Run ${failed.number} failed: see why`, path: `runs/${failed.id}` });
  return waiting;
}
