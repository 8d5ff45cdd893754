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

/** How somebody looks at places. */
export interface ContextChoice {
  /** Views taken away; null until the person has chosen. */
  hidden: readonly string[] | null;
  hasOutlines: boolean;
  /** Colours stretched to what is around the place, not to the whole scene. */
  isLocal: boolean;
  /** Steps closer (above 0) or farther than the first view. */
  zoomSteps: number;
}

export const FARTHEST = -5;
export const CLOSEST = 4;

const choiceSchema = z.object({
  hidden: z.array(z.string()).nullable(),
  hasOutlines: z.boolean(),
  isLocal: z.boolean(),
  zoomSteps: z.number().int().min(FARTHEST).max(CLOSEST),
});
const FIRST_CHOICE: ContextChoice = { hidden: null, hasOutlines: true, isLocal: false, zoomSteps: 0 };
const keyOf = (projectId: string, personId: string) => `groundsel.context.${projectId}.${personId}`;

/** What this person chose in this browser the last time. */
export function readContextChoice(projectId: string, personId: string): ContextChoice {
  const text = localStorage.getItem(keyOf(projectId, personId));
  if (!text) return FIRST_CHOICE;
  try {
    const parsed = choiceSchema.safeParse(JSON.parse(text));
    return parsed.success ? parsed.data : FIRST_CHOICE;
  } catch {
    // Text of another hand: the first choice loses nothing.
    return FIRST_CHOICE;
  }
}

export function keepContextChoice(projectId: string, personId: string, choice: ContextChoice): void {
  localStorage.setItem(keyOf(projectId, personId), JSON.stringify(choice));
}

/** Coarser than its neighbours and hard to read on its own, so not shown until it is asked for. */
const HIDDEN_AT_FIRST = 'thermal';

/** Ids of the views not shown. */
export function hiddenViews(choice: ContextChoice, views: readonly ContextView[]): ReadonlySet<string> {
  if (choice.hidden) return new Set(choice.hidden);
  return new Set(views.filter(({ view }) => view.compositeId === HIDDEN_AT_FIRST).map(({ id }) => id));
}
