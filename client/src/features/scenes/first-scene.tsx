import type { ReactNode } from 'react';
import { EmptyState } from '../../components/ui/empty-state.tsx';

const TAKEN = [
  ['Formats', 'GeoTIFF, cloud-optimized GeoTIFF (COG) or JPEG 2000, one band or many.'],
  ['Georeferenced', 'With a coordinate reference system, north-up: rows run west to east, not rotated.'],
  ['Several files', 'The files of one scene come together: the same place, the same reference system.'],
  ['Coarser bands', 'A thermal band keeps its own larger pixels in a file of its own.'],
  ['Nodata', 'A declared nodata value, a mask or an alpha band marks what is no data.'],
] as const;

/** Teaches what a scene is made of where there is none; the action is left out for those who may not upload. */
export function FirstScene({ action }: { action?: ReactNode }) {
  return (
    <div className="grid items-start gap-x-14 gap-y-8 lg:grid-cols-[minmax(0,34rem)_minmax(0,26rem)]">
      <EmptyState title="No scene yet" action={action}>
        {action
          ? 'A scene is the imagery of one date that samples are drawn on and the map is made from. Most commissions have one or two.'
          : 'The project lead or a modeller uploads the scenes. Samples can be drawn once there is one.'}
      </EmptyState>
      <section aria-labelledby="scene-parts">
        <h2 id="scene-parts" className="mb-2 text-lg font-semibold">
          What is taken
        </h2>
        <dl className="text-sm">
          {TAKEN.map(([part, text]) => (
            <div key={part} className="flex gap-4 border-t border-line py-2.5">
              <dt className="w-28 shrink-0 font-medium">{part}</dt>
              <dd className="text-ink-soft">{text}</dd>
            </div>
          ))}
        </dl>
      </section>
    </div>
  );
}
