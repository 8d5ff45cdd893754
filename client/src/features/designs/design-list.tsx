import { Link } from 'react-router-dom';
import type { Design } from '../../../../shared/contracts/reference.ts';
import { formatSince } from '../../lib/format-date.ts';
import { paths } from '../../lib/paths.ts';
import { describeProgress, DesignStateTag, designTitle } from './design-state.tsx';

/** Reference designs, newest first; each leads to its page. */
export function DesignList({ designs }: { designs: readonly Design[] }) {
  return (
    <ul className="divide-y divide-line border-y border-line">
      {designs.map((design) => (
        <li key={design.id} className="flex flex-wrap items-baseline gap-x-4 gap-y-1 py-2.5">
          <Link to={paths.design(design.projectId, design.id)} className="link font-medium">
            {designTitle(design)}
          </Link>
          <DesignStateTag state={design.state} />
          <span className="text-sm">{describeProgress(design)}</span>
          <span className="ml-auto text-sm text-ink-soft">
            run {design.runNumber} · {design.createdBy?.name ?? 'someone no longer here'},{' '}
            {formatSince(design.createdAt)}
          </span>
        </li>
      ))}
    </ul>
  );
}
