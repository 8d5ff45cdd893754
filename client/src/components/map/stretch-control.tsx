import { SlidersHorizontal } from 'lucide-react';
import { useState } from 'react';
import { formatNumber } from '../../lib/format.ts';
import { DEFAULT_STRETCH, type Stretch } from '../../lib/scene-view.ts';
import { Button } from '../ui/button.tsx';
import { Popover } from '../ui/popover.tsx';
import { Segmented } from '../ui/segmented.tsx';
import { Slider } from '../ui/slider.tsx';

const percent = (value: number) => `${formatNumber(value, value % 1 === 0 ? 0 : 1)} %`;
const PRESETS = [
  { low: 0, high: 100, label: 'Min–max' },
  { low: 0.5, high: 99.5, label: '0.5–99.5' },
  { low: 1, high: 99, label: '1–99' },
  { low: 2, high: 98, label: '2–98' },
  { low: 5, high: 95, label: '5–95' },
];
const presetId = (low: number, high: number) => `${low}-${high}`;
/** Gamma on a slider by its logarithm, so that 0.5 and 2 lie equally far from 1. */
const gammaOfStep = (step: number) => Number((2 ** (step / 20)).toFixed(2));
const stepOfGamma = (gamma: number) => Math.round(20 * Math.log2(gamma));

/** Where each band's values are cut, and how mid-tones are lifted. The tiles follow on letting go. */
export function StretchControl({ stretch, onChange }: { stretch: Stretch; onChange: (stretch: Stretch) => void }) {
  const isDefault = (Object.keys(DEFAULT_STRETCH) as (keyof Stretch)[]).every(
    (key) => stretch[key] === DEFAULT_STRETCH[key],
  );
  return (
    <Popover
      label="Stretch"
      align="end"
      className="w-76"
      trigger={
        <Button size="sm" kind={isDefault ? 'secondary' : 'strong'} icon={<SlidersHorizontal aria-hidden />}>
          Stretch
        </Button>
      }
    >
      <StretchSliders key={Object.values(stretch).join()} stretch={stretch} onChange={onChange} />
      <Button
        size="sm"
        kind="ghost"
        disabled={isDefault}
        onClick={() => onChange(DEFAULT_STRETCH)}
        className="mt-2 -ml-2.5"
      >
        Back to 2–98 %, gamma 1
      </Button>
    </Popover>
  );
}

function StretchSliders({ stretch, onChange }: { stretch: Stretch; onChange: (stretch: Stretch) => void }) {
  const [draft, setDraft] = useState(stretch);
  return (
    <>
      <p className="flex justify-between font-medium">
        Percentiles
        <span className="font-normal text-ink-soft">
          {percent(draft.lowPercent)} – {percent(draft.highPercent)}
        </span>
      </p>
      <Segmented
        label="Percentile presets"
        className="my-1.5 text-xs! *:px-2!"
        value={presetId(stretch.lowPercent, stretch.highPercent)}
        onChange={(id) => {
          const preset = PRESETS.find(({ low, high }) => presetId(low, high) === id);
          if (preset) onChange({ ...stretch, lowPercent: preset.low, highPercent: preset.high });
        }}
        options={PRESETS.map(({ low, high, label }) => ({ value: presetId(low, high), label }))}
      />
      <Slider
        value={[draft.lowPercent, draft.highPercent]}
        onChange={([lowPercent = 2, highPercent = 98]) =>
          setDraft({ ...draft, lowPercent, highPercent: Math.max(highPercent, lowPercent + 0.5) })
        }
        onCommit={() => onChange(draft)}
        min={0}
        max={100}
        step={0.5}
        labels={['Dark end', 'Bright end']}
        formatValue={percent}
      />
      <p className="mt-2 flex justify-between font-medium">
        Gamma <span className="font-normal text-ink-soft">{formatNumber(draft.gamma, 2)}</span>
      </p>
      <Slider
        value={[stepOfGamma(draft.gamma)]}
        onChange={([step = 0]) => setDraft({ ...draft, gamma: gammaOfStep(step) })}
        onCommit={() => onChange(draft)}
        min={-40}
        max={40}
        labels={['Gamma']}
        formatValue={(step) => formatNumber(gammaOfStep(step), 2)}
      />
      <p className="mt-1 text-xs text-ink-soft">
        Each band is cut at these percentiles of its whole scene. It changes what the screen shows, never a value.
      </p>
    </>
  );
}
