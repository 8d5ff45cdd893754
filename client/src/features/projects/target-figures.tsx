import type { ReactNode } from 'react';
import { PURPOSIVE_CAUTION } from '../../../../shared/constants/cautions.ts';
import type { Overview, Project } from '../../../../shared/contracts/project.ts';
import { Figure } from '../../components/ui/figure.tsx';
import { formatNumber, formatPercent } from '../../lib/format.ts';

interface TargetFiguresProps {
  project: Project;
  figures: Overview['figures'];
}

/** What the commission asks for beside what there is. Figures always come with how they were obtained. */
export function TargetFigures({ project, figures }: TargetFiguresProps) {
  const { targetOverallAccuracy, targetSamplesPerClass } = project;
  const { bestRun, samplesPerClass } = figures;
  const reached = samplesPerClass.filter(({ samples }) => samples >= (targetSamplesPerClass ?? 1)).length;
  return (
    <div className="grid grid-cols-2 gap-x-8 gap-y-5">
      <TargetRow
        figure={
          bestRun ? (
            <Figure
              size="lg"
              label={`overall accuracy of run ${bestRun.number}`}
              value={bestRun.overallAccuracy}
              text={formatPercent(bestRun.overallAccuracy, 1)}
              how={
                <>
                  <p>
                    Share of held-out pixels whose mapped class is their reference class, of the finished run with the
                    highest share. 95 % interval: {formatPercent(bestRun.low, 1)} to {formatPercent(bestRun.high, 1)}.
                  </p>
                  <p className="mt-2 text-ink-soft">{PURPOSIVE_CAUTION}</p>
                </>
              }
            />
          ) : (
            <NoFigure
              label={
                project.abilities.readAccuracy
                  ? 'overall accuracy: no finished run'
                  : 'overall accuracy is read by leads, modellers and reviewers'
              }
            />
          )
        }
        target={targetOverallAccuracy === null ? null : formatPercent(targetOverallAccuracy, 1)}
      />
      <TargetRow
        figure={
          samplesPerClass.length === 0 ? (
            <NoFigure label="classes with a sample: no class yet" />
          ) : (
            <Figure
              size="lg"
              label={targetSamplesPerClass === null ? 'classes with a sample' : 'classes with enough samples'}
              value={reached}
              text={`${formatNumber(reached)} of ${formatNumber(samplesPerClass.length)}`}
              how={
                targetSamplesPerClass === null
                  ? 'Classes of the scheme with at least one sample that was not deleted.'
                  : `Classes of the scheme with at least ${formatNumber(targetSamplesPerClass)} samples that were not deleted; polygons are counted, not pixels.`
              }
            />
          )
        }
        target={targetSamplesPerClass === null ? null : `${formatNumber(targetSamplesPerClass)} of each class`}
      />
    </div>
  );
}

function TargetRow({ figure, target }: { figure: ReactNode; target: string | null }) {
  return (
    <div>
      {figure}
      <p className="mt-2 border-t border-line pt-1.5 text-xs">
        <span className="text-ink-soft">Target: </span>
        {target ?? 'none set'}
      </p>
    </div>
  );
}

function NoFigure({ label }: { label: string }) {
  return (
    <div>
      <p className="text-2xl font-medium text-ink-soft">–</p>
      <p className="text-xs text-ink-soft">{label}</p>
    </div>
  );
}
