import { Plus } from 'lucide-react';
import { useState } from 'react';
import type { LandClass } from '../../../../shared/contracts/land-class.ts';
import { PageHeader } from '../../components/layout/page-header.tsx';
import { ReadingPage } from '../../components/layout/reading-page.tsx';
import { ForbiddenState } from '../../components/ui/access-states.tsx';
import { Button } from '../../components/ui/button.tsx';
import { ErrorState } from '../../components/ui/error-state.tsx';
import { PendingState } from '../../components/ui/pending-state.tsx';
import { sayProblem } from '../../components/ui/toaster.tsx';
import { ClassDialog } from '../../features/classes/class-dialog.tsx';
import { DeleteClassDialog } from '../../features/classes/delete-class-dialog.tsx';
import { FirstClass } from '../../features/classes/first-class.tsx';
import { useOrderClasses } from '../../features/classes/order-classes.ts';
import { SchemeTable } from '../../features/classes/scheme-table.tsx';
import { formatCount } from '../../lib/format.ts';
import { useClasses } from '../../lib/project/classes-query.ts';
import { useProject } from '../../lib/project/project-context.ts';

/** The class scheme. */
export function ClassesPage() {
  const { abilities } = useProject();
  if (!abilities.readClasses) {
    return (
      <ReadingPage header={<PageHeader title="Classes" />}>
        <ForbiddenState />
      </ReadingPage>
    );
  }
  return <Scheme />;
}

function Scheme() {
  const project = useProject();
  const classes = useClasses(project.id);
  const { mutate: order } = useOrderClasses(project.id);
  const [isAdding, setIsAdding] = useState(false);
  const [editing, setEditing] = useState<LandClass | null>(null);
  const [deleting, setDeleting] = useState<LandClass | null>(null);
  const canManage = project.abilities.manageClasses;
  const list = classes.data ?? [];
  const addButton = (label: string) => (
    <Button kind="primary" icon={<Plus />} onClick={() => setIsAdding(true)}>
      {label}
    </Button>
  );
  return (
    <ReadingPage
      header={
        <PageHeader
          title="Classes"
          crumb={list.length > 0 ? formatCount(list.length, 'class', 'classes') : undefined}
          action={canManage && list.length > 0 && addButton('Add class')}
        />
      }
    >
      {classes.isPending && <PendingState label="Loading the class scheme" shape="table" rows={8} />}
      {classes.isError && !classes.data && <ErrorState error={classes.error} onRetry={() => void classes.refetch()} />}
      {classes.data && list.length === 0 && <FirstClass action={canManage && addButton('Add the first class')} />}
      {list.length > 0 && (
        <>
          <p className="mb-4 max-w-3xl text-sm text-ink-soft">
            The order here is the order everywhere. On the sampling desk the keys 1–9 and 0 choose the first ten
            classes; the pattern in a swatch tells classes apart without colour.
          </p>
          <SchemeTable
            classes={list}
            target={project.targetSamplesPerClass}
            canManage={canManage}
            onEdit={setEditing}
            onDelete={setDeleting}
            onOrder={(ids) => order(ids, { onError: sayProblem })}
          />
          {list.length === 1 && (
            <p className="mt-4 text-sm">A run tells classes apart, so it needs at least one more.</p>
          )}
        </>
      )}
      {isAdding && (
        <ClassDialog projectId={project.id} classes={list} landClass={null} onClose={() => setIsAdding(false)} />
      )}
      {editing && (
        <ClassDialog projectId={project.id} classes={list} landClass={editing} onClose={() => setEditing(null)} />
      )}
      {deleting && (
        <DeleteClassDialog
          projectId={project.id}
          classes={list}
          landClass={deleting}
          onClose={() => setDeleting(null)}
        />
      )}
    </ReadingPage>
  );
}
