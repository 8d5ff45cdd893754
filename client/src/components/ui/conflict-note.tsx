import { type ReactNode, useId } from 'react';
import { Button } from './button.tsx';

export interface ConflictRow {
  label: string;
  theirs: ReactNode;
  mine: ReactNode;
}

export interface ConflictNoteProps {
  /** What two people changed: "this class". */
  what: string;
  /** The fields that differ. */
  rows: readonly ConflictRow[];
  onTakeTheirs: () => void;
  onKeepMine: () => void;
  isPending?: boolean;
}

/** Someone else saved first: both versions side by side, and the choice. */
export function ConflictNote({ what, rows, onTakeTheirs, onKeepMine, isPending = false }: ConflictNoteProps) {
  const id = useId();
  return (
    <div role="alert" aria-labelledby={id} className="rounded-lg border border-edge bg-groundsel-wash p-4 text-sm">
      <p id={id} className="font-semibold">
        Someone else changed {what} while you had it open. Nothing of yours is saved yet.
      </p>
      <table className="mt-3 w-full table-fixed">
        <thead>
          <tr className="text-left text-xs text-ink-soft">
            <th scope="col" className="w-28 pb-1 font-medium">
              <span className="sr-only">Field</span>
            </th>
            <th scope="col" className="pb-1 font-medium">
              As it stands
            </th>
            <th scope="col" className="pb-1 font-medium">
              Yours
            </th>
          </tr>
        </thead>
        <tbody className="align-top">
          {rows.map((row) => (
            <tr key={row.label}>
              <th scope="row" className="py-1 pr-3 text-left font-normal text-ink-soft">
                {row.label}
              </th>
              <td className="py-1 pr-4 break-words">{row.theirs}</td>
              <td className="py-1 font-medium break-words">{row.mine}</td>
            </tr>
          ))}
        </tbody>
      </table>
      {rows.length === 0 && <p className="mt-1">Both say the same now.</p>}
      <div className="mt-3 flex flex-wrap gap-2">
        <Button size="sm" onClick={onTakeTheirs}>
          Take theirs
        </Button>
        <Button size="sm" kind="strong" isPending={isPending} pendingLabel="Saving…" onClick={onKeepMine}>
          Save mine over it
        </Button>
      </div>
    </div>
  );
}
