import { Maximize2, Minimize2 } from 'lucide-react';
import type { CSSProperties } from 'react';
import type { Polygon } from '../../../../shared/contracts/geometry.ts';
import type { Scene } from '../../../../shared/contracts/scene.ts';
import { ContextMap } from '../map/context-map.tsx';
import { IconButton } from '../ui/icon-button.tsx';
import { formatCalendarDate } from '../../lib/format-date.ts';
import type { ContextView } from './context-choice.ts';
import { useLocalLimits } from './use-local-limits.ts';

export interface ContextPlace {
  position: readonly [number, number];
  outline: Polygon;
  outline3: Polygon;
  outline5: Polygon;
  bounds: readonly [number, number, number, number];
}

export interface ContextViewsProps {
  projectId: string;
  place: ContextPlace;
  views: readonly ContextView[];
  /** Steps closer (above 0) or farther than the first view. */
  zoomSteps: number;
  hasOutlines?: boolean;
  /** Colours stretched to what is around the place. */
  isLocal?: boolean;
  /** Makes one picture fill the room, or with null brings the others back; without it pictures offer no such button. */
  onEnlarge?: (id: string | null) => void;
  isLarge?: boolean;
}

/** Near enough to see the pixel, far enough to see what it is part of. */
const PIXEL_ON_SCREEN = 14;
const TILE = 256;
/** More pictures of one date than this are not laid out in a row of their own. */
const WIDEST_ROW = 3;
const NO_OUTLINES: readonly Polygon[] = [];

/** The same place in several composites and dates, at one scale. */
export function ContextViews(props: ContextViewsProps) {
  const { projectId, place, views, zoomSteps, hasOutlines = true, isLocal = false, onEnlarge, isLarge = false } = props;
  const zoom = Math.min(20, Math.max(6, firstZoom(place.outline) + zoomSteps));
  const scenes = [...new Map(views.map(({ scene }) => [scene.id, scene])).values()];
  const limits = useLocalLimits(projectId, scenes, place.outline5, isLocal);
  const [lon, lat] = place.position;
  const outlines = hasOutlines ? [place.outline, place.outline3, place.outline5] : NO_OUTLINES;
  const widest = Math.max(1, ...scenes.map(({ id }) => views.filter(({ scene }) => scene.id === id).length));
  const columns = isLarge ? 1 : Math.min(WIDEST_ROW, widest);
  return (
    <ul
      style={{ '--columns': columns, '--narrow': Math.min(2, isLarge ? 1 : views.length) } as CSSProperties}
      className="grid h-full min-h-0 auto-rows-fr grid-cols-[repeat(var(--columns),minmax(0,1fr))] gap-2 max-lg:grid-cols-[repeat(var(--narrow),minmax(0,1fr))]"
    >
      {views.map(({ id, scene, view, composite }, at) => {
        const row = scenes.findIndex((one) => one.id === scene.id);
        const column = views.slice(0, at).filter((one) => one.scene.id === scene.id).length;
        // A date has a row of its own where three pictures fit, and a column of its own where two do.
        const cell = {
          '--row': widest <= WIDEST_ROW ? row + 1 : 'auto',
          '--column': widest <= WIDEST_ROW ? column + 1 : 'auto',
          '--narrow-row': scenes.length === 2 ? column + 1 : 'auto',
          '--narrow-column': scenes.length === 2 ? row + 1 : 'auto',
        } as CSSProperties;
        return (
          <li
            key={id}
            style={cell}
            className="relative min-h-44 overflow-hidden rounded-lg border border-line [grid-area:var(--row)/var(--column)] max-lg:[grid-area:var(--narrow-row)/var(--narrow-column)]"
          >
            <ContextMap
              label={`${composite}, ${nameOf(scene)}`}
              scene={scene}
              view={view}
              limits={limits.get(scene.id)}
              centre={{ lon, lat }}
              zoom={zoom}
              outlines={outlines}
            />
            <p className="map-note pointer-events-none absolute bottom-1.5 left-1.5 z-[500] max-w-[calc(100%-0.75rem)] truncate px-2! py-0.5!">
              {composite} · {nameOf(scene)}
            </p>
            {onEnlarge && (
              <IconButton
                label={isLarge ? 'All pictures side by side' : `${composite}, ${scene.name}, large`}
                shortcut={isLarge ? 'Esc' : 'V'}
                size="sm"
                kind="secondary"
                className="absolute! top-1.5 right-1.5 z-[500]"
                icon={isLarge ? <Minimize2 aria-hidden /> : <Maximize2 aria-hidden />}
                onClick={() => onEnlarge(isLarge ? null : id)}
              />
            )}
          </li>
        );
      })}
    </ul>
  );
}

function nameOf({ name, acquiredOn }: Scene): string {
  return acquiredOn ? `${name}, ${formatCalendarDate(acquiredOn)}` : name;
}

/** The whole zoom step at which one pixel is nearest to a good size on the screen. */
function firstZoom(outline: Polygon): number {
  const ring = outline.coordinates[0] ?? [];
  const lons = ring.map(([lon]) => lon);
  const widthDegrees = Math.max(...lons) - Math.min(...lons);
  return Math.round(Math.log2((PIXEL_ON_SCREEN * 360) / (TILE * Math.max(widthDegrees, 1e-9))));
}
