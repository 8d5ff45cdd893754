import { useState } from 'react';
import type { Design, ImportReport } from '../../../../shared/contracts/reference.ts';
import { Button } from '../../components/ui/button.tsx';
import { Dialog } from '../../components/ui/dialog.tsx';
import { ErrorState } from '../../components/ui/error-state.tsx';
import { sayDone } from '../../components/ui/toaster.tsx';
import { formatCount } from '../../lib/format.ts';
import { useImportAnswers } from './import-answers.ts';

export interface ImportDialogProps {
  design: Design;
  isOpen: boolean;
  onOpenChange: (isOpen: boolean) => void;
}

/** Answers from the field: a CSV is read, what would become of each row is shown, then it is taken. */
export function ImportDialog({ design, isOpen, onOpenChange }: ImportDialogProps) {
  const take = useImportAnswers(design.projectId, design.id);
  const [csv, setCsv] = useState<string | null>(null);
  const report = take.data?.dryRun ? take.data : null;
  const nUsable = report ? report.taken + report.replaced : 0;
  const choose = async (file: File | undefined) => {
    if (!file) return;
    const text = await file.text();
    setCsv(text);
    take.mutate({ csv: text, dryRun: true });
  };
  const finish = () => {
    if (csv === null) return;
    take.mutate(
      { csv, dryRun: false },
      {
        onSuccess: ({ taken, replaced }) => {
          sayDone(`${formatCount(taken + replaced, 'answer')} taken`);
          onOpenChange(false);
        },
      },
    );
  };
  return (
    <Dialog
      isOpen={isOpen}
      onOpenChange={onOpenChange}
      title="Answers from the field"
      description="A CSV with a heading: number (or lon and lat), class_code or class; if you like alternate, confidence and note. The answer sheet has the right columns. They count as your own answers."
      footer={
        <>
          <Button onClick={() => onOpenChange(false)}>Take nothing</Button>
          <Button
            kind="primary"
            onClick={finish}
            disabled={nUsable === 0}
            isPending={take.isPending && report === null && csv !== null}
          >
            {nUsable > 0 ? `Take ${formatCount(nUsable, 'answer')}` : 'Take answers'}
          </Button>
        </>
      }
    >
      <input
        type="file"
        accept=".csv,text/csv"
        aria-label="CSV file with answers"
        className="block w-full text-sm"
        onChange={(event) => void choose(event.target.files?.[0])}
      />
      {take.error && <ErrorState error={take.error} isInline className="mt-4" />}
      {report && <Report report={report} />}
    </Dialog>
  );
}

function Report({ report }: { report: ImportReport }) {
  const refused = report.rows.filter(({ outcome }) => outcome === 'refused');
  return (
    <div className="mt-4 text-sm" role="status">
      <p>
        {formatCount(report.taken, 'answer')} new, {report.replaced} in place of answers of yours, {report.refused}{' '}
        refused.
      </p>
      {refused.length > 0 && (
        <ul className="mt-2 max-h-48 list-disc overflow-y-auto pl-5 text-ink-soft">
          {refused.map(({ line, reason }) => (
            <li key={line}>
              Line {line}: {reason}
            </li>
          ))}
        </ul>
      )}
    </div>
  );
}
