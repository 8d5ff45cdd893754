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
  const [file, setFile] = useState<File | null>(null);
  const report = take.data?.dryRun ? take.data : null;
  const nUsable = report ? report.taken + report.replaced : 0;
  const choose = (chosen: File | undefined) => {
    if (!chosen) return;
    setFile(chosen);
    take.mutate({ file: chosen, dryRun: true });
  };
  const finish = () => {
    if (file === null) return;
    take.mutate(
      { file, dryRun: false },
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
      description="A CSV with a heading: number (or lon and lat), class_code or class; if you like alternate, confidence and note. Or points with these fields in a GeoPackage, GeoJSON, KML or zipped Shapefile. They count as your own answers."
      footer={
        <>
          <Button onClick={() => onOpenChange(false)}>Take nothing</Button>
          <Button
            kind="primary"
            onClick={finish}
            disabled={nUsable === 0}
            isPending={take.isPending && report === null && file !== null}
          >
            {nUsable > 0 ? `Take ${formatCount(nUsable, 'answer')}` : 'Take answers'}
          </Button>
        </>
      }
    >
      <input
        type="file"
        accept=".csv,.txt,.tsv,.gpkg,.geojson,.json,.kml,.zip"
        aria-label="File with answers"
        className="block w-full text-sm"
        onChange={(event) => choose(event.target.files?.[0])}
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
              Row {line}: {reason}
            </li>
          ))}
        </ul>
      )}
    </div>
  );
}
