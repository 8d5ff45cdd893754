import type { App } from '../app-context.ts';
import { Project } from '../entities/project.ts';
import type { Sample } from '../entities/sample.ts';
import { User } from '../entities/user.ts';
import { can } from '../policies/policy-table.ts';
import type { Viewer } from '../policies/viewer.ts';
import { findRoles } from './memberships.ts';

/** Tells each person whose samples were returned, in one letter for the whole act. */
export async function sendReturnLetters(
  app: App,
  projectId: string,
  viewer: Viewer,
  samples: readonly Sample[],
  comment: string,
): Promise<void> {
  if (!app.mail.sends) return;
  const project = await app.db.getRepository(Project).findOneByOrFail({ id: projectId });
  const makerIds = new Set(samples.map(({ createdById }) => createdById));
  for (const makerId of makerIds) {
    if (makerId === null || makerId === viewer.userId) continue;
    const maker = await app.db.getRepository(User).findOneBy({ id: makerId });
    if (!maker || maker.closedAt || !can('sample.draw', await findRoles(app, projectId, makerId))) continue;
    const numbers = samples.filter(({ createdById }) => createdById === makerId).map(({ number }) => number);
    const what = numbers.length === 1 ? `sample ${numbers[0]}` : `${numbers.length} samples`;
    await app.mail.send({
      to: maker.email,
      subject: `${what[0]?.toUpperCase()}${what.slice(1)} returned – ${project.name}`,
      text: `Hello ${maker.name},\n\n${viewer.name} returned ${what} of ${project.name} to you${
        numbers.length > 1 ? ` (${numbers.slice(0, 40).join(', ')}${numbers.length > 40 ? ', …' : ''})` : ''
      }:\n\n${comment}\n\n${app.config.publicUrl}/projects/${projectId}/samples?state=returned\n`,
    });
  }
}
