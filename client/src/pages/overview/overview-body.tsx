import { Link } from 'react-router-dom';
import type { Overview, Project } from '../../../../shared/contracts/project.ts';
import { Marked, Section, Statement } from '../../components/layout/reading-page.tsx';
import { Button } from '../../components/ui/button.tsx';
import { ActivityList } from '../../features/projects/activity-list.tsx';
import { ClassTallies } from '../../features/projects/class-tallies.tsx';
import { describeStanding } from '../../features/projects/standing.ts';
import { TargetFigures } from '../../features/projects/target-figures.tsx';
import { WaitingList } from '../../features/projects/waiting-list.tsx';
import { formatDate } from '../../lib/format-date.ts';
import { formatCount } from '../../lib/format.ts';
import { paths } from '../../lib/paths.ts';

interface OverviewBodyProps {
  project: Project;
  overview: Overview;
  onEditDetails: () => void;
}

/** The sentence the project comes to, what waits, figures against targets, and what happened. */
export function OverviewBody({ project, overview, onEditDetails }: OverviewBodyProps) {
  const { figures, waiting, activity } = overview;
  const runCount = project.stages.find(({ id }) => id === 'runs')?.count ?? 0;
  const standing = describeStanding(figures, project);
  return (
    <>
      <Statement
        above={
          <>
            Begun {formatDate(project.createdAt)} · {formatCount(figures.sceneCount, 'scene')},{' '}
            {formatCount(figures.samplesPerClass.length, 'class', 'classes')},{' '}
            {formatCount(figures.sampleCount, 'sample')}, {formatCount(runCount, 'run')}
          </>
        }
        below={project.description && <p className="whitespace-pre-line">{project.description}</p>}
      >
        {standing.before}
        <Marked>{standing.figure}</Marked>
        {standing.after}
      </Statement>
      <div className="grid gap-x-14 gap-y-9 lg:grid-cols-[minmax(0,7fr)_minmax(0,5fr)]">
        <div className="space-y-9">
          <Section title="What waits for you">
            <WaitingList projectId={project.id} waiting={waiting} />
          </Section>
          <Section
            title="Samples of each class"
            note="Training samples drawn and not deleted. Pixels whose centre lies inside one."
          >
            {figures.samplesPerClass.length > 0 ? (
              <ClassTallies tallies={figures.samplesPerClass} target={project.targetSamplesPerClass} />
            ) : (
              <p className="border-y border-line py-4 text-ink-soft">
                The class scheme is empty.{' '}
                {project.abilities.manageClasses ? (
                  <Link to={paths.classes(project.id)} className="link">
                    Define the first class
                  </Link>
                ) : (
                  'The project lead defines it.'
                )}
              </p>
            )}
          </Section>
        </div>
        <div className="space-y-9">
          <Section
            title="Targets"
            note="What the commission asks for, beside what there is."
            action={
              project.abilities.manageProject &&
              project.targetOverallAccuracy === null &&
              project.targetSamplesPerClass === null && (
                <Button size="sm" onClick={onEditDetails}>
                  Set targets
                </Button>
              )
            }
          >
            <TargetFigures project={project} figures={figures} />
          </Section>
          <Section title="Recent activity">
            <ActivityList projectId={project.id} activity={activity} />
          </Section>
        </div>
      </div>
    </>
  );
}
