import { unwrapBounds } from '../../lib/map-bounds.ts';
import { DEFAULT_VIEW, sceneTileUrl } from '../../lib/scene-view.ts';
import type { Scene } from '../../../../shared/contracts/scene.ts';
import { classNames } from '../../lib/class-names.ts';
import { layThumbnail } from './thumbnail-tiles.ts';

interface SceneThumbnailProps {
  scene: Scene;
  width: number;
  height: number;
  className?: string;
}

/** A ready scene, whole and small, in its first composite. */
export function SceneThumbnail({ scene, width, height, className }: SceneThumbnailProps) {
  const box = classNames('relative shrink-0 overflow-hidden bg-deep', className);
  if (scene.state !== 'ready' || !scene.bounds) return <div aria-hidden className={box} style={{ width, height }} />;
  const layout = layThumbnail(unwrapBounds(scene.bounds), width, height);
  const template = sceneTileUrl(scene, DEFAULT_VIEW);
  return (
    <div aria-hidden className={box} style={{ width, height }}>
      {layout.tiles.map(({ z, x, y, left, top, size }) => (
        <img
          key={`${z} ${x} ${y}`}
          src={template.replace('{z}', String(z)).replace('{x}', String(x)).replace('{y}', String(y))}
          alt=""
          loading="lazy"
          draggable={false}
          className="absolute max-w-none"
          // A hair larger, so that no seam shows between tiles at fractions of a pixel.
          style={{ left, top, width: size + 0.5, height: size + 0.5 }}
        />
      ))}
    </div>
  );
}
