import { Link } from 'react-router-dom';
import type { Project } from '../../../../shared/contracts/project.ts';
import type { Scene } from '../../../../shared/contracts/scene.ts';
import { buttonClass } from '../../components/ui/button.tsx';
import { formatHectares } from '../../lib/format.ts';
import { groundAreaHa } from '../../lib/ground-area.ts';
import { paths } from '../../lib/paths.ts';

interface StudyAreaCardProps {
  project: Project;
  /** A ready scene to show or draw the area on. */
  scene: Scene;
}

/** What limits drawing, mapping and areas, and where it is set. */
export function StudyAreaCard({ project, scene }: StudyAreaCardProps) {
  const { studyArea, abilities } = project;
  return (
    <section
      aria-label="Study area"
      className="mb-5 flex flex-wrap items-center gap-x-5 gap-y-2 border-b border-line pb-4"
    >
      <p className="min-w-0 flex-1 text-sm">
        <span className="font-semibold">Study area </span>
        {studyArea ? (
          <>
            {formatHectares(groundAreaHa(studyArea))}
            <span className="text-ink-soft">. Samples are drawn, classes mapped and areas counted inside it.</span>
          </>
        ) : (
          <span className="text-ink-soft">not set: everything a scene shows is mapped.</span>
        )}
      </p>
      {(studyArea || abilities.manageProject) && (
        <Link to={`${paths.scene(project.id, scene.id)}?study-area`} className={buttonClass('secondary', 'sm')}>
          {abilities.manageProject ? (studyArea ? 'Change on the map' : 'Set on the map') : 'Show on the map'}
        </Link>
      )}
    </section>
  );
}
