import { useMemo, useState } from 'react';
import type { Scene } from '../../../../shared/contracts/scene.ts';
import type { KeyMap } from '../../lib/keys.ts';
import { useAccount } from '../../lib/use-account.ts';
import {
  CLOSEST,
  type ContextChoice,
  type ContextView,
  FARTHEST,
  hiddenViews,
  keepContextChoice,
  listContextViews,
  readContextChoice,
} from './context-choice.ts';

/** How places are looked at now, and what changes it. */
export interface ContextState {
  views: readonly ContextView[];
  hidden: ReadonlySet<string>;
  /** The views to draw: never none. */
  shown: readonly ContextView[];
  /** The one view that fills the room; null while all stand side by side. */
  largeId: string | null;
  hasOutlines: boolean;
  isLocal: boolean;
  zoomSteps: number;
  hide: (hidden: ReadonlySet<string>) => void;
  enlarge: (id: string | null) => void;
  toggleOutlines: () => void;
  toggleLocal: () => void;
  closer: () => void;
  farther: () => void;
}

/** The pictures of a place this person looks at, and how; kept for next time. */
export function useContextViews(projectId: string, scenes: readonly Scene[]): ContextState {
  const { id: personId } = useAccount();
  const views = useMemo(() => listContextViews(scenes), [scenes]);
  const [choice, setChoice] = useState(() => readContextChoice(projectId, personId));
  const [largeId, setLargeId] = useState<string | null>(null);
  const change = (part: Partial<ContextChoice>) => {
    const next = { ...choice, ...part };
    setChoice(next);
    keepContextChoice(projectId, personId, next);
  };
  const hidden = hiddenViews(choice, views);
  const chosen = views.filter(({ id }) => !hidden.has(id));
  // A choice that fits no scene any more shows all.
  const sideBySide = chosen.length > 0 ? chosen : views;
  const large = sideBySide.find(({ id }) => id === largeId);
  return {
    ...{ views, hidden, shown: large ? [large] : sideBySide, largeId: large?.id ?? null },
    ...{ hasOutlines: choice.hasOutlines, isLocal: choice.isLocal, zoomSteps: choice.zoomSteps },
    hide: (next) => change({ hidden: [...next] }),
    enlarge: setLargeId,
    toggleOutlines: () => change({ hasOutlines: !choice.hasOutlines }),
    toggleLocal: () => change({ isLocal: !choice.isLocal }),
    closer: () => change({ zoomSteps: Math.min(CLOSEST, choice.zoomSteps + 1) }),
    farther: () => change({ zoomSteps: Math.max(FARTHEST, choice.zoomSteps - 1) }),
  };
}

/** The keys of the pictures; CONTEXT_KEY_NAMES says them. */
export function contextKeys(context: ContextState): KeyMap {
  const { views, hidden, largeId, enlarge } = context;
  const ids = views.filter(({ id }) => !hidden.has(id)).map(({ id }) => id);
  return {
    '+': context.closer,
    '=': context.closer,
    '-': context.farther,
    o: context.toggleOutlines,
    l: context.toggleLocal,
    v: () => enlarge(ids[largeId === null ? 0 : ids.indexOf(largeId) + 1] ?? null),
    Escape: () => (largeId === null ? false : enlarge(null)),
  };
}

export const CONTEXT_KEY_NAMES: readonly [string[], string][] = [
  [['+', '−'], 'Pictures closer, farther'],
  [['V'], 'One picture large, then the next; Esc for all'],
  [['O'], 'Outlines off and on, to see the pixel itself'],
  [['L'], 'Colours stretched to what is around, and back'],
];
