import { ErrorState } from '../../components/ui/error-state.tsx';
import { PendingState } from '../../components/ui/pending-state.tsx';
import { useRecipeDiff } from './get-recipe-diff.ts';

interface RecipeDiffProps {
  projectId: string;
  /** `run:<id>` or `recipe:<id>`. */
  left: string;
  right: string;
}

/** What sets two recipes apart, setting by setting, side by side. */
export function RecipeDiff({ projectId, left, right }: RecipeDiffProps) {
  const diff = useRecipeDiff(projectId, left, right);
  if (diff.isPending) return <PendingState label="Comparing the recipes" shape="table" rows={3} />;
  if (diff.isError) return <ErrorState error={diff.error} onRetry={() => void diff.refetch()} />;
  const { differences, notes } = diff.data;
  return (
    <div>
      {differences.length === 0 ? (
        <p>Both recipes have the same settings.</p>
      ) : (
        <div className="overflow-x-auto">
          <table aria-label="Settings that differ" className="w-full border-separate border-spacing-0 text-sm">
            <thead>
              <tr className="text-left text-ink-soft">
                <th scope="col" className="border-b border-edge py-1.5 pr-4 font-medium">
                  Setting
                </th>
                <th scope="col" className="border-b border-edge py-1.5 pr-4 font-medium">
                  {diff.data.left.title}
                </th>
                <th scope="col" className="border-b border-edge py-1.5 font-medium">
                  {diff.data.right.title}
                </th>
              </tr>
            </thead>
            <tbody>
              {differences.map(({ path, label, left: one, right: other }) => (
                <tr key={path} className="align-top">
                  <th scope="row" className="border-b border-line py-1.5 pr-4 text-left font-medium">
                    {label}
                  </th>
                  <td className="border-b border-line py-1.5 pr-4">{one ?? <Absent />}</td>
                  <td className="border-b border-line py-1.5">{other ?? <Absent />}</td>
                </tr>
              ))}
            </tbody>
          </table>
        </div>
      )}
      {notes.map((note) => (
        <p key={note} className="mt-2 text-sm text-ink-soft">
          {note}
        </p>
      ))}
    </div>
  );
}

function Absent() {
  return <span className="text-ink-soft">no such setting</span>;
}
