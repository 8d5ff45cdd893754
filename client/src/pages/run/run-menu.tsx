import {
  BookmarkPlus,
  ChartNoAxesColumn,
  Columns2,
  ListOrdered,
  MoreHorizontal,
  RotateCcw,
  ScrollText,
  SlidersHorizontal,
  Trash2,
} from 'lucide-react';
import { useState } from 'react';
import { useNavigate } from 'react-router-dom';
import type { Run } from '../../../../shared/contracts/run.ts';
import { IconButton } from '../../components/ui/icon-button.tsx';
import { Menu, MenuItem, MenuLine } from '../../components/ui/menu.tsx';
import { RecipeNameDialog } from '../../features/recipes/recipe-name-dialog.tsx';
import { DeleteRunDialog } from '../../features/runs/delete-run-dialog.tsx';
import { paths } from '../../lib/paths.ts';
import { useProject } from '../../lib/project/project-context.ts';

/** More to do with a run: use or keep its recipe, see how it was made, delete it. */
export function RunMenu({ run }: { run: Run }) {
  const { id, abilities } = useProject();
  const navigate = useNavigate();
  const [isDeleting, setIsDeleting] = useState(false);
  const [isKeeping, setIsKeeping] = useState(false);
  return (
    <>
      <Menu trigger={<IconButton label="More about this run" kind="secondary" icon={<MoreHorizontal />} />}>
        {abilities.startRuns && (
          <MenuItem icon={<RotateCcw />} to={paths.newRun(id, run.id)}>
            Use this recipe again
          </MenuItem>
        )}
        {abilities.startRuns && (
          <MenuItem icon={<BookmarkPlus />} onSelect={() => setIsKeeping(true)}>
            Keep recipe…
          </MenuItem>
        )}
        {abilities.startRuns && (
          <MenuItem icon={<SlidersHorizontal />} to={paths.newTuning(id, { runId: run.id })}>
            Tune its classifier
          </MenuItem>
        )}
        {run.job.state === 'finished' && (
          <MenuItem icon={<ListOrdered />} to={paths.postProcessing(id, run.id)}>
            Post-processing
          </MenuItem>
        )}
        <MenuItem icon={<ScrollText />} to={paths.runRecord(id, run.id)}>
          {run.job.state === 'finished' ? 'Log and reproduction' : 'Log'}
        </MenuItem>
        {abilities.readAccuracy && run.job.state === 'finished' && (
          <MenuItem icon={<ChartNoAxesColumn />} to={paths.accuracy(id, run.id)}>
            Accuracy
          </MenuItem>
        )}
        {abilities.readAccuracy && run.job.state === 'finished' && (
          <MenuItem icon={<Columns2 />} to={paths.compareRuns(id, run.id)}>
            Compare with another run
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
      {isKeeping && (
        <RecipeNameDialog
          projectId={id}
          of={{ recipe: run.recipe, suggestedName: run.name }}
          onClose={() => setIsKeeping(false)}
        />
      )}
      <DeleteRunDialog
        run={run}
        isOpen={isDeleting}
        onOpenChange={setIsDeleting}
        onDeleted={() => void navigate(paths.runs(id), { replace: true })}
      />
    </>
  );
}
