import type { App } from '../app-context.ts';
import type { Run } from '../entities/run.ts';
import { can } from '../policies/policy-table.ts';
import { findRoles } from './memberships.ts';

/** Tells whoever started a run that it ended, if they still work in the project, want such letters, and mail is set up. */
export async function sendRunLetter(app: App, run: Run, ending: { failure: string | null }): Promise<void> {
  const { startedBy, project, result } = run;
  if (!app.mail.sends || !startedBy || startedBy.closedAt || !startedBy.mailsRunEnd) return;
  const roles = await findRoles(app, run.projectId, startedBy.id);
  if (!can('run.read', roles)) return;
  const title = run.name ? `Run ${run.number} (${run.name})` : `Run ${run.number}`;
  const link = `${app.config.publicUrl}/projects/${run.projectId}/runs/${run.id}`;
  const lines: string[] = [];
  if (ending.failure !== null) {
    lines.push(`${title} of ${project.name} failed:`, ending.failure);
  } else {
    lines.push(`${title} of ${project.name} is finished.`);
    if (result && can('accuracy.read', roles)) lines.push(describeAccuracy(result));
  }
  await app.mail.send({
    to: startedBy.email,
    subject: `${title} ${ending.failure === null ? 'is finished' : 'failed'} – ${project.name}`,
    text: `Hello ${startedBy.name},\n\n${lines.join('\n')}\n\n${link}\n`,
  });
}

function describeAccuracy(result: NonNullable<Run['result']>): string {
  const { overallAccuracy, overallLow, overallHigh, heldOutPolygons } = result;
  if (overallAccuracy === null) return 'Its overall accuracy cannot be worked out: no held-out pixel is mapped.';
  const percent = (share: number) => `${(share * 100).toFixed(1)} %`;
  const interval =
    overallLow !== null && overallHigh !== null
      ? ` (95 % interval ${percent(overallLow)} to ${percent(overallHigh)})`
      : ' (too few polygons for an interval)';
  return `Overall accuracy by pixel in ${heldOutPolygons} held-out polygons: ${percent(overallAccuracy)}${interval}.`;
}
