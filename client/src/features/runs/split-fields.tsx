import { Controller, useController } from 'react-hook-form';
import { sampleStateSchema } from '../../../../shared/contracts/sample.ts';
import { Checkbox } from '../../components/ui/checkbox.tsx';
import { Field } from '../../components/ui/field.tsx';
import { NumberInput } from '../../components/ui/number-input.tsx';
import { Slider } from '../../components/ui/slider.tsx';
import { FormSection } from './form-section.tsx';
import { NumberField } from './number-field.tsx';
import { FieldFault } from './pick-all.tsx';
import { SAMPLE_STATE_NAME } from './recipe-text.ts';
import type { RunFormControl } from './run-form-values.ts';

/** What is learned from and what is held out, and how many pixels are drawn. */
export function SplitFields({ control }: { control: RunFormControl }) {
  return (
    <FormSection
      title="Samples"
      note="Held out by whole polygon, within each class, drawn by the seed: no pixel of a held-out polygon is learned from."
    >
      <SampleStatesField control={control} />
      <HeldOutField control={control} />
      <div className="grid items-end gap-4 sm:grid-cols-2">
        <NumberField
          control={control}
          name="recipe.maxPixelsPerClass"
          label="Most training pixels a class"
          hint="More are thinned at random, so that a common class does not drown the others."
        />
        <NumberField
          control={control}
          name="recipe.seed"
          label="Seed"
          hint="The same seed, recipe and samples give the same map, byte for byte."
        />
      </div>
    </FormSection>
  );
}

function SampleStatesField({ control }: { control: RunFormControl }) {
  const { field, fieldState } = useController({ control, name: 'recipe.sampleStates' });
  const chosen = field.value ?? [];
  return (
    <div role="group" aria-label="Samples used, by review state">
      <p className="text-sm font-medium">Samples used, by review state</p>
      <div className="mt-1.5 flex flex-wrap gap-x-6 gap-y-2">
        {sampleStateSchema.options.map((state) => (
          <Checkbox
            key={state}
            isChecked={chosen.includes(state)}
            onChange={(on) =>
              field.onChange(sampleStateSchema.options.filter((one) => (one === state ? on : chosen.includes(one))))
            }
            label={SAMPLE_STATE_NAME[state]}
          />
        ))}
      </div>
      <FieldFault text={fieldState.error?.message} />
    </div>
  );
}

const percentOf = (share: number) => Math.round(share * 1000) / 10;

function HeldOutField({ control }: { control: RunFormControl }) {
  return (
    <Controller
      control={control}
      name="recipe.heldOutShare"
      render={({ field, fieldState }) => {
        const share = typeof field.value === 'number' ? field.value : null;
        return (
          <Field label="Held out for the accuracy" error={fieldState.error?.message}>
            <div className="flex items-center gap-4">
              <Slider
                value={[percentOf(share ?? 0.3)]}
                onChange={([percent = 30]) => field.onChange(percent / 100)}
                min={5}
                max={90}
                step={5}
                labels={['Share of each class’s polygons held out']}
                formatValue={(percent) => `${percent} %`}
              />
              <div className="w-28 shrink-0">
                <NumberInput
                  ref={field.ref}
                  unit="%"
                  value={share === null ? null : percentOf(share)}
                  onChange={(percent) => field.onChange(percent === null ? null : Math.round(percent * 10) / 1000)}
                  onBlur={field.onBlur}
                />
              </div>
            </div>
          </Field>
        );
      }}
    />
  );
}
