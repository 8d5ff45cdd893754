import { In } from 'typeorm';
import type { Overview } from '../../shared/contracts/project.ts';
import type { App } from '../app-context.ts';
import { ReferenceDesign } from '../entities/reference-design.ts';
import { can } from '../policies/policy-table.ts';
import type { Viewer } from '../policies/viewer.ts';
import { measureDesignProgress } from './design-progress.ts';

const countPoints = (n: number) => `${n} ${n === 1 ? 'point' : 'points'}`;

/** Reference points that wait for the viewer to interpret or decide them. */
export async function listWaitingDesigns(app: App, projectId: string, viewer: Viewer): Promise<Overview['waiting']> {
  if (!can('design.interpret', viewer.roles)) return [];
  const designs = await app.db
    .getRepository(ReferenceDesign)
    .find({ where: { projectId, state: In(['open', 'adjudicating']) }, order: { number: 'ASC' } });
  const waiting: Overview['waiting'] = [];
  for (const design of designs) {
    const { points, settled, mine } = await measureDesignProgress(app, design, viewer.userId);
    const name = `reference design ${design.number}`;
    const page = `accuracy/designs/${design.id}`;
    if (mine.left > 0) waiting.push({ text: `Interpret ${countPoints(mine.left)} of ${name}`, path: `${page}/check` });
    const undecided = design.state === 'adjudicating' ? points - settled : 0;
    if (undecided > 0) waiting.push({ text: `Decide ${countPoints(undecided)} of ${name}`, path: `${page}/decide` });
  }
  return waiting;
}
