import { keepPreviousData, queryOptions, useQuery } from '@tanstack/react-query';
import type { Polygon } from '../../../../shared/contracts/geometry.ts';
import { drawingMeasureSchema } from '../../../../shared/contracts/sample.ts';
import { fetchJson } from '../../lib/fetch-json.ts';
import { projectKey } from '../../lib/project/project-query.ts';

export interface MeasuredScene {
  id: string;
  contentKey: string;
}

const measureDrawing = (projectId: string, sceneId: string, geometry: Polygon, signal: AbortSignal) =>
  fetchJson(`/projects/${projectId}/samples/measure`, drawingMeasureSchema, {
    method: 'POST',
    body: { sceneId, geometry },
    signal,
  });

/** Pixels, area and spectrum of an outline on a scene, or why it is refused; asked again when the scene's bands change. */
const measureQuery = (projectId: string, scene: MeasuredScene, geometry: Polygon) =>
  queryOptions({
    // Under the scene: another person's new sample changes nothing in what this outline holds.
    queryKey: projectKey(projectId, 'scenes', scene.id, 'measure', scene.contentKey, geometry.coordinates),
    queryFn: ({ signal }) => measureDrawing(projectId, scene.id, geometry, signal),
    staleTime: Infinity,
  });

/** Measures an outline; while it is mended, the figures before it stay until the new ones come. */
export function useMeasure(projectId: string, scene: MeasuredScene, geometry: Polygon) {
  return useQuery({ ...measureQuery(projectId, scene, geometry), placeholderData: keepPreviousData });
}

/** As useMeasure for the drawing in hand; asks nothing while there is none. */
export function useDraftMeasure(projectId: string, scene: MeasuredScene, geometry: Polygon | null) {
  const nothing: Polygon = { type: 'Polygon', coordinates: [] };
  return useQuery({
    ...measureQuery(projectId, scene, geometry ?? nothing),
    enabled: geometry !== null,
    placeholderData: geometry ? keepPreviousData : undefined,
  });
}
