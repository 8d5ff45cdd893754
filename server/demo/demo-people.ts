import type { ProjectRole } from '../../shared/constants/roles.ts';

/** One password for all demo accounts; said at every start, since the demo holds nothing to protect. */
export const DEMO_PASSWORD = 'vennory-demo';

export interface DemoPerson {
  email: string;
  name: string;
  roles: ProjectRole[];
  siteAdmin?: boolean;
}

export const DEMO_PEOPLE: readonly DemoPerson[] = [
  { email: 'lead@vennory.example', name: 'Lead', roles: ['lead'] },
  { email: 'labeller-a@vennory.example', name: 'Labeller A', roles: ['labeller'] },
  { email: 'labeller-b@vennory.example', name: 'Labeller B', roles: ['labeller'] },
  { email: 'modeller@vennory.example', name: 'Modeller', roles: ['modeller'] },
  { email: 'reviewer@vennory.example', name: 'Reviewer', roles: ['reviewer'] },
  { email: 'reviewer-b@vennory.example', name: 'Reviewer B', roles: ['reviewer'] },
  { email: 'client@vennory.example', name: 'Client', roles: ['client'] },
  { email: 'admin@vennory.example', name: 'Site administrator', roles: [], siteAdmin: true },
];
