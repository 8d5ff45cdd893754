import { useState } from 'react';
import { Link, useSearchParams } from 'react-router-dom';
import type { Scene } from '../../../../shared/contracts/scene.ts';
import { PageHeader } from '../../components/layout/page-header.tsx';
import { ReadingPage } from '../../components/layout/reading-page.tsx';
import { SceneChoice } from '../../components/map/scene-choice.tsx';
import { buttonClass } from '../../components/ui/button.tsx';
import { EmptyState } from '../../components/ui/empty-state.tsx';
import { ErrorState } from '../../components/ui/error-state.tsx';
import { PendingState } from '../../components/ui/pending-state.tsx';
import { useSignatures } from '../../features/signatures/get-signatures.ts';
import { paths } from '../../lib/paths.ts';
import { useProject } from '../../lib/project/project-context.ts';
import { useScenes } from '../../lib/project/scenes-query.ts';
import { BandToggles } from './band-toggles.tsx';
import { SignatureReport } from './signature-report.tsx';

const TITLE = 'Signatures';

/** What the samples of each class look like in a scene's bands, and which classes these bands can tell apart. */
export function SignaturesPage() {
  const { id } = useProject();
  const scenes = useScenes(id);
  const [query, setQuery] = useSearchParams();
  if (scenes.isPending) {
    return (
      <Plain>
        <PendingState label="Loading the scenes" rows={6} />
      </Plain>
    );
  }
  if (scenes.isError) {
    return (
      <Plain>
        <ErrorState error={scenes.error} onRetry={() => void scenes.refetch()} />
      </Plain>
    );
  }
  const ready = scenes.data.filter(({ state }) => state === 'ready');
  const scene = ready.find((one) => one.id === query.get('scene')) ?? ready[0];
  if (!scene) {
    return (
      <Plain>
        <EmptyState
          title="No scene to read yet"
          action={
            <Link to={paths.scenes(id)} className={buttonClass('primary')}>
              Go to scenes
            </Link>
          }
        >
          Signatures are read from the pixels under the samples. They stand here once a scene is ready and samples are
          drawn.
        </EmptyState>
      </Plain>
    );
  }
  return (
    <SceneSignatures
      key={scene.id}
      scene={scene}
      scenes={ready}
      onScene={(sceneId) => setQuery({ scene: sceneId }, { replace: true })}
    />
  );
}

interface SceneSignaturesProps {
  scene: Scene;
  scenes: readonly Scene[];
  onScene: (sceneId: string) => void;
}

function SceneSignatures({ scene, scenes, onScene }: SceneSignaturesProps) {
  const { id } = useProject();
  const [bands, setBands] = useState<number[] | null>(null);
  const signatures = useSignatures(id, scene.id, bands);
  const desk = (
    <Link to={paths.samples(id)} className={buttonClass('secondary')}>
      To the sampling desk
    </Link>
  );
  return (
    <ReadingPage
      header={
        <PageHeader title={TITLE} action={desk}>
          <SceneChoice scenes={scenes} value={scene.id} onChange={onScene} />
        </PageHeader>
      }
    >
      {signatures.isPending && <PendingState label="Reading the samples’ pixels" shape="block" rows={6} />}
      {signatures.isError && <ErrorState error={signatures.error} onRetry={() => void signatures.refetch()} />}
      {signatures.data &&
        (signatures.data.nSamples === 0 ? (
          <EmptyState title="No sample in this scene yet" action={desk}>
            {signatures.data.nOutside > 0
              ? `None of the project’s ${signatures.data.nOutside} samples lies in “${scene.name}”. Choose another scene, or draw samples here.`
              : 'Draw samples at the desk; what their pixels look like stands here.'}
          </EmptyState>
        ) : (
          <div aria-busy={signatures.isPlaceholderData} className={signatures.isPlaceholderData ? 'opacity-60' : ''}>
            <SignatureReport
              set={signatures.data}
              sceneName={scene.name}
              bandToggles={<BandToggles bands={scene.bands} chosen={signatures.data.bands} onChange={setBands} />}
            />
          </div>
        ))}
    </ReadingPage>
  );
}

function Plain({ children }: { children: React.ReactNode }) {
  return <ReadingPage header={<PageHeader title={TITLE} />}>{children}</ReadingPage>;
}
