import type { Band } from '../../../../shared/contracts/scene.ts';
import { Strip, ToolButton, ToolGap } from '../../components/layout/map-page.tsx';
import { CompositeControl } from '../../components/map/composite-control.tsx';
import { StretchControl } from '../../components/map/stretch-control.tsx';
import { Slider } from '../../components/ui/slider.tsx';
import { formatPercent } from '../../lib/format.ts';
import type { SceneView } from '../../lib/scene-view.ts';

interface ClassMapStripProps {
  bands: readonly Band[];
  view: SceneView;
  onView: (view: SceneView) => void;
  opacity: number;
  onOpacity: (opacity: number) => void;
  onInspectMiddle: () => void;
}

/** How much of the class map shows, what the scene below looks like, and the pixel in the middle for the keyboard. */
export function ClassMapStrip({ bands, view, onView, opacity, onOpacity, onInspectMiddle }: ClassMapStripProps) {
  return (
    <Strip
      label="Map tools"
      tools={
        <>
          <span className="w-20 shrink-0 pl-1 font-medium">Class map</span>
          <Slider
            className="mx-3 w-44! shrink-0"
            value={[Math.round(opacity * 100)]}
            onChange={([percent = 100]) => onOpacity(percent / 100)}
            min={0}
            max={100}
            step={5}
            labels={['Opacity of the class map']}
            formatValue={(percent) => `${percent} %`}
          />
          <span className="w-11 shrink-0 text-ink-soft">{formatPercent(opacity)}</span>
          <ToolButton
            label={opacity > 0 ? 'Hide' : 'Show'}
            shortcut="H"
            onPress={() => onOpacity(opacity > 0 ? 0 : 1)}
          />
          <ToolGap />
          <span className="pr-2 text-ink-soft max-lg:hidden">Press the map to read a pixel</span>
          <ToolButton label="Read the middle" shortcut="I" onPress={onInspectMiddle} />
        </>
      }
    >
      <div className="flex items-center gap-1.5 overflow-x-auto px-2.5 py-1.5 text-sm whitespace-nowrap">
        <span className="w-20 shrink-0 pl-1 font-medium">Scene</span>
        <CompositeControl bands={bands} view={view} onChange={onView} />
        <StretchControl stretch={view.stretch} onChange={(stretch) => onView({ ...view, stretch })} />
      </div>
    </Strip>
  );
}
