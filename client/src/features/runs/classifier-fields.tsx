import { useRef } from 'react';
import { useController, useWatch } from 'react-hook-form';
import type { ClassifierRecipe } from '../../../../shared/contracts/run.ts';
import { Callout } from '../../components/ui/callout.tsx';
import { RadioGroup, type RadioOption } from '../../components/ui/radio-group.tsx';
import { formatNumber } from '../../lib/format.ts';
import { defaultClassifier } from './default-recipe.ts';
import { FormSection } from './form-section.tsx';
import { NumberField } from './number-field.tsx';
import { type ClassifierKind, featuresLabel, squareRootFeatures } from './recipe-text.ts';
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
];

const SLOW: Partial<Record<ClassifierKind, string>> = {
  'random-subspace-forest':
    'Its trees grow far more slowly than those of the random forest. Keep to some tens of trees for a first look.',
  'nearest-neighbours':
    'Every pixel of the scene is compared with the training pixels: mapping a large scene takes many times as long as with a random forest. Fewer training pixels a class make it quicker.',
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
      {kind === 'nearest-neighbours' ? (
        <NumberField
          control={control}
          name="recipe.classifier.neighbours"
          label="Neighbours asked (k)"
          hint="One follows single training pixels; more even out mislabelled ones. An odd number avoids ties between two classes."
          className="sm:max-w-80"
        />
      ) : (
        <ForestFields control={control} kind={kind} />
      )}
    </FormSection>
  );
}

type RunClassifierInput = { kind: ClassifierKind } & Partial<ClassifierRecipe>;

function ForestFields({
  control,
  kind,
}: {
  control: RunFormControl;
  kind: Exclude<ClassifierKind, 'nearest-neighbours'>;
}) {
  const nBands = useWatch({ control, name: 'recipe.bandIds' }).length;
  return (
    <div className="grid items-end gap-4 sm:grid-cols-2">
      <NumberField
        control={control}
        name="recipe.classifier.trees"
        label="Trees"
        hint="More trees steady the vote and take longer; past some hundreds little changes."
      />
      <NumberField
        control={control}
        name="recipe.classifier.maxDepth"
        label="Deepest level"
        hint="Questions a tree may ask one after another. Fewer make coarser, steadier trees."
      />
      <NumberField
        control={control}
        name="recipe.classifier.minLeaf"
        label="Smallest leaf"
        hint="Training pixels an answer must rest on. 1 follows every pixel, mislabelled ones too."
      />
      <NumberField
        control={control}
        name="recipe.classifier.featuresPerTree"
        label={featuresLabel(kind)}
        placeholder={`√${formatNumber(nBands)} → ${squareRootFeatures(nBands)}`}
        hint={
          kind === 'random-forest'
            ? 'Bands tried at each split. Empty is the square root of their number, rounded down.'
            : 'Bands a tree sees at all. Empty is the square root of their number, rounded down.'
        }
      />
    </div>
  );
}
