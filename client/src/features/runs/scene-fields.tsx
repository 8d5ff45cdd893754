import { useController } from 'react-hook-form';
import { BAND_ROLE_NAME } from '../../../../shared/constants/bands.ts';
import { THERMAL_CAUTION } from '../../../../shared/constants/cautions.ts';
import type { Band, Scene } from '../../../../shared/contracts/scene.ts';
import { Callout } from '../../components/ui/callout.tsx';
import { Checkbox } from '../../components/ui/checkbox.tsx';
import { Field } from '../../components/ui/field.tsx';
import { Select } from '../../components/ui/select.tsx';
import { formatCalendarDate } from '../../lib/format-date.ts';
import { formatNumber } from '../../lib/format.ts';
import { formatGsd, isCoarse } from './band-choice.ts';
import { defaultBandIds } from './default-recipe.ts';
import { FieldFault, PickAll } from './pick-all.tsx';
import { FormSection } from './form-section.tsx';
import type { RunFormControl } from './run-form-values.ts';

/** Which scene is mapped, and which of its bands the classifier sees. */
export function SceneFields({ control, scenes }: { control: RunFormControl; scenes: readonly Scene[] }) {
  const scene = useController({ control, name: 'recipe.sceneId' });
  const bandIds = useController({ control, name: 'recipe.bandIds' });
  const chosen = scenes.find((one) => one.id === scene.field.value);
  const bands = chosen?.bands ?? [];
  const isOn = (band: Band) => bandIds.field.value.includes(band.id);
  const set = (next: readonly Band[]) =>
    bandIds.field.onChange(bands.filter((band) => next.includes(band)).map((band) => band.id));
  return (
    <FormSection title="Scene and bands" note="Every pixel of the scene with data in all chosen bands gets a class.">
      <Field label="Scene" error={scene.fieldState.error?.message}>
        <Select
          value={scene.field.value}
          onChange={(sceneId) => {
            scene.field.onChange(sceneId);
            bandIds.field.onChange(defaultBandIds(scenes.find((one) => one.id === sceneId)?.bands ?? []));
          }}
          options={scenes.map((one) => ({
            value: one.id,
            label: one.acquiredOn ? `${one.name}, ${formatCalendarDate(one.acquiredOn)}` : one.name,
          }))}
        />
      </Field>
      <div role="group" aria-label="Bands">
        <PickAll
          title="Bands"
          nChosen={bandIds.field.value.length}
          nAll={bands.length}
          onAll={() => set(bands)}
          onNone={() => set([])}
        />
        <ul className="mt-1.5 divide-y divide-line border-y border-line">
          {bands.map((band) => (
            <li key={band.id} className="flex items-start gap-4 py-1.5">
              <Checkbox
                className="grow"
                isChecked={isOn(band)}
                onChange={(on) => set(bands.filter((one) => (one === band ? on : isOn(one))))}
                label={
                  <>
                    <span className="mr-1.5 text-ink-soft">{band.number}</span>
                    {BAND_ROLE_NAME[band.role]}
                    {band.name !== BAND_ROLE_NAME[band.role] && <span className="text-ink-soft"> · {band.name}</span>}
                  </>
                }
              />
              <span className="text-sm whitespace-nowrap text-ink-soft">
                {band.centreWavelengthUm !== null && `${formatNumber(band.centreWavelengthUm, 2)} µm`}
                {band.gsdMeters !== null && (
                  <span className={isCoarse(band, bands) ? 'font-medium text-rust' : undefined}>
                    {band.centreWavelengthUm !== null && ' · '}
                    {formatGsd(band.gsdMeters)}
                    {isCoarse(band, bands) && ', coarser'}
                  </span>
                )}
              </span>
            </li>
          ))}
        </ul>
        <FieldFault text={bandIds.fieldState.error?.message} />
      </div>
      {bands.some((band) => band.role === 'thermal' && isOn(band)) && (
        <Callout tone="beware" title="Thermal.">
          {THERMAL_CAUTION} Edges between classes can blur by as much.
        </Callout>
      )}
    </FormSection>
  );
}
