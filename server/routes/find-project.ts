import { z } from 'zod';
import { idSchema } from '../../shared/contracts/common.ts';
import type { App } from '../app-context.ts';
import type { Project } from '../entities/project.ts';
import { findProject } from '../services/projects.ts';

export const projectParams = z.object({ projectId: idSchema });

/** Target of routes below a project: the project itself. */
export async function findProjectTarget(
  app: App,
  params: { projectId: string },
): Promise<{ projectId: string; project: Project } | null> {
  const project = await findProject(app, params.projectId);
  return project ? { projectId: project.id, project } : null;
}
