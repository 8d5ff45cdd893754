import { useState } from 'react';
import { Link, useNavigate } from 'react-router-dom';
import type { Scene } from '../../../../shared/contracts/scene.ts';
import { PageHeader } from '../../components/layout/page-header.tsx';
import { ReadingPage } from '../../components/layout/reading-page.tsx';
import { Button, buttonClass } from '../../components/ui/button.tsx';
import { DeleteSceneDialog } from '../../features/scenes/delete-scene-dialog.tsx';
import { IngestFailure } from '../../features/scenes/ingest-failure.tsx';
import { IngestProgress } from '../../features/scenes/ingest-progress.tsx';
import { paths } from '../../lib/paths.ts';
import { useProject } from '../../lib/project/project-context.ts';

/** A scene that is being ingested, or that could not be taken. */
export function UnreadyScene({ scene }: { scene: Scene }) {
  const { id, abilities } = useProject();
  const navigate = useNavigate();
  const [isDeleting, setIsDeleting] = useState(false);
  const isIngesting = scene.state === 'ingesting';
  return (
    <ReadingPage
      header={
        <PageHeader
          title={scene.name}
          crumb={isIngesting ? 'being ingested' : 'not taken'}
          progress={isIngesting ? (scene.job?.share ?? 0) : null}
        />
      }
    >
      <div className="max-w-2xl rounded-xl border border-line bg-card px-6 py-5">
        {isIngesting ? (
          <>
            <h2 className="mb-3 text-xl font-semibold tracking-tight">The scene is being ingested</h2>
            <IngestProgress scene={scene} canCancel={abilities.manageScenes} />
          </>
        ) : (
          <>
            <h2 className="mb-3 text-xl font-semibold tracking-tight">This scene could not be taken</h2>
            {scene.failure && <IngestFailure failure={scene.failure} />}
          </>
        )}
        <div className="mt-5 flex flex-wrap gap-2">
          <Link to={paths.scenes(id)} className={buttonClass('strong')}>
            To the scenes
          </Link>
          {abilities.manageScenes && !isIngesting && (
            <Button onClick={() => setIsDeleting(true)}>Delete this scene…</Button>
          )}
        </div>
      </div>
      {isDeleting && (
        <DeleteSceneDialog
          scene={scene}
          onClose={() => setIsDeleting(false)}
          onDeleted={() => void navigate(paths.scenes(id), { replace: true })}
        />
      )}
    </ReadingPage>
  );
}
