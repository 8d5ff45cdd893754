import type { PostProcessingStep, StepEffect } from '../../shared/contracts/post-processing.ts';
import type { RunClass } from '../entities/run.ts';

/** Steps that are applied, and how many of them somebody drew. */
export function countSteps(steps: readonly PostProcessingStep[]): { on: number; byHand: number } {
  const on = steps.filter(({ isOn }) => isOn);
  return { on: on.length, byHand: on.filter(({ kind }) => kind === 'reclass').length };
}

/** A step in a line of plain words, for reports. */
export function describeStep(step: PostProcessingStep, classes: readonly RunClass[]): string {
  const nameOf = (value: string): string => {
    if (value === 'unclassified' || value === 'any') return value === 'any' ? 'any class' : 'unclassified';
    if (value === 'nodata') return 'no data';
    return classes.find(({ id }) => id === value)?.name ?? 'a class that is gone';
  };
  switch (step.kind) {
    case 'majority':
      return `Majority filter, ${step.windowPixels} × ${step.windowPixels} pixels, ${step.ties === 'keep-centre' ? 'the centre stays on a tie' : 'the lowest class code wins a tie'}`;
    case 'sieve':
      return `Patches smaller than ${step.minAreaHa} ha merged into their largest neighbour, ${step.neighbours} neighbours`;
    case 'recode':
      return `Recoded: ${step.pairs.map(({ from, to }) => `${nameOf(from)} to ${nameOf(to)}`).join('; ')}`;
    case 'fill':
      return `Everything ${step.where} ${step.mask.kind === 'zones' ? 'the zones' : 'the study area'} set to ${nameOf(step.to)}`;
    case 'reclass':
      return `By hand: ${nameOf(step.from)} to ${nameOf(step.to)} inside an outline. Reason: ${step.reason}`;
  }
}

/** Applied steps in their order with what each changed, then the edits by hand once more with who and when. */
export function describeApplied(
  steps: readonly PostProcessingStep[],
  effects: readonly StepEffect[],
  classes: readonly RunClass[],
): { steps: string[]; byHand: string[] } {
  const on = steps.filter(({ isOn }) => isOn);
  const changed = (step: PostProcessingStep): string => {
    const effect = effects.find(({ stepId }) => stepId === step.id);
    return effect ? `${effect.changedPixels} pixels, ${effect.changedHa.toFixed(2)} ha changed` : 'not applied';
  };
  return {
    steps: on.map((step) => `${describeStep(step, classes)} (${changed(step)})`),
    byHand: on.flatMap((step) =>
      step.kind === 'reclass'
        ? [`${describeStep(step, classes)} (${step.by || 'unknown'}, ${step.at || 'undated'}; ${changed(step)})`]
        : [],
    ),
  };
}
