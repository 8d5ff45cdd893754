import type { ReactNode } from 'react';
import type { RunLayer } from '../../../../shared/contracts/run.ts';
import type { Band } from '../../../../shared/contracts/scene.ts';
import { Strip, ToolButton, ToolGap } from '../../components/layout/map-page.tsx';
import { CompositeControl } from '../../components/map/composite-control.tsx';
import { StretchControl } from '../../components/map/stretch-control.tsx';
import { Slider } from '../../components/ui/slider.tsx';
import { Segmented } from '../../components/ui/segmented.tsx';
import { Select } from '../../components/ui/select.tsx';
import { LayerLegend } from './layer-legend.tsx';
import { LAYER_NAMES, type ShownLayer, type SwipeChoice } from './map-choice.ts';
import { formatPercent } from '../../lib/format.ts';
import type { SceneView } from '../../lib/scene-view.ts';

interface ClassMapStripProps {
  bands: readonly Band[];
  view: SceneView;
  onView: (view: SceneView) => void;
  opacity: number;
  onOpacity: (opacity: number) => void;
  onInspectMiddle: () => void;
  layers: readonly RunLayer[];
  layer: ShownLayer;
  onLayer: (layer: ShownLayer) => void;
  swipe: SwipeChoice;
  swipeChoices: readonly { value: SwipeChoice; label: string }[];
  onSwipe: (swipe: SwipeChoice) => void;
  /** The class keys. */
  children: ReactNode;
}

/** How much of the class map shows, what the scene below looks like, and the pixel in the middle for the keyboard. */
export function ClassMapStrip({
  bands,
  view,
  onView,
  opacity,
  onOpacity,
  onInspectMiddle,
  ...props
}: ClassMapStripProps) {
  const { layers, layer, onLayer, swipe, swipeChoices, onSwipe, children } = props;
  return (
    <Strip
      label="Map tools"
      tools={
        <>
          <Segmented<ShownLayer>
            label="What the map shows"
            value={layer}
            onChange={onLayer}
            options={(['classes', ...layers] as const).map((value) => ({ value, label: LAYER_NAMES[value] }))}
          />
          <Slider
            className="mx-3 w-28! shrink-0"
            value={[Math.round(opacity * 100)]}
            onChange={([percent = 100]) => onOpacity(percent / 100)}
            min={0}
            max={100}
            step={5}
            labels={['Opacity of the map']}
            formatValue={(percent) => `${percent} %`}
          />
          <span className="w-11 shrink-0 text-ink-soft">{formatPercent(opacity)}</span>
          <ToolButton
            label={opacity > 0 ? 'Hide' : 'Show'}
            shortcut="H"
            onPress={() => onOpacity(opacity > 0 ? 0 : 1)}
          />
          <ToolGap />
          <Select
            aria-label="Swipe against"
            size="sm"
            className="w-48!"
            value={swipe}
            onChange={onSwipe}
            options={swipeChoices}
          />
          <ToolButton label="Read the middle" shortcut="I" onPress={onInspectMiddle} />
        </>
      }
    >
      {layer !== 'classes' && (
        <div className="border-b border-line px-3 py-1.5">
          <LayerLegend layer={layer} />
        </div>
      )}
      <div className="flex items-center gap-1.5 overflow-x-auto px-2.5 py-1.5 text-sm whitespace-nowrap">
        <span className="shrink-0 pr-2 pl-1 font-medium">Scene</span>
        <CompositeControl bands={bands} view={view} onChange={onView} />
        <StretchControl stretch={view.stretch} onChange={(stretch) => onView({ ...view, stretch })} />
      </div>
      {layer === 'classes' && children}
    </Strip>
  );
}
