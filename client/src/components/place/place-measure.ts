import { queryOptions } from '@tanstack/react-query';
import type { Polygon } from '../../../../shared/contracts/geometry.ts';
import { drawingMeasureSchema } from '../../../../shared/contracts/sample.ts';
import type { Scene } from '../../../../shared/contracts/scene.ts';
import { fetchJson } from '../../lib/fetch-json.ts';
import { projectKey } from '../../lib/project/project-query.ts';

/** Mean and spread of each band of a scene inside an outline. */
export const placeMeasureQuery = (projectId: string, scene: Scene, geometry: Polygon) =>
  queryOptions({
    queryKey: projectKey(projectId, 'scenes', scene.id, 'measure', scene.contentKey, geometry.coordinates),
    queryFn: ({ signal }) =>
      fetchJson(`/projects/${projectId}/samples/measure`, drawingMeasureSchema, {
        method: 'POST',
        body: { sceneId: scene.id, geometry },
        signal,
      }),
    staleTime: Infinity,
  });
