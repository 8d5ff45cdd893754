import { useRef } from 'react';
import { useController, useWatch } from 'react-hook-form';
import type { ClassifierRecipe } from '../../../../shared/contracts/run.ts';
import { Callout } from '../../components/ui/callout.tsx';
import { RadioGroup, type RadioOption } from '../../components/ui/radio-group.tsx';
import { defaultClassifier } from './default-recipe.ts';
import { FormSection } from './form-section.tsx';
import { ForestFields } from './forest-fields.tsx';
import { ChoiceField } from './choice-field.tsx';
import { NumberField } from './number-field.tsx';
import { PercentField } from './percent-field.tsx';
import type { ClassifierKind } from './recipe-text.ts';
import type { RunFormControl } from './run-form-values.ts';

const OPTIONS: readonly RadioOption<ClassifierKind>[] = [
  {
    value: 'random-forest',
    label: 'Random forest',
    hint: 'Many decision trees, each grown on a random draw of the training pixels, with a few bands tried at each split; the trees vote. Quick, and a good first choice.',
  },
  {
    value: 'random-subspace-forest',
    label: 'Random-subspace forest',
    hint: 'Each tree sees its own few bands throughout. Trees differ more from each other; single trees are weaker.',
  },
  {
    value: 'nearest-neighbours',
    label: 'k-nearest neighbours',
    hint: 'A pixel takes the class most of the k most similar training pixels have, bands brought to one scale first. Nothing is learned beforehand.',
  },
  {
    value: 'gaussian-maximum-likelihood',
    label: 'Gaussian maximum likelihood',
    hint: 'Each class is a cloud of band values with its own centre, spread and slant; a pixel goes to the likeliest. Wants one class to be one cloud, and well more training pixels a class than bands.',
  },
  {
    value: 'minimum-distance',
    label: 'Minimum distance',
    hint: 'A pixel goes to the class whose mean is nearest. The simplest of all, and steady where training pixels are few.',
  },
];

const SLOW: Partial<Record<ClassifierKind, string>> = {
  'random-subspace-forest':
    'Its trees grow far more slowly than those of the random forest. Keep to some tens of trees for a first look.',
};

/** The classifier and its settings; the settings of one that was left are kept for coming back. */
export function ClassifierFields({ control }: { control: RunFormControl }) {
  const { field } = useController({ control, name: 'recipe.classifier' });
  const kept = useRef<Partial<Record<ClassifierKind, RunClassifierInput>>>({});
  // The controller of the whole does not hear of its parts; the watch does.
  const settings = useWatch({ control, name: 'recipe.classifier' });
  const kind = settings.kind;
  const choose = (next: ClassifierKind) => {
    if (next === kind) return;
    kept.current[kind] = { ...settings };
    field.onChange(kept.current[next] ?? defaultClassifier(next));
  };
  return (
    <FormSection title="Classifier" note="How a pixel’s band values become a class.">
      <RadioGroup aria-label="Classifier" isCards value={kind} onChange={choose} options={OPTIONS} />
      {SLOW[kind] && (
        <Callout tone="beware" title="Slow.">
          {SLOW[kind]}
        </Callout>
      )}
      <SettingFields control={control} kind={kind} />
      <PercentField
        control={control}
        name="recipe.minShare"
        label="Leave unclassified below"
        hint={`A pixel whose class has a smaller ${SHARE_OF[kind]} gets no class. 0 gives every pixel one.`}
      />
    </FormSection>
  );
}

type RunClassifierInput = { kind: ClassifierKind } & Partial<ClassifierRecipe>;

/** What a pixel's class has a share of. */
const SHARE_OF: Record<ClassifierKind, string> = {
  'random-forest': 'share of the trees’ votes',
  'random-subspace-forest': 'share of the trees’ votes',
  'nearest-neighbours': 'share of the neighbours’ votes',
  'gaussian-maximum-likelihood': 'chance among the classes',
  'minimum-distance': 'chance among the classes',
};

function SettingFields({ control, kind }: { control: RunFormControl; kind: ClassifierKind }) {
  switch (kind) {
    case 'random-forest':
    case 'random-subspace-forest':
      return <ForestFields control={control} kind={kind} />;
    case 'nearest-neighbours':
      return (
        <NumberField
          control={control}
          name="recipe.classifier.neighbours"
          label="Neighbours asked (k)"
          hint="One follows single training pixels; more even out mislabelled ones. An odd number avoids ties between two classes."
          className="sm:max-w-80"
        />
      );
    case 'gaussian-maximum-likelihood':
      return <GaussianFields control={control} />;
    case 'minimum-distance':
      return (
        <ChoiceField
          control={control}
          name="recipe.classifier.metric"
          label="Distance"
          options={[
            {
              value: 'mahalanobis',
              label: 'Mahalanobis',
              hint: 'Counted in the spread and slant that the classes have in common.',
            },
            {
              value: 'euclidean',
              label: 'Euclidean',
              hint: 'Straight, in the bands’ stored values: a band with larger values counts for more.',
            },
          ]}
        />
      );
  }
}

function GaussianFields({ control }: { control: RunFormControl }) {
  return (
    <div className="grid items-start gap-4 sm:grid-cols-2">
      <ChoiceField
        control={control}
        name="recipe.classifier.priors"
        label="Held likely beforehand"
        options={[
          { value: 'equal', label: 'All classes alike' },
          {
            value: 'training',
            label: 'As training pixels stand',
            hint: 'Only where their numbers follow the ground, not the effort of drawing.',
          },
        ]}
      />
      <PercentField
        control={control}
        name="recipe.classifier.ridge"
        label="Ridge"
        hint="Added to each class’s variances, as a share of the variance the classes have in common. A few per cent let a class with too few training pixels be used; 0 adds nothing."
      />
    </div>
  );
}
