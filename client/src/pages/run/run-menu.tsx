import { ChartNoAxesColumn, MoreHorizontal, RotateCcw, Trash2 } from 'lucide-react';
import { useState } from 'react';
import { useNavigate } from 'react-router-dom';
import type { Run } from '../../../../shared/contracts/run.ts';
import { IconButton } from '../../components/ui/icon-button.tsx';
import { Menu, MenuItem, MenuLine } from '../../components/ui/menu.tsx';
import { DeleteRunDialog } from '../../features/runs/delete-run-dialog.tsx';
import { paths } from '../../lib/paths.ts';
import { useProject } from '../../lib/project/project-context.ts';

/** More to do with a run: use its recipe again, delete it. */
export function RunMenu({ run }: { run: Run }) {
  const { id, abilities } = useProject();
  const navigate = useNavigate();
  const [isDeleting, setIsDeleting] = useState(false);
  if (!abilities.startRuns && !run.abilities.delete) return null;
  return (
    <>
      <Menu trigger={<IconButton label="More about this run" kind="secondary" icon={<MoreHorizontal />} />}>
        {abilities.startRuns && (
          <MenuItem icon={<RotateCcw />} to={paths.newRun(id, run.id)}>
            Use this recipe again
          </MenuItem>
        )}
        {abilities.readAccuracy && run.job.state === 'finished' && (
          <MenuItem icon={<ChartNoAxesColumn />} to={paths.accuracy(id, run.id)}>
            Accuracy
          </MenuItem>
        )}
        {run.abilities.delete && (
          <>
            <MenuLine />
            <MenuItem icon={<Trash2 />} isDanger onSelect={() => setIsDeleting(true)}>
              Delete run…
            </MenuItem>
          </>
        )}
      </Menu>
      <DeleteRunDialog
        run={run}
        isOpen={isDeleting}
        onOpenChange={setIsDeleting}
        onDeleted={() => void navigate(paths.runs(id), { replace: true })}
      />
    </>
  );
}
