import { useController } from 'react-hook-form';
import type { LandClass } from '../../../../shared/contracts/land-class.ts';
import { Checkbox } from '../../components/ui/checkbox.tsx';
import { ClassSwatch } from '../../components/ui/class-swatch.tsx';
import { formatCount } from '../../lib/format.ts';
import { MIN_SAMPLES_PER_CLASS } from './default-recipe.ts';
import { FormSection } from './form-section.tsx';
import { FieldFault, PickAll } from './pick-all.tsx';
import type { RunFormControl } from './run-form-values.ts';

/** Which classes the map may show. */
export function ClassFields({ control, classes }: { control: RunFormControl; classes: readonly LandClass[] }) {
  const { field, fieldState } = useController({ control, name: 'recipe.classIds' });
  const set = (isOn: (landClass: LandClass) => boolean) => field.onChange(classes.filter(isOn).map((one) => one.id));
  return (
    <FormSection
      title="Classes"
      note="A class left out cannot appear in the map: its ground goes to the classes that are in."
    >
      <div role="group" aria-label="Classes">
        <PickAll
          title="Classes"
          nChosen={field.value.length}
          nAll={classes.length}
          onAll={() => set(() => true)}
          onNone={() => set(() => false)}
        />
        <ul className="mt-1.5 grid gap-x-8 border-t border-line sm:grid-cols-2">
          {classes.map((landClass) => (
            <li key={landClass.id} className="flex items-start gap-3 border-b border-line py-1.5">
              <Checkbox
                className="grow"
                isChecked={field.value.includes(landClass.id)}
                onChange={(on) => set((one) => (one.id === landClass.id ? on : field.value.includes(one.id)))}
                label={
                  <span className="flex items-start gap-2 [&>svg]:mt-1">
                    <ClassSwatch size="sm" colour={landClass.colour} position={landClass.position} />
                    {landClass.name}
                  </span>
                }
              />
              <span
                className={`text-sm whitespace-nowrap ${landClass.sampleCount < MIN_SAMPLES_PER_CLASS ? 'font-medium text-rust' : 'text-ink-soft'}`}
              >
                {formatCount(landClass.sampleCount, 'sample')}
              </span>
            </li>
          ))}
        </ul>
        <FieldFault text={fieldState.error?.message} />
      </div>
    </FormSection>
  );
}
