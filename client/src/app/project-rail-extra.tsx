import { UsersRound } from 'lucide-react';
import { NavLink } from 'react-router-dom';
import { classNames } from '../lib/class-names.ts';
import { paths } from '../lib/paths.ts';

/** Below the stages: the project's people, and a word when changes by others do not arrive. */
export function ProjectRailExtra({ projectId, isLive }: { projectId: string; isLive: boolean }) {
  return (
    <>
      <NavLink
        to={paths.members(projectId)}
        title="People and roles"
        className={({ isActive }) =>
          classNames(
            'flex items-center gap-2.5 py-2 pr-3 pl-[19px] text-sm no-underline max-lg:justify-center max-lg:px-0',
            isActive
              ? 'mr-2.5 rounded-r-[10px] bg-card text-ink shadow-[inset_0_0_0_1px_var(--line)] max-lg:mr-1.5'
              : 'text-ink-soft hover:text-ink',
          )
        }
      >
        <UsersRound aria-hidden className="size-4.5 shrink-0" />
        <span className="max-lg:sr-only">People and roles</span>
      </NavLink>
      <p role="status" className={classNames('px-[19px] pt-2 text-xs text-ink-soft', isLive && 'sr-only')}>
        {!isLive && <span className="max-lg:sr-only">Changes by others are not arriving. Connecting again…</span>}
      </p>
    </>
  );
}
