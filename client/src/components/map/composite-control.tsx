import type { Band } from '../../../../shared/contracts/scene.ts';
import {
  CUSTOM_COMPOSITE,
  type SceneView,
  type ScreenBands,
  sceneComposites,
  shownCompositeId,
  viewBands,
} from '../../lib/scene-view.ts';
import { Button } from '../ui/button.tsx';
import { Field } from '../ui/field.tsx';
import { Popover } from '../ui/popover.tsx';
import { Segmented } from '../ui/segmented.tsx';
import { Select } from '../ui/select.tsx';

export interface CompositeControlProps {
  bands: readonly Band[];
  view: SceneView;
  onChange: (view: SceneView) => void;
}

/** Which bands are on the screen: the composites the scene allows, and any one or three bands by hand. */
export function CompositeControl({ bands, view, onChange }: CompositeControlProps) {
  const composites = sceneComposites(bands);
  const shown = shownCompositeId(bands, view);
  return (
    <div className="flex items-center gap-1.5">
      {composites.length > 0 && (
        <Segmented
          label="Composite"
          value={shown}
          onChange={(compositeId) => onChange({ ...view, compositeId })}
          options={composites.map((composite) => ({ value: composite.id, label: composite.name }))}
        />
      )}
      <Popover
        label="Bands on the screen"
        className="w-72"
        trigger={
          <Button size="sm" kind={shown === CUSTOM_COMPOSITE ? 'strong' : 'secondary'}>
            {shown === CUSTOM_COMPOSITE ? `Bands ${viewBands(bands, view).join(' ')}` : 'Bands…'}
          </Button>
        }
      >
        <BandPicker
          bands={bands}
          value={viewBands(bands, view)}
          onChange={(customBands) => onChange({ ...view, compositeId: CUSTOM_COMPOSITE, customBands })}
        />
      </Popover>
    </div>
  );
}

const CHANNELS = ['Red of the screen', 'Green of the screen', 'Blue of the screen'];

function BandPicker(props: { bands: readonly Band[]; value: ScreenBands; onChange: (bands: ScreenBands) => void }) {
  const { bands, value, onChange } = props;
  const options = bands.map((band) => ({ value: String(band.number), label: `${band.number} · ${band.name}` }));
  const isGrey = value.length === 1;
  const set = (channel: number, text: string) => {
    const next = value.map((number, index) => (index === channel ? Number(text) : number));
    onChange(next as unknown as ScreenBands);
  };
  return (
    <div className="space-y-3">
      <Segmented
        label="Bands on the screen"
        value={isGrey ? 'one' : 'three'}
        onChange={(kind) => onChange(kind === 'one' ? [value[0]] : [value[0], value[0], value[0]])}
        options={[
          { value: 'three', label: 'Three in colour' },
          { value: 'one', label: 'One in grey' },
        ]}
      />
      {value.map((number, channel) => (
        <Field key={channel} label={isGrey ? 'Band' : CHANNELS[channel]}>
          <Select size="sm" value={String(number)} onChange={(text) => set(channel, text)} options={options} />
        </Field>
      ))}
    </div>
  );
}
