import type { App } from '../../server/app-context.ts';
import { Membership } from '../../server/entities/membership.ts';
import { Project } from '../../server/entities/project.ts';
import type { User } from '../../server/entities/user.ts';
import type { ProjectRole } from '../../shared/constants/roles.ts';
import { makeUser } from './make-user.ts';

let made = 0;

export async function makeProject(app: App, overrides: Partial<Project> = {}): Promise<Project> {
  made++;
  const projects = app.db.getRepository(Project);
  const { id } = await projects.save(
    projects.create({
      name: `Project ${made}`,
      client: 'Vennory Island Trust',
      description: '',
      studyArea: null,
      targetOverallAccuracy: null,
      targetSamplesPerClass: null,
      ...overrides,
    }),
  );
  return projects.findOneByOrFail({ id });
}

export async function makeMembership(app: App, project: Project, user: User, ...roles: ProjectRole[]): Promise<void> {
  await app.db.getRepository(Membership).insert({ projectId: project.id, userId: user.id, roles });
}

export interface Team {
  project: Project;
  lead: User;
  labeller: User;
  otherLabeller: User;
  modeller: User;
  reviewer: User;
  client: User;
  /** Has an account and no part in the project. */
  outsider: User;
}

/** A project with a person for each role. */
export async function makeTeam(app: App, overrides: Partial<Project> = {}): Promise<Team> {
  const project = await makeProject(app, overrides);
  const join = async (role: ProjectRole): Promise<User> => {
    const user = await makeUser(app);
    await makeMembership(app, project, user, role);
    return user;
  };
  return {
    project,
    lead: await join('lead'),
    labeller: await join('labeller'),
    otherLabeller: await join('labeller'),
    modeller: await join('modeller'),
    reviewer: await join('reviewer'),
    client: await join('client'),
    outsider: await makeUser(app),
  };
}
