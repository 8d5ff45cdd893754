import { classPaletteStep } from '../../shared/constants/class-palette.ts';
import type { App } from '../app-context.ts';
import { Membership } from '../entities/membership.ts';
import type { Project } from '../entities/project.ts';
import { User } from '../entities/user.ts';
import { hashPassword } from '../services/accounts.ts';
import { createLandClass } from '../services/land-classes.ts';
import { createProject, updateProject } from '../services/projects.ts';
import { demoId } from './demo-id.ts';
import { DEMO_CLASSES } from './demo-classes.ts';
import { DEMO_PASSWORD, DEMO_PEOPLE } from './demo-people.ts';

/** Account ids of those who do something in the demo. */
export interface DemoActors {
  lead: string;
  labellerA: string;
  labellerB: string;
  modeller: string;
  reviewer: string;
  reviewerB: string;
}

export async function addDemoPeople(app: App): Promise<DemoActors> {
  const passwordHash = await hashPassword(DEMO_PASSWORD);
  const users = app.db.getRepository(User);
  const ids: string[] = [];
  for (const { email, name, siteAdmin = false } of DEMO_PEOPLE) {
    const user = await users.save(users.create({ email, name, siteAdmin, passwordHash, closedAt: null }));
    ids.push(user.id);
  }
  const [lead = '', labellerA = '', labellerB = '', modeller = '', reviewer = '', reviewerB = ''] = ids;
  return { lead, labellerA, labellerB, modeller, reviewer, reviewerB };
}

export async function createDemoProject(app: App, leadId: string): Promise<Project> {
  const made = await createProject(app, leadId, {
    name: 'Isle of Vennory land cover 2025',
    client: 'Vennory Island Trust',
    description:
      'Ten classes at 30 m for the whole island, from the late-summer scene with the spring scene beside it. The island, its scenes, its people and its samples are invented.',
  });
  const users = await app.db.getRepository(User).find();
  for (const { email, roles } of DEMO_PEOPLE) {
    const user = users.find((row) => row.email === email);
    if (!user || user.id === leadId || roles.length === 0) continue;
    await app.db.getRepository(Membership).insert({ projectId: made.id, userId: user.id, roles });
  }
  const targets = { targetOverallAccuracy: 0.85, targetSamplesPerClass: 25 };
  return updateProject(app, made.id, leadId, made.version, targets, 'set the targets');
}

/** Makes the class scheme; ids in the order of the generator's codes. */
export async function addDemoScheme(app: App, projectId: string, leadId: string): Promise<string[]> {
  const ids: string[] = [];
  for (const [position, { name, definition }] of DEMO_CLASSES.entries()) {
    const { colour } = classPaletteStep(position);
    const { landClass } = await createLandClass(app, projectId, leadId, {
      id: demoId('class', position + 1),
      code: position + 1,
      name,
      definition,
      colour,
    });
    ids.push(landClass.id);
  }
  return ids;
}
