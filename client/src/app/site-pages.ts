import type { RouteObject } from 'react-router-dom';
import { lazyPage } from './lazy-page.ts';

/** Pages for signed-in people that belong to no project. */
export const sitePages: RouteObject[] = [
  {
    path: '/projects',
    lazy: lazyPage(() => import('../pages/projects/projects-page.tsx'), 'ProjectsPage'),
  },
  {
    path: '/account',
    lazy: lazyPage(() => import('../pages/account/account-page.tsx'), 'AccountPage'),
  },
  {
    path: '/site/accounts',
    lazy: lazyPage(() => import('../pages/site-accounts/site-accounts-page.tsx'), 'SiteAccountsPage'),
  },
  {
    path: '/site/queue',
    lazy: lazyPage(() => import('../pages/site-queue/site-queue-page.tsx'), 'SiteQueuePage'),
  },
];

/** Pages for people who are not signed in, besides the sign-in page. */
export const gatePages: RouteObject[] = [
  {
    path: '/welcome/:token',
    lazy: lazyPage(() => import('../pages/welcome/welcome-page.tsx'), 'WelcomePage'),
  },
  {
    path: '/forgot-password',
    lazy: lazyPage(() => import('../pages/forgotten/forgotten-page.tsx'), 'ForgottenPage'),
  },
];
