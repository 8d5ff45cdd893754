import { useState } from 'react';
import { Link } from 'react-router-dom';
import type { LandClass } from '../../../../shared/contracts/land-class.ts';
import type { Design } from '../../../../shared/contracts/reference.ts';
import type { Scene } from '../../../../shared/contracts/scene.ts';
import { PlaceTools } from '../../components/place/place-tools.tsx';
import { contextKeys, useContextViews } from '../../components/place/use-context-views.ts';
import { Button, buttonClass } from '../../components/ui/button.tsx';
import { EmptyState } from '../../components/ui/empty-state.tsx';
import { ErrorState } from '../../components/ui/error-state.tsx';
import { Kbd } from '../../components/ui/kbd.tsx';
import { PendingState } from '../../components/ui/pending-state.tsx';
import { designTitle } from '../../features/designs/design-state.tsx';
import { useBlindPoint } from '../../features/interpretation/blind-point-queries.ts';
import { CheckProgress } from '../../features/interpretation/check-progress.tsx';
import { InterpretationKeys } from '../../features/interpretation/interpretation-keys.tsx';
import { formatCount } from '../../lib/format.ts';
import { useKeys } from '../../lib/keys.ts';
import { paths } from '../../lib/paths.ts';
import { useTitle } from '../../lib/use-title.ts';
import { PointCheck } from './point-check.tsx';

export interface CheckDeskProps {
  design: Design;
  scenes: readonly Scene[];
  scheme: readonly LandClass[];
}

/** The bar above, and the point at hand below it. */
export function CheckDesk({ design, scenes, scheme }: CheckDeskProps) {
  const { projectId, id } = design;
  const [number, setNumber] = useState<number | null>(null);
  const [areKeysOpen, setAreKeysOpen] = useState(false);
  const context = useContextViews(projectId, scenes);
  const current = useBlindPoint(id, number);
  const { point, progress } = current.data ?? { point: null, progress: undefined };
  useTitle(['Blind check', designTitle(design)], progress ? progress.answered / Math.max(1, progress.total) : null);
  useKeys({ ...contextKeys(context), '?': () => setAreKeysOpen(true) });
  const classes = design.classes.map((one) => ({
    ...one,
    position: scheme.find(({ id: classId }) => classId === one.id)?.position ?? 0,
  }));
  const goOn = () => {
    setNumber(null);
    if (number === null) void current.refetch();
  };
  return (
    <div className="flex h-dvh flex-col">
      <header className="flex min-h-[52px] shrink-0 flex-wrap items-center gap-x-4 gap-y-2 border-b border-line bg-paper px-[18px] py-2">
        <div className="min-w-0">
          <h1 className="text-lg leading-tight font-semibold tracking-tight whitespace-nowrap">Blind check</h1>
          <p className="max-w-48 truncate text-xs text-ink-soft">{designTitle(design)}</p>
        </div>
        {progress ? <CheckProgress progress={progress} /> : <span className="grow" />}
        <PlaceTools context={context} />
        <Button size="sm" onClick={() => setAreKeysOpen(true)}>
          Keys <Kbd>?</Kbd>
        </Button>
        <Link to={paths.design(projectId, id)} className={buttonClass('secondary', 'sm')}>
          Leave
        </Link>
      </header>
      <p role="status" className="sr-only">
        {point && progress && `Point ${point.number}. ${progress.answered} of ${progress.total} answered.`}
      </p>
      {current.isPending && <PendingState label="Fetching the point" className="p-10" rows={4} />}
      {current.isError && (
        <div className="p-10">
          <ErrorState error={current.error} onRetry={() => void current.refetch()} />
        </div>
      )}
      {!current.isError && point && (
        <PointCheck
          key={point.id}
          design={design}
          point={point}
          classes={classes}
          scenes={scenes}
          context={context}
          isLeaving={current.isFetching}
          onGo={setNumber}
          onNext={goOn}
        />
      )}
      {!current.isError && current.data && !point && (
        <div className="p-10">
          <EmptyState
            title="All your points are answered"
            action={
              <Link to={paths.design(projectId, id)} className={buttonClass('primary')}>
                To the design
              </Link>
            }
          >
            {formatCount(current.data.progress.answered, 'point')} answered. Until the blind check ends you can look at
            them again and change your mind.
            {current.data.progress.total > 0 && (
              <Button kind="ghost" className="mt-2" onClick={() => setNumber(1)}>
                Look at them again
              </Button>
            )}
          </EmptyState>
        </div>
      )}
      {areKeysOpen && <InterpretationKeys of="check" onClose={() => setAreKeysOpen(false)} />}
    </div>
  );
}
