import type { CSSProperties } from 'react';
import type { Polygon } from '../../../../shared/contracts/geometry.ts';
import { ContextMap } from '../map/context-map.tsx';
import { formatCalendarDate } from '../../lib/format-date.ts';
import type { ContextView } from './context-choice.ts';

export interface ContextPlace {
  position: readonly [number, number];
  outline: Polygon;
  outline3: Polygon;
  outline5: Polygon;
  bounds: readonly [number, number, number, number];
}

export interface ContextViewsProps {
  place: ContextPlace;
  views: readonly ContextView[];
  /** Steps closer (above 0) or farther than the first view. */
  zoomSteps: number;
}

/** Near enough to see the pixel, far enough to see what it is part of. */
const PIXEL_ON_SCREEN = 14;
const TILE = 256;

/** The same place in several composites and dates, at one scale. */
export function ContextViews({ place, views, zoomSteps }: ContextViewsProps) {
  const zoom = Math.min(20, Math.max(6, firstZoom(place.outline) + zoomSteps));
  const [lon, lat] = place.position;
  const outlines = [place.outline, place.outline3, place.outline5];
  return (
    <ul
      style={{ '--columns': Math.min(3, widestRow(views)) } as CSSProperties}
      className="grid h-full min-h-0 auto-rows-fr grid-cols-[repeat(var(--columns),minmax(0,1fr))] gap-2 max-lg:grid-cols-2"
    >
      {views.map(({ id, scene, view, composite }) => (
        <li key={id} className="relative min-h-44 overflow-hidden rounded-lg border border-line">
          <ContextMap
            label={`${composite}, ${scene.name}`}
            scene={scene}
            view={view}
            centre={{ lon, lat }}
            zoom={zoom}
            outlines={outlines}
          />
          <p className="map-note pointer-events-none absolute bottom-1.5 left-1.5 z-[500] px-2! py-0.5!">
            {composite} · {scene.name}
            {scene.acquiredOn && `, ${formatCalendarDate(scene.acquiredOn)}`}
          </p>
        </li>
      ))}
    </ul>
  );
}

/** Most pictures of one scene: each date gets a row of its own where three fit. */
function widestRow(views: readonly ContextView[]): number {
  const counts = new Map<string, number>();
  for (const { scene } of views) counts.set(scene.id, (counts.get(scene.id) ?? 0) + 1);
  return Math.max(1, ...counts.values());
}

/** The whole zoom step at which one pixel is nearest to a good size on the screen. */
function firstZoom(outline: Polygon): number {
  const ring = outline.coordinates[0] ?? [];
  const lons = ring.map(([lon]) => lon);
  const widthDegrees = Math.max(...lons) - Math.min(...lons);
  return Math.round(Math.log2((PIXEL_ON_SCREEN * 360) / (TILE * Math.max(widthDegrees, 1e-9))));
}
