import { MoreHorizontal, Table2, Trash2 } from 'lucide-react';
import type { ReactNode } from 'react';
import { Link } from 'react-router-dom';
import type { Scene } from '../../../../shared/contracts/scene.ts';
import { Button } from '../../components/ui/button.tsx';
import { Menu, MenuItem } from '../../components/ui/menu.tsx';
import { StateTag } from '../../components/ui/state-tag.tsx';
import { formatCalendarDate, formatSince } from '../../lib/format-date.ts';
import { formatBytes, formatCount } from '../../lib/format.ts';
import { paths } from '../../lib/paths.ts';
import { IngestFailure } from './ingest-failure.tsx';
import { IngestProgress } from './ingest-progress.tsx';
import { SceneThumbnail } from './scene-thumbnail.tsx';
import { describeBands, describeCrs, describePixel, describeSize } from './scene-text.ts';

interface SceneCardProps {
  scene: Scene;
  canManage: boolean;
  onDelete: () => void;
  onUploadAnother: () => void;
}

const THUMBNAIL = { width: 212, height: 176 };

/** A scene in the list: its picture, what it is, and how it stands. */
export function SceneCard({ scene, canManage, onDelete, onUploadAnother }: SceneCardProps) {
  const isReady = scene.state === 'ready';
  return (
    <li className="flex overflow-hidden rounded-xl border border-line bg-card">
      {isReady && (
        <Link to={paths.scene(scene.projectId, scene.id)} tabIndex={-1} aria-hidden className="flex bg-deep">
          <SceneThumbnail scene={scene} {...THUMBNAIL} className="self-center" />
        </Link>
      )}
      <div className="flex min-w-0 flex-1 flex-col px-5 py-4">
        <div className="flex items-start gap-3">
          <div className="min-w-0 flex-1">
            <h2 className="text-lg font-semibold">
              <Link to={paths.scene(scene.projectId, scene.id)} className="text-ink no-underline hover:underline">
                {scene.name}
              </Link>
            </h2>
            <p className="text-sm text-ink-soft">
              {scene.acquiredOn ? `Acquired ${formatCalendarDate(scene.acquiredOn)}` : 'No date given'}
            </p>
          </div>
          <SceneState scene={scene} />
          {canManage && (
            <Menu
              trigger={
                <Button kind="ghost" size="sm" aria-label={`More for ${scene.name}`} className="px-1.5!">
                  <MoreHorizontal aria-hidden />
                </Button>
              }
            >
              {isReady && (
                <MenuItem icon={<Table2 />} to={paths.sceneBands(scene.projectId, scene.id)}>
                  Band table
                </MenuItem>
              )}
              <MenuItem icon={<Trash2 />} isDanger onSelect={onDelete}>
                Delete scene…
              </MenuItem>
            </Menu>
          )}
        </div>
        {isReady && <ReadyFacts scene={scene} />}
        {scene.state === 'ingesting' && <IngestProgress className="mt-4" scene={scene} canCancel={canManage} />}
        {scene.state === 'failed' && (
          <>
            {scene.failure && <IngestFailure className="mt-3" failure={scene.failure} />}
            {canManage && (
              <div className="mt-3 flex gap-2">
                <Button size="sm" onClick={onDelete}>
                  Delete
                </Button>
                <Button size="sm" onClick={onUploadAnother}>
                  Upload another
                </Button>
              </div>
            )}
          </>
        )}
        {!isReady && <Origin scene={scene} className="mt-3" />}
      </div>
    </li>
  );
}

function ReadyFacts({ scene }: { scene: Scene }) {
  const facts: [string, ReactNode][] = [
    ['Size', describeSize(scene)],
    ['Pixel', describePixel(scene.bands) ?? 'not given'],
    ['System', <span title={scene.crsName ?? undefined}>{describeCrs(scene)}</span>],
    [formatCount(scene.bands.length, 'band'), describeBands(scene.bands)],
  ];
  return (
    <>
      <dl className="mt-2.5 grid grid-cols-[auto_1fr] gap-x-4 gap-y-0.5 text-sm">
        {facts.map(([term, value]) => (
          <div key={term} className="contents">
            <dt className="text-ink-soft">{term}</dt>
            <dd className="min-w-0">{value}</dd>
          </div>
        ))}
      </dl>
      <Origin scene={scene} className="mt-auto pt-2.5" />
    </>
  );
}

function Origin({ scene, className }: { scene: Scene; className: string }) {
  const bytes = scene.files.reduce((sum, file) => sum + file.bytes, 0);
  return (
    <p className={`${className} text-xs text-ink-soft`}>
      {formatCount(scene.files.length, 'file')}, {formatBytes(bytes)}
      {scene.uploadedBy && ` · ${scene.uploadedBy.name}`} · {formatSince(scene.createdAt)}
    </p>
  );
}

/** How a scene stands, in words; what only wants a look at its bands says so too. */
function SceneState({ scene }: { scene: Scene }) {
  if (scene.state === 'failed') return <StateTag tone="danger">Not taken</StateTag>;
  if (scene.state === 'ingesting') return <StateTag tone="working">Ingesting</StateTag>;
  if (scene.guessedRoles) return <StateTag tone="beware">Check band roles</StateTag>;
  return <StateTag tone="ok">Ready</StateTag>;
}
