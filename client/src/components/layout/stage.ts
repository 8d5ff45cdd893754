import type { Stage } from '../../../../shared/contracts/project.ts';

export type StageId = Stage['id'];
export type StageState = Stage['state'];

/** The stages in the order of the work, as the rail prints them. */
export const STAGE_NAMES: readonly { id: StageId; name: string }[] = [
  { id: 'overview', name: 'Overview' },
  { id: 'scenes', name: 'Scenes' },
  { id: 'classes', name: 'Classes' },
  { id: 'samples', name: 'Samples' },
  { id: 'runs', name: 'Runs' },
  { id: 'accuracy', name: 'Accuracy' },
  { id: 'handover', name: 'Handover' },
];

export const STATE_TEXT: Record<StageState, string> = {
  empty: 'not begun',
  part: 'under way',
  done: 'done',
};
