import { Link } from 'react-router-dom';
import { buttonClass } from '../../components/ui/button.tsx';
import { EmptyState } from '../../components/ui/empty-state.tsx';
import { PendingState } from '../../components/ui/pending-state.tsx';
import { newestReadyScene, MIN_SAMPLES_PER_CLASS } from '../../features/runs/default-recipe.ts';
import { useClasses } from '../../lib/project/classes-query.ts';
import { useProject } from '../../lib/project/project-context.ts';
import { useScenes } from '../../lib/project/scenes-query.ts';
import { paths } from '../../lib/paths.ts';

/** No run, or none possible yet: says what is missing and leads there. */
export function NoRunYet() {
  const { id, abilities } = useProject();
  const scenes = useScenes(id);
  const classes = useClasses(id);
  if (scenes.isPending || classes.isPending) return <PendingState label="Looking at what there is" />;
  if (!newestReadyScene(scenes.data ?? [])) {
    return (
      <EmptyState title="A run needs a scene" action={<To path={paths.scenes(id)}>Go to scenes</To>}>
        Bring in a scene first. Then agree on classes, draw samples of each, and start a run: it maps every pixel of the
        scene.
      </EmptyState>
    );
  }
  const nSampled = (classes.data ?? []).filter((one) => one.sampleCount >= MIN_SAMPLES_PER_CLASS).length;
  if (nSampled < 2) {
    return (
      <EmptyState
        title="A run needs samples of two classes"
        action={
          (classes.data ?? []).length < 2 ? (
            <To path={paths.classes(id)}>Go to classes</To>
          ) : (
            <To path={paths.samples(id)}>Draw samples</To>
          )
        }
      >
        Each class wants at least {MIN_SAMPLES_PER_CLASS} samples: one to learn from, one held out to measure the map
        against. Twenty or more a class say something about accuracy.
      </EmptyState>
    );
  }
  return (
    <EmptyState
      title="No run yet"
      action={abilities.startRuns && <To path={paths.newRun(id)}>Set up the first run</To>}
    >
      A run learns from the samples, gives every pixel of the scene a class, and states how well the held-out samples
      agree.{' '}
      {abilities.startRuns ? 'The settings it starts with are good for a first map.' : 'A lead or modeller starts it.'}
    </EmptyState>
  );
}

function To({ path, children }: { path: string; children: string }) {
  return (
    <Link to={path} className={buttonClass('primary')}>
      {children}
    </Link>
  );
}
