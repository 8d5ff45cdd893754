import { createContext, use } from 'react';
import type { Project } from '../../../../shared/contracts/project.ts';

/** The open project; the project's frame provides it to every page inside. */
export const ProjectContext = createContext<Project | null>(null);

/**
 * The open project, with its stages and the viewer's abilities; it follows changes by others.
 *
 * @throws Error outside a project's pages
 */
export function useProject(): Project {
  const project = use(ProjectContext);
  if (!project) throw new Error('useProject is for pages inside a project, found none around this one');
  return project;
}
