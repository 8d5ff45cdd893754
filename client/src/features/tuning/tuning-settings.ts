import type { ClassifierRecipe } from '../../../../shared/contracts/run.ts';
import type { TuningTrial } from '../../../../shared/contracts/tuning.ts';

type Value = TuningTrial['values'][number];

/** A setting that can be varied: its name, and the values the form begins with. */
export interface TunableSetting {
  parameter: string;
  label: string;
  /** What a value may be, said under the field. */
  hint: string;
  values: readonly Value[];
  /** Whether it is varied unless somebody says otherwise. */
  isOn: boolean;
}

const forest: readonly TunableSetting[] = [
  { parameter: 'trees', label: 'Trees', hint: 'Whole numbers up to 2000.', values: [50, 100, 200], isOn: true },
  {
    parameter: 'featuresPerTree',
    label: 'Features drawn',
    hint: 'Whole numbers; “auto” is the square root of their number.',
    values: [null, 1, 3],
    isOn: true,
  },
  { parameter: 'minLeaf', label: 'Smallest leaf, pixels', hint: 'Whole numbers.', values: [1, 3, 10], isOn: false },
  { parameter: 'maxDepth', label: 'Deepest level', hint: 'Whole numbers up to 64.', values: [8, 16, 25], isOn: false },
];

/** The settings of each classifier that can be varied, in the order of the form. */
export const TUNABLE: Record<ClassifierRecipe['kind'], readonly TunableSetting[]> = {
  'random-forest': [
    ...forest,
    {
      parameter: 'classWeights',
      label: 'Class weights',
      hint: '“none” or “balanced”.',
      values: ['none', 'balanced'],
      isOn: false,
    },
  ],
  'random-subspace-forest': forest,
  'nearest-neighbours': [
    {
      parameter: 'neighbours',
      label: 'Neighbours',
      hint: 'Whole numbers up to 50.',
      values: [1, 3, 5, 9, 15],
      isOn: true,
    },
    {
      parameter: 'standardise',
      label: 'Bands on one scale',
      hint: '“yes” or “no”.',
      values: [true, false],
      isOn: true,
    },
  ],
  'gaussian-maximum-likelihood': [
    { parameter: 'ridge', label: 'Ridge', hint: 'From 0 to 1.', values: [0, 0.001, 0.01, 0.1], isOn: true },
    {
      parameter: 'priors',
      label: 'Priors',
      hint: '“equal” or “training”.',
      values: ['equal', 'training'],
      isOn: true,
    },
  ],
  'minimum-distance': [
    {
      parameter: 'metric',
      label: 'Distance',
      hint: '“euclidean” or “mahalanobis”.',
      values: ['euclidean', 'mahalanobis'],
      isOn: true,
    },
  ],
};

export function settingLabel(kind: ClassifierRecipe['kind'], parameter: string): string {
  return TUNABLE[kind].find((setting) => setting.parameter === parameter)?.label ?? parameter;
}

/** A value as the form and the table print it. */
export function printValue(value: Value): string {
  if (value === null) return 'auto';
  if (typeof value === 'boolean') return value ? 'yes' : 'no';
  return String(value);
}

/** Values typed with commas between them; words stand for themselves. An empty text is no value. */
export function readValues(text: string): Value[] {
  return text
    .split(/[,;]/)
    .map((part) => part.trim())
    .filter((part) => part !== '')
    .map((part) => {
      const word = part.toLowerCase();
      if (word === 'auto') return null;
      if (word === 'yes') return true;
      if (word === 'no') return false;
      return Number.isFinite(Number(part)) ? Number(part) : word;
    });
}
