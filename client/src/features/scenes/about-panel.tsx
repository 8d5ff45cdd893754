import { Link } from 'react-router-dom';
import type { Scene } from '../../../../shared/contracts/scene.ts';
import { Facts } from '../../components/layout/slip.tsx';
import { Callout } from '../../components/ui/callout.tsx';
import { Switch } from '../../components/ui/switch.tsx';
import { formatLatitude, formatLongitude } from '../../lib/format-coordinates.ts';
import { formatCalendarDate, formatDateTime } from '../../lib/format-date.ts';
import { formatBytes, formatHectares } from '../../lib/format.ts';
import { groundAreaHa } from '../../lib/ground-area.ts';
import { paths } from '../../lib/paths.ts';
import { coarseBands, describeBands, describePixel, describeSize, formatShort } from './scene-text.ts';

interface AboutPanelProps {
  scene: Scene;
  canManage: boolean;
  isFootprintShown: boolean;
  onFootprint: (isShown: boolean) => void;
}

/** What is known of a scene: date, grid, reference system, extent, files. */
export function AboutPanel({ scene, canManage, isFootprintShown, onFootprint }: AboutPanelProps) {
  const [west, south, east, north] = scene.bounds ?? [0, 0, 0, 0];
  return (
    <div className="space-y-3">
      {scene.guessedRoles && (
        <Callout tone="beware" title="Band roles are guessed.">
          They come from the number of bands alone.{' '}
          {canManage ? (
            <Link to={paths.sceneBands(scene.projectId, scene.id)} className="link">
              Check them in the band table
            </Link>
          ) : (
            'The lead or a modeller checks them in the band table'
          )}
          .
        </Callout>
      )}
      <CoarseNote scene={scene} />
      <Facts
        facts={[
          { name: 'Acquired on', value: scene.acquiredOn ? formatCalendarDate(scene.acquiredOn) : 'not given' },
          { name: 'Size', value: describeSize(scene) },
          { name: 'Pixel', value: describePixel(scene.bands) ?? 'not given' },
          ...(scene.footprint ? [{ name: 'Ground shown', value: formatHectares(groundAreaHa(scene.footprint)) }] : []),
        ]}
      />
      <div className="border-t border-line pt-2.5">
        <p className="text-ink-soft">Reference system</p>
        <p className="font-medium">
          {scene.crsName}
          {scene.crsEpsg !== null && <span className="font-normal text-ink-soft"> · EPSG:{scene.crsEpsg}</span>}
        </p>
      </div>
      <div className="border-t border-line pt-2.5">
        <p className="mb-1 text-ink-soft">Extent, WGS84</p>
        <div className="grid grid-cols-3 items-center gap-y-1 text-center font-medium">
          <span className="col-start-2">{formatLatitude(north)}</span>
          <span className="col-start-1 row-start-2 text-left">{formatLongitude(west)}</span>
          <span aria-hidden className="col-start-2 row-start-2 mx-auto h-7 w-14 border border-dotted border-edge" />
          <span className="col-start-3 row-start-2 text-right">{formatLongitude(east)}</span>
          <span className="col-start-2 row-start-3">{formatLatitude(south)}</span>
        </div>
        <Switch className="mt-2" label="Footprint on the map" isOn={isFootprintShown} onChange={onFootprint} />
      </div>
      <div className="border-t border-line pt-2.5">
        <p className="text-ink-soft">{scene.bands.length} bands</p>
        <p>{describeBands(scene.bands)}</p>
      </div>
      <Files scene={scene} />
      <p className="border-t border-line pt-2.5 text-xs text-ink-soft">
        Uploaded {formatDateTime(scene.createdAt)}
        {scene.uploadedBy && ` by ${scene.uploadedBy.name}`}
      </p>
    </div>
  );
}

/** Where a band's value covers several pixels of the scene. */
export function CoarseNote({ scene }: { scene: Scene }) {
  const coarse = coarseBands(scene);
  if (coarse.length === 0) return null;
  const names = coarse
    .map(({ name, gsdMeters }) => (gsdMeters === null ? name : `${name} at ${formatShort(gsdMeters)} m`))
    .join(', ');
  const hasThermal = coarse.some(({ role }) => role === 'thermal');
  return (
    <Callout tone="note" title={hasThermal ? 'Coarse thermal band.' : 'Coarser bands.'}>
      {names}: one value covers several pixels of the scene, so it mixes what lies side by side.
    </Callout>
  );
}

function Files({ scene }: { scene: Scene }) {
  return (
    <details className="border-t border-line pt-2.5">
      <summary className="cursor-pointer text-ink-soft">
        {scene.files.length === 1 ? '1 file' : `${scene.files.length} files`} with digests (SHA-256)
      </summary>
      <ul className="mt-1.5 space-y-2">
        {scene.files.map((file) => (
          <li key={file.sha256}>
            <span className="flex justify-between gap-3">
              <span className="min-w-0 break-words">{file.name}</span>
              <span className="whitespace-nowrap text-ink-soft">{formatBytes(file.bytes)}</span>
            </span>
            <span className="block text-2xs break-all text-ink-soft">{file.sha256}</span>
          </li>
        ))}
      </ul>
    </details>
  );
}
