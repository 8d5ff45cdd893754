import type { ProjectRole } from '../../shared/constants/roles.ts';

/** Who asks: the account, and the roles it holds in the project at hand (none outside a project). */
export interface Viewer {
  userId: string;
  name: string;
  email: string;
  siteAdmin: boolean;
  roles: readonly ProjectRole[];
}
