import { useState } from 'react';
import { Link } from 'react-router-dom';
import type { Overview } from '../../../../shared/contracts/project.ts';
import { Button } from '../../components/ui/button.tsx';
import { formatDateTime, formatSince } from '../../lib/format-date.ts';
import { formatNumber } from '../../lib/format.ts';

const FIRST_LINES = 8;

/** Who did what, latest first. */
export function ActivityList({ projectId, activity }: { projectId: string; activity: Overview['activity'] }) {
  const [isWhole, setIsWhole] = useState(false);
  if (activity.length === 0) return <p className="text-sm text-ink-soft">Nothing has happened yet.</p>;
  const shown = isWhole ? activity : activity.slice(0, FIRST_LINES);
  return (
    <>
      <ol className="text-sm">
        {shown.map((line) => (
          <li key={line.id} className="flex gap-4 border-b border-line py-2 first:pt-0 last:border-b-0">
            <span className="min-w-0 grow break-words">
              <span className="font-medium">{line.who ?? 'Groundsel'}</span>{' '}
              {line.path ? (
                <Link
                  to={`/projects/${projectId}/${line.path}`}
                  className="text-ink decoration-line underline-offset-3 hover:underline"
                >
                  {line.text}
                </Link>
              ) : (
                line.text
              )}
            </span>
            <time
              dateTime={line.at}
              title={formatDateTime(line.at)}
              className="shrink-0 text-xs leading-5 whitespace-nowrap text-ink-soft"
            >
              {formatSince(line.at)}
            </time>
          </li>
        ))}
      </ol>
      {activity.length > FIRST_LINES && !isWhole && (
        <Button size="sm" kind="ghost" className="-ml-2.5" onClick={() => setIsWhole(true)}>
          Show {formatNumber(activity.length - FIRST_LINES)} more
        </Button>
      )}
    </>
  );
}
