import { z } from 'zod';
import type { Scene } from '../../../../shared/contracts/scene.ts';
import { DEFAULT_VIEW, sceneComposites, type SceneView } from '../../lib/scene-view.ts';

/** One picture of a place: a scene in a composite. */
export interface ContextView {
  id: string;
  scene: Scene;
  view: SceneView;
  /** "Natural colour". */
  composite: string;
}

/** Every composite of every scene, scenes by date, thermal and the like included. */
export function listContextViews(scenes: readonly Scene[]): ContextView[] {
  return scenes
    .filter(({ state }) => state === 'ready')
    .toSorted((a, b) => (a.acquiredOn ?? '').localeCompare(b.acquiredOn ?? ''))
    .flatMap((scene) => {
      const composites = sceneComposites(scene.bands);
      const known = composites.length > 0 ? composites : [{ id: 'first', name: 'First bands' }];
      return known.map(({ id, name }) => ({
        id: `${scene.id} ${id}`,
        scene,
        view: { ...DEFAULT_VIEW, compositeId: id },
        composite: name,
      }));
    });
}

const hiddenSchema = z.array(z.string());
const keyOf = (projectId: string) => `groundsel.context.${projectId}`;
/** Coarser than its neighbours and hard to read on its own, so not shown until it is asked for. */
const HIDDEN_AT_FIRST = 'thermal';

/** Views this person has taken away in this browser. */
export function readHiddenViews(projectId: string, views: readonly ContextView[]): ReadonlySet<string> {
  const text = localStorage.getItem(keyOf(projectId));
  if (text) {
    try {
      const parsed = hiddenSchema.safeParse(JSON.parse(text));
      if (parsed.success) return new Set(parsed.data);
    } catch {
      // Text of another hand: the first choice loses nothing.
    }
  }
  return new Set(views.filter(({ view }) => view.compositeId === HIDDEN_AT_FIRST).map(({ id }) => id));
}

export function keepHiddenViews(projectId: string, hidden: ReadonlySet<string>): void {
  localStorage.setItem(keyOf(projectId), JSON.stringify([...hidden]));
}
