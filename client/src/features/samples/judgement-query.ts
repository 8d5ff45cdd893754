import { keepPreviousData, queryOptions, useQuery } from '@tanstack/react-query';
import type { Polygon } from '../../../../shared/contracts/geometry.ts';
import { drawingJudgementSchema } from '../../../../shared/contracts/signature.ts';
import { fetchJson } from '../../lib/fetch-json.ts';
import { projectKey } from '../../lib/project/project-query.ts';
import type { MeasuredScene } from './measure-query.ts';

export interface JudgedOutline {
  classId: string;
  geometry: Polygon;
  /** The sample it is or will be, which is not held against itself. */
  sampleId: string;
}

const judgeDrawing = (projectId: string, sceneId: string, outline: JudgedOutline, signal: AbortSignal) =>
  fetchJson(`/projects/${projectId}/samples/judge`, drawingJudgementSchema, {
    method: 'POST',
    body: { sceneId, ...outline },
    signal,
  });

/** How an outline stands to the samples there are; asked again when a sample changes. */
const judgementQuery = (projectId: string, scene: MeasuredScene, outline: JudgedOutline) =>
  queryOptions({
    queryKey: projectKey(
      projectId,
      'samples',
      'judgement',
      scene.id,
      scene.contentKey,
      outline.classId,
      outline.sampleId,
      outline.geometry.coordinates,
    ),
    queryFn: ({ signal }) => judgeDrawing(projectId, scene.id, outline, signal),
    placeholderData: keepPreviousData,
  });

export function useJudgement(projectId: string, scene: MeasuredScene, outline: JudgedOutline, isWanted = true) {
  return useQuery({ ...judgementQuery(projectId, scene, outline), enabled: isWanted });
}
