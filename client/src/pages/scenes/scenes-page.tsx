import { Plus } from 'lucide-react';
import { useState } from 'react';
import type { Scene } from '../../../../shared/contracts/scene.ts';
import { PageHeader } from '../../components/layout/page-header.tsx';
import { ReadingPage } from '../../components/layout/reading-page.tsx';
import { ForbiddenState } from '../../components/ui/access-states.tsx';
import { Button } from '../../components/ui/button.tsx';
import { ErrorState } from '../../components/ui/error-state.tsx';
import { PendingState } from '../../components/ui/pending-state.tsx';
import { DeleteSceneDialog } from '../../features/scenes/delete-scene-dialog.tsx';
import { FirstScene } from '../../features/scenes/first-scene.tsx';
import { SceneCard } from '../../features/scenes/scene-card.tsx';
import { StudyAreaCard } from '../../features/scenes/study-area-card.tsx';
import { UploadCard } from '../../features/scenes/upload-card.tsx';
import type { DeskUpload } from '../../features/scenes/upload-desk.ts';
import { UploadDialog } from '../../features/scenes/upload-dialog.tsx';
import { useUploadLimits } from '../../features/scenes/upload-limits.ts';
import { useUploads } from '../../features/scenes/use-uploads.ts';
import { formatCount } from '../../lib/format.ts';
import { useProject } from '../../lib/project/project-context.ts';
import { useScenes } from '../../lib/project/scenes-query.ts';

/** The scenes of a project. */
export function ScenesPage() {
  const { abilities } = useProject();
  if (!abilities.readScenes) {
    return (
      <ReadingPage header={<PageHeader title="Scenes" />}>
        <ForbiddenState />
      </ReadingPage>
    );
  }
  return <SceneList />;
}

function SceneList() {
  const project = useProject();
  const scenes = useScenes(project.id);
  const limits = useUploadLimits(project.id);
  const { uploads, start, retry, drop } = useUploads(project.id);
  const [choosing, setChoosing] = useState<readonly File[] | null>(null);
  const [deleting, setDeleting] = useState<Scene | null>(null);
  const canManage = project.abilities.manageScenes;
  const list = scenes.data ?? [];
  const ready = list.find(({ state }) => state === 'ready');
  const isEmpty = scenes.data !== undefined && list.length === 0 && uploads.length === 0;
  const cardActs = { canManage, onDelete: setDeleting, onUploadAnother: () => setChoosing([]) };
  const uploadButton = (
    <Button kind="primary" icon={<Plus />} onClick={() => setChoosing([])}>
      Upload a scene
    </Button>
  );
  return (
    <ReadingPage
      header={
        <PageHeader
          title="Scenes"
          crumb={list.length > 0 ? formatCount(list.length, 'scene') : undefined}
          action={canManage && !isEmpty && uploadButton}
          progress={workShare(uploads, list)}
        />
      }
    >
      <div
        className="min-h-full"
        onDragOver={(event) => canManage && event.preventDefault()}
        onDrop={(event) => {
          if (!canManage) return;
          event.preventDefault();
          if (event.dataTransfer.files.length > 0) setChoosing([...event.dataTransfer.files]);
        }}
      >
        {scenes.isPending && <PendingState label="Loading scenes" shape="block" />}
        {scenes.isError && !scenes.data && <ErrorState error={scenes.error} onRetry={() => void scenes.refetch()} />}
        {isEmpty && <FirstScene action={canManage && uploadButton} />}
        {ready && <StudyAreaCard project={project} scene={ready} />}
        {uploads.length > 0 && (
          <div className="mb-4 space-y-4">
            {uploads.map((upload) => (
              <UploadCard
                key={upload.id}
                upload={upload}
                onRetry={() => retry(upload.id)}
                onDrop={() => drop(upload.id)}
              />
            ))}
          </div>
        )}
        <Cards label="Scenes" scenes={list.filter(({ state }) => state !== 'failed')} {...cardActs} />
        <Cards label="Not taken" scenes={list.filter(({ state }) => state === 'failed')} isTitled {...cardActs} />
      </div>
      {choosing && (
        <UploadDialog firstFiles={choosing} limits={limits} onStart={start} onClose={() => setChoosing(null)} />
      )}
      {deleting && <DeleteSceneDialog scene={deleting} onClose={() => setDeleting(null)} />}
    </ReadingPage>
  );
}

interface CardsProps {
  label: string;
  scenes: readonly Scene[];
  isTitled?: boolean;
  canManage: boolean;
  onDelete: (scene: Scene) => void;
  onUploadAnother: () => void;
}

function Cards({ label, scenes, isTitled = false, canManage, onDelete, onUploadAnother }: CardsProps) {
  if (scenes.length === 0) return null;
  return (
    <section aria-label={label} className="mb-7">
      {isTitled && <h2 className="mb-2 text-sm font-semibold text-ink-soft">{label}</h2>}
      <ul className="grid gap-4 xl:grid-cols-2">
        {scenes.map((scene) => (
          <SceneCard
            key={scene.id}
            scene={scene}
            canManage={canManage}
            onDelete={() => onDelete(scene)}
            onUploadAnother={onUploadAnother}
          />
        ))}
      </ul>
    </section>
  );
}

/** Share done of what goes on, for the tab's title: the upload first, then the ingest. */
function workShare(uploads: readonly DeskUpload[], scenes: readonly Scene[]): number | null {
  const upload = uploads.find(({ state }) => state !== 'refused');
  if (upload) return upload.totalBytes > 0 ? Math.min(1, upload.sentBytes / upload.totalBytes) : 0;
  const ingesting = scenes.find(({ state }) => state === 'ingesting');
  return ingesting ? (ingesting.job?.share ?? 0) : null;
}
