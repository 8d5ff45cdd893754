import { Crosshair, Download, MoreHorizontal, Plus, Printer, Trash2, Upload } from 'lucide-react';
import { type ReactNode, useState } from 'react';
import { Link, useNavigate, useParams } from 'react-router-dom';
import type { Design } from '../../../../shared/contracts/reference.ts';
import { PageHeader } from '../../components/layout/page-header.tsx';
import { ReadingPage, Section } from '../../components/layout/reading-page.tsx';
import { ForbiddenState, NotFoundState } from '../../components/ui/access-states.tsx';
import { Button, buttonClass } from '../../components/ui/button.tsx';
import { Callout } from '../../components/ui/callout.tsx';
import { ErrorState } from '../../components/ui/error-state.tsx';
import { IconButton } from '../../components/ui/icon-button.tsx';
import { Menu, MenuItem, MenuLine } from '../../components/ui/menu.tsx';
import { PendingState } from '../../components/ui/pending-state.tsx';
import { AgreementPanel } from '../../features/designs/agreement-panel.tsx';
import { AugmentDialog } from '../../features/designs/augment-dialog.tsx';
import {
  CloseDesignDialog,
  DeleteDesignDialog,
  EndInterpretationDialog,
  OpenDesignDialog,
} from '../../features/designs/design-dialogs.tsx';
import { DesignFacts } from '../../features/designs/design-facts.tsx';
import { DesignSteps } from '../../features/designs/design-steps.tsx';
import { describeProgress, designTitle } from '../../features/designs/design-state.tsx';
import { useDesign } from '../../features/designs/get-design.ts';
import { ImportDialog } from '../../features/designs/import-dialog.tsx';
import { StrataTable } from '../../features/designs/strata-table.tsx';
import { apiUrl } from '../../lib/fetch-json.ts';
import { formatCount } from '../../lib/format.ts';
import { paths } from '../../lib/paths.ts';
import { asProblem } from '../../lib/problem-error.ts';
import { useClasses } from '../../lib/project/classes-query.ts';
import { useProject } from '../../lib/project/project-context.ts';

/** One reference design: where it stands, what to do next, how it was drawn. */
export function DesignPage() {
  const { designId = '' } = useParams();
  const { id, abilities } = useProject();
  const design = useDesign(id, designId);
  if (!abilities.readAccuracy) {
    return (
      <Plain>
        <ForbiddenState>Leads, modellers and reviewers see reference points.</ForbiddenState>
      </Plain>
    );
  }
  if (design.data) return <LoadedDesign design={design.data} />;
  return (
    <Plain>
      {design.isPending ? (
        <PendingState label="Loading the design" rows={6} />
      ) : asProblem(design.error)?.status === 404 ? (
        <NotFoundState
          title="No such design"
          action={
            <Link to={paths.accuracy(id)} className={buttonClass('strong')}>
              To the accuracy page
            </Link>
          }
        >
          It was deleted, or the address is of another project.
        </NotFoundState>
      ) : (
        <ErrorState error={design.error} onRetry={() => void design.refetch()} />
      )}
    </Plain>
  );
}

function Plain({ children }: { children: ReactNode }) {
  return <ReadingPage header={<PageHeader title="Reference design" />}>{children}</ReadingPage>;
}

type OpenDialog = 'open' | 'end' | 'close' | 'delete' | 'augment' | 'import' | null;

function LoadedDesign({ design }: { design: Design }) {
  const project = useProject();
  const navigate = useNavigate();
  const [dialog, setDialog] = useState<OpenDialog>(null);
  const classes = useClasses(project.id);
  const positions = new Map(classes.data?.map(({ id, position }) => [id, position]));
  const { abilities } = design;
  const dialogProps = (name: Exclude<OpenDialog, null>) => ({
    design,
    isOpen: dialog === name,
    onOpenChange: (isOpen: boolean) => setDialog(isOpen ? name : null),
  });
  return (
    <ReadingPage
      header={
        <PageHeader
          title={designTitle(design)}
          crumb={`Accuracy · run ${design.runNumber}`}
          action={
            <>
              <DesignMenu design={design} onDialog={setDialog} />
              <NextAct design={design} onDialog={setDialog} />
            </>
          }
        />
      }
    >
      <div className="space-y-9">
        <div>
          <DesignSteps design={design} />
          <p className="mt-5 text-lg">{describeProgress(design)}</p>
          <Advice design={design} />
        </div>
        {(design.state === 'adjudicating' || design.state === 'closed') && (
          <Section title="Do the interpreters agree?">
            <AgreementPanel design={design} positionOf={(classId) => positions.get(classId) ?? 0} />
          </Section>
        )}
        <div className="grid gap-9 xl:grid-cols-[22rem_minmax(0,1fr)]">
          <Section title="How it was drawn">
            <DesignFacts design={design} />
          </Section>
          <Section title="Strata">
            {design.strata ? (
              <StrataTable strata={design.strata} positions={positions} />
            ) : (
              <Callout>
                Withheld from you until the design is closed, since you may interpret its points: how many points a
                class has would tell what the map shows.
              </Callout>
            )}
          </Section>
        </div>
      </div>
      {abilities.open && <OpenDesignDialog {...dialogProps('open')} />}
      {abilities.endInterpretation && <EndInterpretationDialog {...dialogProps('end')} />}
      {abilities.close && <CloseDesignDialog {...dialogProps('close')} />}
      {abilities.interpret && <ImportDialog {...dialogProps('import')} />}
      {abilities.augment && (
        <AugmentDialog
          {...dialogProps('augment')}
          onAugmented={({ id }) => void navigate(paths.design(project.id, id))}
        />
      )}
      {abilities.delete && (
        <DeleteDesignDialog
          {...dialogProps('delete')}
          onDeleted={() => void navigate(paths.accuracy(project.id), { replace: true })}
        />
      )}
    </ReadingPage>
  );
}

interface ActProps {
  design: Design;
  onDialog: (dialog: OpenDialog) => void;
}

/** The one thing to do next, for whoever may. */
function NextAct({ design, onDialog }: ActProps) {
  const { id } = useProject();
  const { abilities, progress, state } = design;
  if (abilities.open) {
    return (
      <Button kind="primary" onClick={() => onDialog('open')}>
        Open the blind check
      </Button>
    );
  }
  if (abilities.interpret && progress.mine.left > 0) {
    return (
      <>
        {abilities.endInterpretation && <Button onClick={() => onDialog('end')}>End the blind check</Button>}
        <Link to={paths.blindCheck(id, design.id)} className={buttonClass('primary')}>
          <Crosshair aria-hidden />
          {progress.mine.answered > 0 ? 'Go on with the blind check' : 'Start the blind check'}
        </Link>
      </>
    );
  }
  if (abilities.endInterpretation) {
    return (
      <Button kind="primary" onClick={() => onDialog('end')}>
        End the blind check
      </Button>
    );
  }
  if (state === 'adjudicating' && abilities.adjudicate) {
    return (
      <>
        {abilities.close && progress.disputed === 0 && (
          <Button kind="primary" onClick={() => onDialog('close')}>
            Close the design
          </Button>
        )}
        <Link
          to={paths.adjudication(id, design.id)}
          className={buttonClass(progress.disputed === 0 && abilities.close ? 'secondary' : 'primary')}
        >
          {progress.disputed === 0 ? 'Look at the decisions' : 'Decide disagreements'}
        </Link>
      </>
    );
  }
  if (abilities.close) {
    return (
      <Button kind="primary" onClick={() => onDialog('close')}>
        Close the design
      </Button>
    );
  }
  if (abilities.readEstimates && state === 'closed') {
    return (
      <Link to={paths.accuracy(id, design.runId)} className={buttonClass('primary')}>
        Read the estimates
      </Link>
    );
  }
  return null;
}

function DesignMenu({ design, onDialog }: ActProps) {
  const { abilities } = design;
  return (
    <Menu trigger={<IconButton label="More about this design" kind="secondary" icon={<MoreHorizontal />} />}>
      {abilities.exportPoints && (
        <MenuItem icon={<Download />} href={apiUrl(`/designs/${design.id}/points.csv`)}>
          {design.state === 'closed' ? 'Points and answers as CSV' : 'Answer sheet as CSV'}
        </MenuItem>
      )}
      {design.state !== 'closed' && (
        <MenuItem icon={<Printer />} to={paths.answerSheet(design.projectId, design.id)}>
          Answer sheet to print
        </MenuItem>
      )}
      {abilities.interpret && (
        <MenuItem icon={<Upload />} onSelect={() => onDialog('import')}>
          Answers from the field…
        </MenuItem>
      )}
      {abilities.augment && (
        <MenuItem icon={<Plus />} onSelect={() => onDialog('augment')}>
          Add points…
        </MenuItem>
      )}
      {abilities.close && design.progress.disputed > 0 && (
        <MenuItem onSelect={() => onDialog('close')}>Close with points left out…</MenuItem>
      )}
      {abilities.delete && (
        <>
          <MenuLine />
          <MenuItem icon={<Trash2 />} isDanger onSelect={() => onDialog('delete')}>
            Delete design…
          </MenuItem>
        </>
      )}
    </Menu>
  );
}

/** What the state means for the person looking. */
function Advice({ design }: { design: Design }) {
  const { state, abilities, progress } = design;
  if (state === 'open' && abilities.interpret) {
    const { left, skipped } = progress.mine;
    return (
      <p className="mt-1 text-ink-soft">
        {left === 0
          ? 'You have answered all that is yours.'
          : `${formatCount(left, 'point')} left for you${skipped > 0 ? `, ${skipped} of them skipped` : ''}. Maps and their figures are kept from you until the design is closed.`}
      </p>
    );
  }
  if (state === 'open')
    return <p className="mt-1 text-ink-soft">Reviewers answer the points without seeing the map.</p>;
  if (state === 'draft') {
    return (
      <p className="mt-1 text-ink-soft">Look at how it was drawn; once the blind check opens nothing can be changed.</p>
    );
  }
  return null;
}
