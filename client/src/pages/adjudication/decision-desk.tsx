import { useState } from 'react';
import { Link } from 'react-router-dom';
import type { z } from 'zod';
import type { LandClass } from '../../../../shared/contracts/land-class.ts';
import type { Design, disagreementListSchema } from '../../../../shared/contracts/reference.ts';
import type { Scene } from '../../../../shared/contracts/scene.ts';
import { PlaceTools } from '../../components/place/place-tools.tsx';
import { contextKeys, useContextViews } from '../../components/place/use-context-views.ts';
import { Button, buttonClass } from '../../components/ui/button.tsx';
import { Kbd } from '../../components/ui/kbd.tsx';
import { designTitle } from '../../features/designs/design-state.tsx';
import { InterpretationKeys } from '../../features/interpretation/interpretation-keys.tsx';
import { classNames } from '../../lib/class-names.ts';
import { formatCount } from '../../lib/format.ts';
import { useKeys } from '../../lib/keys.ts';
import { paths } from '../../lib/paths.ts';
import { useTitle } from '../../lib/use-title.ts';
import { PointDecision } from './point-decision.tsx';

export interface DecisionDeskProps {
  design: Design;
  list: z.infer<typeof disagreementListSchema>;
  scenes: readonly Scene[];
  scheme: readonly LandClass[];
}

/** The points at issue at the left, the one at hand beside them. */
export function DecisionDesk({ design, list, scenes, scheme }: DecisionDeskProps) {
  const { disagreements, undecided } = list;
  const [pointId, setPointId] = useState(
    () => (disagreements.find(({ decision }) => !decision) ?? disagreements[0])?.point.id ?? null,
  );
  const [areKeysOpen, setAreKeysOpen] = useState(false);
  const context = useContextViews(design.projectId, scenes);
  const place = Math.max(
    0,
    disagreements.findIndex(({ point }) => point.id === pointId),
  );
  const current = disagreements[place];
  const go = (step: number) => {
    const next = disagreements[place + step];
    if (next) setPointId(next.point.id);
  };
  const toNextOpen = () => {
    const later = [...disagreements.slice(place + 1), ...disagreements.slice(0, place)];
    const next = later.find(({ decision }) => !decision);
    if (next) setPointId(next.point.id);
  };
  useTitle(['Decisions', designTitle(design)]);
  useKeys({
    ...contextKeys(context),
    '?': () => setAreKeysOpen(true),
    ArrowUp: () => go(-1),
    ArrowDown: () => go(1),
    ArrowLeft: () => go(-1),
    ArrowRight: () => go(1),
  });
  const classes = design.classes.map((one) => ({
    ...one,
    position: scheme.find(({ id }) => id === one.id)?.position ?? 0,
  }));
  return (
    <div className="flex h-dvh flex-col">
      <header className="flex min-h-[52px] shrink-0 flex-wrap items-center gap-x-4 gap-y-2 border-b border-line bg-paper px-[18px] py-2">
        <div className="min-w-0">
          <h1 className="text-lg leading-tight font-semibold tracking-tight whitespace-nowrap">Decisions</h1>
          <p className="max-w-48 truncate text-xs text-ink-soft">{designTitle(design)}</p>
        </div>
        <p role="status" className="grow text-sm">
          {undecided === 0 ? 'All decided' : `${formatCount(undecided, 'point')} to decide`} of {disagreements.length}
        </p>
        <PlaceTools context={context} />
        <Button size="sm" onClick={() => setAreKeysOpen(true)}>
          Keys <Kbd>?</Kbd>
        </Button>
        <Link
          to={paths.design(design.projectId, design.id)}
          className={buttonClass(undecided === 0 ? 'primary' : 'secondary', 'sm')}
        >
          {undecided === 0 ? 'To the design, to close it' : 'Leave'}
        </Link>
      </header>
      <div className="grid min-h-0 grow grid-cols-[11rem_minmax(0,1fr)] max-md:grid-cols-1">
        <nav
          aria-label="Points at issue"
          className="min-h-0 overflow-y-auto border-r border-line bg-paper py-2 max-md:max-h-32"
        >
          <ol>
            {disagreements.map(({ point, decision, answers }) => (
              <li key={point.id}>
                <button
                  type="button"
                  aria-current={point.id === current?.point.id ? 'true' : undefined}
                  onClick={() => setPointId(point.id)}
                  className={classNames(
                    'focus-inset flex w-full items-baseline gap-2 px-4 py-1.5 text-left text-sm',
                    point.id === current?.point.id ? 'bg-card font-medium' : 'hover:bg-sunken',
                  )}
                >
                  Point {point.number}
                  <span className="ml-auto text-xs text-ink-soft">
                    {decision ? 'decided' : answers.length === 0 ? 'no answer' : 'open'}
                  </span>
                </button>
              </li>
            ))}
          </ol>
        </nav>
        {current && (
          <PointDecision
            key={current.point.id}
            design={design}
            disagreement={current}
            classes={classes}
            scenes={scenes}
            context={context}
            onDecided={toNextOpen}
          />
        )}
      </div>
      {areKeysOpen && <InterpretationKeys of="decisions" onClose={() => setAreKeysOpen(false)} />}
    </div>
  );
}
