import { Navigate, createBrowserRouter } from 'react-router-dom';
import { NotFoundPage } from '../pages/not-found/not-found-page.tsx';
import { SignInPage } from '../pages/sign-in/sign-in-page.tsx';
import { paths } from '../lib/paths.ts';
import { ProjectFrame } from './project-frame.tsx';
import { ProjectHome } from './project-home.tsx';
import { projectPages } from './project-pages.ts';
import { RouteError } from './route-error.tsx';
import { ShellFrame } from './shell-frame.tsx';
import { SignedInFrame } from './signed-in-frame.tsx';
import { gatePages, sitePages } from './site-pages.ts';

/** Pages are fetched when first opened; see lazyPage. */
export const router = createBrowserRouter([
  {
    errorElement: <RouteError />,
    // Nothing to see while the first page is fetched: it comes from the same machine in a moment.
    hydrateFallbackElement: <span role="status" aria-label="Opening" />,
    children: [
      { path: '/sign-in', element: <SignInPage /> },
      ...gatePages,
      {
        element: <SignedInFrame />,
        children: [
          { index: true, element: <Navigate to={paths.projects()} replace /> },
          {
            element: <ShellFrame />,
            children: [
              { errorElement: <RouteError />, children: [...sitePages, { path: '*', element: <NotFoundPage /> }] },
            ],
          },
          {
            path: '/projects/:projectId',
            element: <ProjectFrame />,
            children: [
              {
                errorElement: <RouteError />,
                children: [
                  { index: true, element: <ProjectHome /> },
                  ...projectPages,
                  { path: '*', element: <NotFoundPage /> },
                ],
              },
            ],
          },
        ],
      },
    ],
  },
]);
