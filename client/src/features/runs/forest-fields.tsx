import { useWatch } from 'react-hook-form';
import { formatNumber } from '../../lib/format.ts';
import { ChoiceField } from './choice-field.tsx';
import { NumberField } from './number-field.tsx';
import { featuresLabel, type ForestKind, squareRootFeatures } from './recipe-text.ts';
import type { RunFormControl } from './run-form-values.ts';

/** The settings of a forest. */
export function ForestFields({ control, kind }: { control: RunFormControl; kind: ForestKind }) {
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
      {kind === 'random-forest' && (
        <ChoiceField
          control={control}
          name="recipe.classifier.classWeights"
          label="Weight of the classes"
          options={[
            { value: 'none', label: 'By their training pixels' },
            {
              value: 'balanced',
              label: 'All the same',
              hint: 'Finds more of a class with few training pixels, and mistakes more of the others for it.',
            },
          ]}
        />
      )}
    </div>
  );
}
