import { useQuery } from '@tanstack/react-query';
import { scenesQuery } from '../../lib/project/scenes-query.ts';
import type { UploadLimits } from './check-files.ts';

/** What the server takes of one upload; null until the list of scenes has said it. */
export function useUploadLimits(projectId: string): UploadLimits | null {
  const query = useQuery({ ...scenesQuery(projectId), select: ({ limits }) => limits });
  return query.data ?? null;
}
