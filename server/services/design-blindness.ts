import { In } from 'typeorm';
import type { App } from '../app-context.ts';
import { ReferenceDesign } from '../entities/reference-design.ts';
import { NotAllowed } from '../errors.ts';
import { can } from '../policies/policy-table.ts';
import type { Viewer } from '../policies/viewer.ts';

/**
 * Whether class maps, their areas and their accuracy are kept from somebody: while points of the project are interpreted
 * or adjudicated, from everyone who may do so, whatever other role they hold. All runs of the project count, since two maps
 * of one place are much alike.
 */
export async function areMapsWithheld(app: App, projectId: string, viewer: Viewer): Promise<boolean> {
  if (!can('design.interpret', viewer.roles)) return false;
  return app.db.getRepository(ReferenceDesign).existsBy({ projectId, state: In(['open', 'adjudicating']) });
}

/** @throws NotAllowed "withheld-while-interpreting" */
export async function requireMapsShown(app: App, projectId: string, viewer: Viewer): Promise<void> {
  if (!(await areMapsWithheld(app, projectId, viewer))) return;
  throw new NotAllowed(
    'Class maps and what is known of them are withheld while you interpret reference points.',
    {
      found: 'a reference design of this project is open, and you may interpret it',
      advice: 'Close the design, or ask someone who does not interpret.',
    },
    'withheld-while-interpreting',
  );
}
