import { useState } from 'react';
import type { Band, Scene } from '../../../../shared/contracts/scene.ts';
import { Histogram } from '../../components/charts/histogram.tsx';
import { Button } from '../../components/ui/button.tsx';
import { type BandLimits, type SceneView, bandLimits, viewBands } from '../../lib/scene-view.ts';
import { formatShort } from './scene-text.ts';

interface StretchPanelProps {
  scene: Scene;
  view: SceneView;
  limits: BandLimits;
  onLimits: (limits: BandLimits) => void;
}

const CHANNELS = [
  { name: 'Red of the screen', colour: '#c0392b' },
  { name: 'Green of the screen', colour: '#2e8b57' },
  { name: 'Blue of the screen', colour: '#3b6fb6' },
];

/** The histogram of each band on the screen, with handles for what is drawn darkest and brightest. */
export function StretchPanel({ scene, view, limits, onLimits }: StretchPanelProps) {
  const shown = viewBands(scene.bands, view);
  const byHand = shown.filter((number) => limits[number]);
  return (
    <div className="space-y-4">
      <p className="text-ink-soft">
        {byHand.length > 0
          ? `Drawn as set by hand here (${byHand.length === 1 ? 'band' : 'bands'} ${byHand.join(', ')}).`
          : `Drawn from the ${formatShort(view.stretch.lowPercent)} to the ${formatShort(view.stretch.highPercent)} % point of each band. Drag the handles to set a band by hand.`}
      </p>
      {byHand.length > 0 && (
        <Button size="sm" onClick={() => onLimits({})}>
          Back to percentiles
        </Button>
      )}
      {shown.map((number, channel) => {
        const band = scene.bands.find((one) => one.number === number);
        if (!band) return null;
        return (
          <BandHistogram
            key={`${channel} ${number}`}
            band={band}
            title={`${number} · ${band.name}`}
            note={shown.length === 3 ? CHANNELS[channel]?.name : undefined}
            colour={shown.length === 3 ? CHANNELS[channel]?.colour : undefined}
            stretch={bandLimits(band, view.stretch, limits)}
            onStretch={(next) => onLimits({ ...limits, [number]: next })}
          />
        );
      })}
    </div>
  );
}

interface BandHistogramProps {
  band: Band;
  title: string;
  note: string | undefined;
  colour: string | undefined;
  stretch: { low: number; high: number };
  onStretch: (stretch: { low: number; high: number }) => void;
}

function BandHistogram({ band, title, note, colour, stretch, onStretch }: BandHistogramProps) {
  const { low, high, counts } = band.statistics.histogram;
  const [held, setHeld] = useState<{ low: number; high: number } | null>(null);
  const decimals = high - low < 10 ? 2 : 0;
  return (
    <Histogram
      title={title}
      note={note}
      counts={counts}
      low={low}
      high={high}
      axisLabel="stored value (DN)"
      decimals={decimals}
      {...(colour && { colour })}
      plotHeight={64}
      stretch={clampStretch(held ?? stretch, low, high)}
      onStretchChange={setHeld}
      onStretchCommit={(next) => {
        setHeld(null);
        // Both handles on one value have no width to draw.
        onStretch(next.high > next.low ? next : { low: next.low, high: next.low + (high - low) / 500 });
      }}
    />
  );
}

/** The handles stay on the axis, also where limits of earlier statistics lie beyond it. */
function clampStretch(stretch: { low: number; high: number }, low: number, high: number) {
  const clamp = (value: number) => Math.max(low, Math.min(high, value));
  return { low: clamp(stretch.low), high: clamp(stretch.high) };
}
