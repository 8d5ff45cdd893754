import type { Request } from 'express';
import type { App } from '../../app-context.ts';
import { can } from '../../policies/policy-table.ts';
import { findOpenUser } from '../../services/accounts.ts';
import { findRoles } from '../../services/memberships.ts';

/** Whether a stream that was opened may go on: its session, its account and a role that allows it must still be there. */
export async function mayGoOn(app: App, req: Request, projectId: string, userId: string): Promise<boolean> {
  const hasSession = await new Promise<boolean>((resolve) => {
    req.session.reload((error: unknown) => resolve(!error));
  });
  if (!hasSession || req.session.passport?.user !== userId) return false;
  if (!(await findOpenUser(app, userId))) return false;
  return can('overview.read', await findRoles(app, projectId, userId));
}
