import type { Overview, Project } from '../../../../shared/contracts/project.ts';
import { ConfirmDialog } from '../../components/ui/confirm-dialog.tsx';
import { sayDone } from '../../components/ui/toaster.tsx';
import { formatCount } from '../../lib/format.ts';
import { asProblem } from '../../lib/problem-error.ts';
import { useDeleteProject } from './delete-project.ts';

interface DeleteProjectDialogProps {
  project: Project;
  figures: Overview['figures'];
  isOpen: boolean;
  onOpenChange: (isOpen: boolean) => void;
  onDeleted: () => void;
}

/** Says what goes with the project, and wants its name typed. */
export function DeleteProjectDialog({ project, figures, isOpen, onOpenChange, onDeleted }: DeleteProjectDialogProps) {
  const remove = useDeleteProject(project.id);
  const runCount = project.stages.find(({ id }) => id === 'runs')?.count ?? 0;
  return (
    <ConfirmDialog
      isOpen={isOpen}
      onOpenChange={(next) => {
        remove.reset();
        onOpenChange(next);
      }}
      title={`Delete ${project.name}?`}
      loses={listLosses(figures, runCount)}
      keeps="People keep their accounts. Nobody can bring the project back."
      confirmLabel="Delete project"
      typeToConfirm={project.name}
      isPending={remove.isPending}
      error={remove.error ? asProblem(remove.error) : null}
      onConfirm={() =>
        remove.mutate(project.name, {
          onSuccess: () => {
            sayDone(`${project.name} was deleted`);
            onDeleted();
          },
        })
      }
    />
  );
}

function listLosses(figures: Overview['figures'], runCount: number): string[] {
  const losses: string[] = [];
  if (figures.sceneCount > 0) losses.push(`${formatCount(figures.sceneCount, 'scene')}, files included`);
  if (figures.samplesPerClass.length > 0) {
    losses.push(
      `${formatCount(figures.samplesPerClass.length, 'class', 'classes')} and ${formatCount(figures.sampleCount, 'sample')}, history included`,
    );
  }
  if (runCount > 0) losses.push(`${formatCount(runCount, 'run')}, class maps and accuracy included`);
  losses.push('The record of who did what, and everyone’s place in it');
  return losses;
}
