import { useQueries } from '@tanstack/react-query';
import { useEffect, useState } from 'react';
import type { Design } from '../../../../shared/contracts/reference.ts';
import type { Scene } from '../../../../shared/contracts/scene.ts';
import { ContextViews } from '../../components/place/context-views.tsx';
import { placeMeasureQuery } from '../../components/place/place-measure.ts';
import type { ContextState } from '../../components/place/use-context-views.ts';
import { useFollowingPoint } from '../../features/interpretation/blind-point-queries.ts';

export interface FollowingPlaceProps {
  design: Design;
  /** The point after the one at hand; null at the end. */
  number: number | null;
  scenes: readonly Scene[];
  context: ContextState;
}

/** The point at hand comes first. */
const WAIT_MS = 1200;

/** Reads the pictures and spectra of the point after ahead, unseen, so that going on needs no waiting. */
export function FollowingPlace({ design, number, scenes, context }: FollowingPlaceProps) {
  const [isTime, setIsTime] = useState(false);
  useEffect(() => {
    const timer = setTimeout(() => setIsTime(true), WAIT_MS);
    return () => clearTimeout(timer);
  }, []);
  const point = useFollowingPoint(design.id, isTime ? number : null);
  useQueries({
    queries: scenes
      .filter(({ state }) => state === 'ready' && point !== null)
      .flatMap((scene) =>
        [point?.outline, point?.outline3].flatMap((outline) =>
          outline ? [placeMeasureQuery(design.projectId, scene, outline)] : [],
        ),
      ),
  });
  if (!point) return null;
  return (
    <div aria-hidden inert className="invisible absolute inset-3 -z-10">
      <ContextViews
        projectId={design.projectId}
        place={point}
        views={context.shown}
        zoomSteps={context.zoomSteps}
        hasOutlines={false}
        isLocal={context.isLocal}
        isLarge={context.largeId !== null}
      />
    </div>
  );
}
