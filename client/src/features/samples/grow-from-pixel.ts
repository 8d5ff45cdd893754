import { useMutation } from '@tanstack/react-query';
import { useState } from 'react';
import type { Polygon } from '../../../../shared/contracts/geometry.ts';
import { grownRegionSchema } from '../../../../shared/contracts/sample.ts';
import { sayDone, sayProblem } from '../../components/ui/toaster.tsx';
import { fetchJson } from '../../lib/fetch-json.ts';
import { ProblemError } from '../../lib/problem-error.ts';
import type { Place } from '../../lib/project/probe-query.ts';

/** Standard deviations from the pixel pressed; small enough to stay in one cover most of the time. */
const FIRST_DISTANCE = 0.3;

interface GrowInput {
  sceneId: string;
  place: Place;
  distance: number;
}

const growFromPixel = (projectId: string, { sceneId, place, distance }: GrowInput) =>
  fetchJson(`/projects/${projectId}/samples/grow`, grownRegionSchema, {
    method: 'POST',
    body: { sceneId, lon: place.lon, lat: place.lat, distance },
  });

/** A drawing that was grown from a pixel, for as long as its distance can still be changed. */
export interface Grown {
  draftId: string;
  place: Place;
}

/** Grows outlines from pixels; the distance stays for the next one. */
export function useGrow(projectId: string, sceneId: string) {
  const [distance, setDistance] = useState(FIRST_DISTANCE);
  const [grown, setGrown] = useState<Grown | null>(null);
  const mutation = useMutation({ mutationFn: (input: GrowInput) => growFromPixel(projectId, input) });
  const grow = (place: Place, atDistance: number, take: (outline: Polygon) => void) => {
    setDistance(atDistance);
    mutation.mutate(
      { sceneId, place, distance: atDistance },
      {
        onSuccess: ({ geometry, distance: reached, remark }) => {
          if (remark) sayDone(remark);
          if (!geometry) return;
          setDistance(reached);
          take(geometry);
        },
        onError: (error) => {
          if (error instanceof ProblemError) sayProblem(error);
        },
      },
    );
  };
  return { distance, grown, setGrown, grow, isGrowing: mutation.isPending };
}
