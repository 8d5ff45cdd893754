import proj4 from 'proj4';
import type { Position } from '../../shared/contracts/geometry.ts';
import type { App } from '../app-context.ts';
import { Project } from '../entities/project.ts';
import { createSample } from '../services/samples.ts';
import { demoId } from './demo-id.ts';
import type { DemoActors } from './demo-project.ts';
import type { HumanSample } from './island/human-samples.ts';

const UTM_28N = '+proj=utm +zone=28 +datum=WGS84 +units=m +no_defs';
/** Degrees are kept to nine decimals, a tenth of a millimetre. */
const ROUND = 1e9;

/** Longitude and latitude of a ring in UTM metres. */
function toLonLat(ring: HumanSample['ring']): Position[] {
  const transform = proj4(UTM_28N, 'WGS84');
  return ring.map(([x, y]) => {
    const [lon, lat] = transform.forward([x, y]);
    return [Math.round(lon * ROUND) / ROUND, Math.round(lat * ROUND) / ROUND];
  });
}

/** Stores the labellers' drawings through the same use case as the sampling desk. */
export async function drawDemoSamples(
  app: App,
  projectId: string,
  sceneId: string,
  classIds: readonly string[],
  people: DemoActors,
  samples: readonly HumanSample[],
  onEach: () => void,
): Promise<void> {
  for (const [place, { labeller, classCode, ring, confidence, note }] of samples.entries()) {
    onEach();
    const project = await app.db.getRepository(Project).findOneByOrFail({ id: projectId });
    const classId = classIds[classCode - 1];
    if (!classId) throw new Error(`The demo has no class with code ${classCode}.`);
    const geometry = { type: 'Polygon' as const, coordinates: [toLonLat(ring)] };
    const by = labeller === 'a' ? people.labellerA : people.labellerB;
    await createSample(app, project, by, {
      id: demoId('sample', place + 1),
      sceneId,
      classId,
      geometry,
      confidence,
      note,
    });
  }
}
