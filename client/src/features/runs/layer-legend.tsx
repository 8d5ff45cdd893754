import { LAYER_RAMP } from '../../../../shared/constants/layer-ramp.ts';
import type { RunLayer } from '../../../../shared/contracts/run.ts';
import { LAYER_MEANING, LAYER_NAMES } from './map-choice.ts';

/** The ramp of a layer with its ends, and what it says. */
export function LayerLegend({ layer }: { layer: RunLayer }) {
  return (
    <figure aria-label={`Legend of ${LAYER_NAMES[layer].toLowerCase()}`} className="flex items-center gap-3 text-xs">
      <span className="flex items-center gap-1.5">
        <span className="text-ink-soft">0 %</span>
        <span
          aria-hidden
          className="h-3 w-40 rounded-sm border border-edge"
          style={{ background: `linear-gradient(to right, ${LAYER_RAMP.join(', ')})` }}
        />
        <span className="text-ink-soft">100 %</span>
      </span>
      <figcaption className="text-ink-soft max-lg:hidden">{LAYER_MEANING[layer]}</figcaption>
    </figure>
  );
}
