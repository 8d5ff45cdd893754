import { useState } from 'react';
import { z } from 'zod';
import { DEFAULT_VIEW, type SceneView } from './scene-view.ts';

const bandNumber = z.number().int().min(1);
const storedViewSchema = z.object({
  compositeId: z.string(),
  customBands: z.union([z.tuple([bandNumber]), z.tuple([bandNumber, bandNumber, bandNumber])]).nullable(),
  stretch: z.object({
    lowPercent: z.number().min(0).max(99),
    highPercent: z.number().min(1).max(100),
    gamma: z.number().min(0.2).max(5),
  }),
});

/** How this browser looks at a project's scenes, kept for next time and shared by its map pages. */
export function useSceneView(projectId: string): [SceneView, (view: SceneView) => void] {
  const key = `groundsel.view.${projectId}`;
  const [view, setView] = useState(() => readView(key));
  const change = (next: SceneView) => {
    setView(next);
    localStorage.setItem(key, JSON.stringify(next));
  };
  return [view, change];
}

function readView(key: string): SceneView {
  const text = localStorage.getItem(key);
  if (!text) return DEFAULT_VIEW;
  try {
    const parsed = storedViewSchema.safeParse(JSON.parse(text));
    return parsed.success ? parsed.data : DEFAULT_VIEW;
  } catch {
    // Text of an older version or another hand: the default view loses nothing.
    return DEFAULT_VIEW;
  }
}
