import { type ReactNode, useEffect } from 'react';
import { Pane, useMap } from 'react-leaflet';

export interface SwipePaneProps {
  /** Share of the map's width left of the divider, 0..1; the pane shows right of it. */
  share: number;
  children: ReactNode;
}

const PANE = 'swipe';

/** Layers that show only right of a divider, above those of the map's own. */
export function SwipePane({ share, children }: SwipePaneProps) {
  return (
    // Above the tiles, below outlines and markers.
    <Pane name={PANE} style={{ zIndex: 250 }}>
      <ClipPane share={share} />
      {children}
    </Pane>
  );
}

/** Panes move with the map, so the cut is worked out anew with every move. */
function ClipPane({ share }: { share: number }) {
  const map = useMap();
  useEffect(() => {
    const clip = () => {
      const pane = map.getPane(PANE);
      if (!pane) return;
      const size = map.getSize();
      const upper = map.containerPointToLayerPoint([0, 0]);
      const lower = map.containerPointToLayerPoint(size);
      const left = upper.x + size.x * share;
      pane.style.clip = `rect(${upper.y}px, ${lower.x}px, ${lower.y}px, ${left}px)`;
    };
    clip();
    map.on('move zoom resize viewreset', clip);
    return () => void map.off('move zoom resize viewreset', clip);
  }, [map, share]);
  return null;
}
