import { useState } from 'react';
import { PURPOSIVE_CAUTION } from '../../../../shared/constants/cautions.ts';
import type { Accuracy } from '../../../../shared/contracts/accuracy.ts';
import { ConfusionMatrixTable, type MatrixCell } from '../../components/charts/confusion-matrix-table.tsx';
import { Marked, Statement } from '../../components/layout/reading-page.tsx';
import { Popover } from '../../components/ui/popover.tsx';
import { withPositions } from '../../lib/class-positions.ts';
import { formatCount } from '../../lib/format.ts';
import { BewareFew } from './beware-few.tsx';
import { CellPanel } from './cell-panel.tsx';
import { ClassFiguresTable } from './class-figures-table.tsx';
import { UNIT_NOUN, describeAccuracy } from './describe-accuracy.ts';
import { HowComputed } from './how-computed.tsx';
import { OverallFigures } from './overall-figures.tsx';
import { TargetLine } from './target-line.tsx';

export interface AccuracyReportProps {
  projectId: string;
  accuracy: Accuracy;
  /** The run in a few words, above the sentence: "Run 3 · random forest, 6 bands". */
  runLine: string;
  runNumber: number;
  target: number | null;
  /** The class scheme, for the patterns of the classes. */
  scheme: readonly { id: string; position: number }[];
}

/** What the held-out samples say of a run: one sentence, then the figures it stands on. */
export function AccuracyReport({ projectId, accuracy, runLine, runNumber, target, scheme }: AccuracyReportProps) {
  const [cell, setCell] = useState<MatrixCell | null>(null);
  const statement = describeAccuracy(accuracy);
  const classes = withPositions(accuracy.classes, scheme);
  const { one, many } = UNIT_NOUN[accuracy.unit];
  const basis =
    accuracy.unit === 'pixel'
      ? `${formatCount(accuracy.total, 'held-out pixel')} in ${formatCount(accuracy.polygonCount, 'polygon')}`
      : formatCount(accuracy.total, 'held-out polygon');
  return (
    <>
      <Statement
        above={`${runLine} · ${basis}`}
        below={
          <>
            {PURPOSIVE_CAUTION} 95 % intervals throughout.{' '}
            <Popover
              label="How was this computed?"
              className="w-96"
              trigger={
                <button type="button" className="link" data-print="hide">
                  How was this computed?
                </button>
              }
            >
              <HowComputed accuracy={accuracy} />
            </Popover>
          </>
        }
      >
        {statement.before}
        <Marked>{statement.figure}</Marked>
        {statement.after} {statement.weak}
      </Statement>
      <div className="grid gap-x-11 gap-y-8 min-[84rem]:grid-cols-[minmax(0,1fr)_minmax(0,1.12fr)]">
        <div className="min-w-0 space-y-5">
          <TargetLine overall={accuracy.overall} target={target} />
          <ClassFiguresTable
            accuracy={accuracy}
            positions={classes.map(({ position }) => position)}
            fileName={`class figures of run ${runNumber} by ${accuracy.unit}`}
          />
          <BewareFew accuracy={accuracy} />
        </div>
        <div className="min-w-0 space-y-4">
          <ConfusionMatrixTable
            classes={classes}
            matrix={accuracy.matrix}
            unmapped={accuracy.unmapped}
            unit={`held-out ${many}`}
            selected={cell}
            onCellClick={setCell}
            fileName={`confusion matrix of run ${runNumber} by ${one}`}
          />
          {cell && <CellPanel projectId={projectId} accuracy={accuracy} cell={cell} onClose={() => setCell(null)} />}
          <OverallFigures accuracy={accuracy} />
        </div>
      </div>
      <Cautions cautions={accuracy.cautions.filter((text) => text !== PURPOSIVE_CAUTION)} />
      {/* On paper nothing opens: what the links say is printed. */}
      <p className="hidden pt-4 text-sm print:block">
        {accuracy.overall.method} {accuracy.kappa.caution}
      </p>
    </>
  );
}

function Cautions({ cautions }: { cautions: readonly string[] }) {
  if (cautions.length === 0) return null;
  return (
    <section aria-labelledby="before-relying" className="mt-9 border-t border-line pt-4 text-sm">
      <h2 id="before-relying" className="font-semibold">
        Before anyone relies on the map
      </h2>
      <ul className="mt-1 grid list-disc gap-x-8 gap-y-0.5 pl-5 text-ink-soft lg:grid-cols-2">
        {cautions.map((text) => (
          <li key={text}>{text}</li>
        ))}
      </ul>
    </section>
  );
}
