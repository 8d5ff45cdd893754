import { keepPreviousData, queryOptions, useQuery } from '@tanstack/react-query';
import { probeSchema } from '../../../../shared/contracts/scene.ts';
import { fetchJson } from '../fetch-json.ts';
import { projectKey } from './project-query.ts';

/** Longitude and latitude in degrees on WGS84. */
export interface Place {
  lon: number;
  lat: number;
}

const probeScene = (sceneId: string, place: Place, signal: AbortSignal) =>
  fetchJson(`/scenes/${sceneId}/probe`, probeSchema, { query: { lon: place.lon, lat: place.lat }, signal });

/** Every band's value of the scene pixel a place falls in; `contentKey` asks again once the pixels or bands change. */
export const probeQuery = (projectId: string, scene: { id: string; contentKey: string }, place: Place) =>
  queryOptions({
    queryKey: projectKey(projectId, 'scenes', scene.id, 'probe', scene.contentKey, place.lon, place.lat),
    queryFn: ({ signal }) => probeScene(scene.id, place, signal),
    staleTime: Infinity,
    placeholderData: keepPreviousData,
  });

/** The pixel at `place`; nothing is asked while either is null. */
export function useProbe(projectId: string, scene: { id: string; contentKey: string } | null, place: Place | null) {
  return useQuery({
    ...probeQuery(projectId, scene ?? { id: '', contentKey: '' }, place ?? { lon: 0, lat: 0 }),
    enabled: scene !== null && place !== null,
  });
}
