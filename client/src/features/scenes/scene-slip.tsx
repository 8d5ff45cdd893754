import type { Scene } from '../../../../shared/contracts/scene.ts';
import { Slip } from '../../components/layout/slip.tsx';
import { Tabs } from '../../components/ui/tabs.tsx';
import { formatCalendarDate } from '../../lib/format-date.ts';
import type { Place } from '../../lib/project/probe-query.ts';
import type { BandLimits, SceneView } from '../../lib/scene-view.ts';
import { AboutPanel } from './about-panel.tsx';
import { PixelPanel } from './pixel-panel.tsx';
import { StretchPanel } from './stretch-panel.tsx';

export type SceneLeaf = 'pixel' | 'histograms' | 'about';

interface SceneSlipProps {
  scene: Scene;
  canManage: boolean;
  leaf: SceneLeaf;
  onLeaf: (leaf: SceneLeaf) => void;
  place: Place | null;
  view: SceneView;
  limits: BandLimits;
  onLimits: (limits: BandLimits) => void;
  isFootprintShown: boolean;
  onFootprint: (isShown: boolean) => void;
}

/** Beside the map: the pixel that was pressed, the histograms on the screen, and what is known of the scene. */
export function SceneSlip(props: SceneSlipProps) {
  const { scene, leaf, onLeaf } = props;
  return (
    <Slip
      title={scene.name}
      note={scene.acquiredOn ? `Acquired ${formatCalendarDate(scene.acquiredOn)}` : 'No date of acquisition given'}
    >
      <Tabs<SceneLeaf>
        label="Scene"
        value={leaf}
        onChange={onLeaf}
        items={[
          { value: 'about', label: 'About', content: <AboutPanel {...props} /> },
          { value: 'pixel', label: 'Pixel', content: <PixelPanel scene={scene} place={props.place} /> },
          { value: 'histograms', label: 'Histograms', content: <StretchPanel {...props} /> },
        ]}
      />
    </Slip>
  );
}
