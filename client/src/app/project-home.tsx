import { Navigate } from 'react-router-dom';
import { useProject } from '../lib/project/project-context.ts';
import { paths } from '../lib/paths.ts';

/** Where a project opens: the overview for the team, what was handed over for a client. */
export function ProjectHome() {
  const { id, abilities } = useProject();
  return <Navigate to={abilities.readScenes ? paths.overview(id) : paths.handover(id)} replace />;
}
