import { useMemo, useState } from 'react';
import type { Scene } from '../../../../shared/contracts/scene.ts';
import { keepHiddenViews, listContextViews, readHiddenViews } from './context-choice.ts';

/** The pictures of a place this person looks at, and how close. */
export function useContextViews(projectId: string, scenes: readonly Scene[]) {
  const views = useMemo(() => listContextViews(scenes), [scenes]);
  const [hidden, setHidden] = useState(() => readHiddenViews(projectId, views));
  const [zoomSteps, setZoomSteps] = useState(0);
  const shown = views.filter(({ id }) => !hidden.has(id));
  return {
    views,
    hidden,
    /** Never none: a choice that fits no scene any more shows all. */
    shown: shown.length > 0 ? shown : views,
    hide(next: ReadonlySet<string>) {
      setHidden(next);
      keepHiddenViews(projectId, next);
    },
    zoomSteps,
    closer: () => setZoomSteps((steps) => Math.min(4, steps + 1)),
    farther: () => setZoomSteps((steps) => Math.max(-5, steps - 1)),
  };
}
