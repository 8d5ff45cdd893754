import { type Project } from '../../../../shared/contracts/project.ts';
import { Button } from '../../components/ui/button.tsx';
import { Dialog } from '../../components/ui/dialog.tsx';
import { ProjectDetailsForm } from './project-details-form.tsx';
import { useUpdateProject } from './update-project.ts';

interface ProjectDetailsDialogProps {
  project: Project;
  isOpen: boolean;
  onOpenChange: (isOpen: boolean) => void;
}

const FORM_ID = 'project-details';

/** Name, client, purpose and targets of a project. */
export function ProjectDetailsDialog({ project, isOpen, onOpenChange }: ProjectDetailsDialogProps) {
  const update = useUpdateProject(project.id);
  const close = (next: boolean) => {
    if (!next) update.reset();
    onOpenChange(next);
  };
  return (
    <Dialog
      isOpen={isOpen}
      onOpenChange={close}
      title="Project details"
      footer={
        <>
          <Button onClick={() => close(false)}>Cancel</Button>
          <Button kind="strong" type="submit" form={FORM_ID} isPending={update.isPending} pendingLabel="Saving…">
            Save details
          </Button>
        </>
      }
    >
      <ProjectDetailsForm formId={FORM_ID} project={project} update={update} onDone={() => close(false)} />
    </Dialog>
  );
}
