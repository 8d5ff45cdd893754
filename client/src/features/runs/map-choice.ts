import type { RunLayer } from '../../../../shared/contracts/run.ts';

/** What the run's map shows. */
export type ShownLayer = 'classes' | RunLayer;
/** What lies right of the divider: nothing, the scene alone, or another run's class map (its id). */
export type SwipeChoice = 'none' | 'scene' | (string & {});

export const LAYER_NAMES: Record<ShownLayer, string> = {
  classes: 'Classes',
  confidence: 'Confidence',
  margin: 'Margin',
};

/** What a layer says of a pixel, in a sentence. */
export const LAYER_MEANING: Record<RunLayer, string> = {
  confidence: 'Share of the votes, or the chance, of the class a pixel was given.',
  margin: 'How far the class of a pixel lies before the runner-up: near 0 % it was a toss-up.',
};
