import type { PostProcessingStep } from '../../../../shared/contracts/post-processing.ts';

export type StepKind = PostProcessingStep['kind'];

export const STEP_NAMES: Record<StepKind, string> = {
  majority: 'Majority filter',
  sieve: 'Minimum mapping unit',
  recode: 'Recode classes',
  fill: 'Fill from a mask',
  reclass: 'Edit by hand',
};

export const STEP_HINTS: Record<StepKind, string> = {
  majority: 'Each pixel takes the most frequent class of its window',
  sieve: 'Patches below an area go to their largest neighbour',
  recode: 'Merge a class into another, or take it off the map',
  fill: 'Everything inside or outside zones becomes one class',
  reclass: 'Draw an outline and change a class in it, with a reason',
};

export interface ClassChoice {
  id: string;
  code: number;
  name: string;
  colour: string;
}

/** A new step as it is offered first; null where it cannot be made without a drawing. */
export function makeStep(
  kind: Exclude<StepKind, 'reclass'>,
  classes: readonly ClassChoice[],
  layerId: string | null,
): PostProcessingStep {
  const base = { id: crypto.randomUUID(), isOn: true };
  const [first, second] = classes;
  switch (kind) {
    case 'majority':
      return { ...base, kind, windowPixels: 3, ties: 'keep-centre' };
    case 'sieve':
      return { ...base, kind, minAreaHa: 0.5, neighbours: 4 };
    case 'recode':
      return { ...base, kind, pairs: [{ from: second?.id ?? 'unclassified', to: first?.id ?? 'unclassified' }] };
    case 'fill':
      return {
        ...base,
        kind,
        mask: layerId === null ? { kind: 'study-area' } : { kind: 'zones', layerId },
        where: 'outside',
        to: 'nodata',
      };
  }
}
