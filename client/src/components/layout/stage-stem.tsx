import { useEffect, useRef } from 'react';
import { NavLink, useLocation } from 'react-router-dom';
import type { Stage } from '../../../../shared/contracts/project.ts';
import { classNames } from '../../lib/class-names.ts';
import { formatNumber } from '../../lib/format.ts';
import { paths } from '../../lib/paths.ts';
import { Bud } from './bud.tsx';
import { STAGE_NAMES, STATE_TEXT } from './stage.ts';

interface StageStemProps {
  projectId: string;
  /** The stages this viewer may open; others are left out. */
  stages: readonly Stage[];
}

/** The project's stages as a stem with buds: down the rail, or along the top bar on narrow screens. */
export function StageStem({ projectId, stages }: StageStemProps) {
  const shown = STAGE_NAMES.flatMap(({ id, name }) => {
    const stage = stages.find((candidate) => candidate.id === id);
    return stage ? [{ ...stage, name }] : [];
  });
  const navRef = useRef<HTMLElement>(null);
  const { pathname } = useLocation();
  // Along the top bar the open stage may lie out of sight.
  useEffect(() => {
    const nav = navRef.current;
    const current = nav?.querySelector<HTMLElement>('[aria-current]');
    if (nav && current) nav.scrollLeft = current.offsetLeft - (nav.clientWidth - current.offsetWidth) / 2;
  }, [pathname]);
  return (
    <nav ref={navRef} aria-label="Stages of the project" className="max-sm:relative max-sm:overflow-x-auto">
      <ol className="flex flex-col max-sm:flex-row max-sm:px-2">
        {shown.map((stage, index) => (
          <li key={stage.id} className="relative max-sm:static">
            {index > 0 && <StemPiece isGrown={stage.state !== 'empty'} />}
            <NavLink
              to={paths[stage.id](projectId)}
              title={stage.name}
              className={({ isActive }) =>
                classNames(
                  'relative flex items-center gap-2.5 max-sm:static py-2 pr-3 pl-[17px] font-medium text-ink no-underline',
                  'max-lg:justify-center max-lg:px-0 max-sm:gap-1.5 max-sm:px-2.5',
                  isActive
                    ? 'mr-2.5 rounded-r-[10px] bg-card shadow-[inset_0_0_0_1px_var(--line)] max-lg:mr-1.5 max-lg:pl-1.5 max-sm:mr-0 max-sm:rounded-md max-sm:pl-2.5'
                    : 'hover:text-spruce',
                )
              }
            >
              <Bud state={stage.state} className="size-[22px] shrink-0" />
              <span className="max-lg:sr-only max-sm:not-sr-only max-sm:whitespace-nowrap">{stage.name}</span>
              <span className="sr-only">, {STATE_TEXT[stage.state]}</span>
              {stage.count !== null && stage.count > 0 && (
                <span className="ml-auto text-xs text-ink-soft max-lg:sr-only">
                  {formatNumber(stage.count)}
                  <span className="sr-only"> in all</span>
                </span>
              )}
            </NavLink>
          </li>
        ))}
      </ol>
    </nav>
  );
}

/** The length of stem above a bud: green as far as the work has grown. */
function StemPiece({ isGrown }: { isGrown: boolean }) {
  return (
    <span
      aria-hidden
      className={classNames(
        'absolute -top-2.5 left-[27px] h-5 w-0.5 max-lg:left-1/2 max-lg:-ml-px max-sm:hidden',
        isGrown ? 'bg-spruce' : 'bg-line',
      )}
    />
  );
}
