import { createBrowserRouter, Outlet, type RouteObject } from 'react-router-dom';
import { Home } from './Home';
import { LabRoute } from './LabRoute';
import { NotFound } from './NotFound';
import { PageFailure } from './PageFailure';
import { RequireSession } from './RequireSession';
import { Shell } from './Shell';
import { ShellSkeleton } from './ShellSkeleton';

/** Every address of the client. Pages are loaded when they are first opened. */
export const routes: RouteObject[] = [
  {
    element: <Outlet />,
    errorElement: <PageFailure />,
    children: [
      {
        hydrateFallbackElement: <></>,
        lazy: async () => ({ Component: (await import('../features/auth/AuthLayout')).AuthLayout }),
        children: [
          {
            path: 'sign-in',
            lazy: async () => ({ Component: (await import('../features/auth/SignInPage')).SignInPage }),
          },
          { path: 'reset', lazy: async () => ({ Component: (await import('../features/auth/ResetPage')).ResetPage }) },
          {
            path: 'reset/:token',
            lazy: async () => ({ Component: (await import('../features/auth/NewPasswordPage')).NewPasswordPage }),
          },
          {
            path: 'invitations/:token',
            lazy: async () => ({ Component: (await import('../features/auth/InvitationPage')).InvitationPage }),
          },
        ],
      },
      {
        element: <RequireSession />,
        hydrateFallbackElement: <ShellSkeleton />,
        children: [
          { index: true, element: <Home /> },
          {
            element: <Shell />,
            children: [
              {
                errorElement: <PageFailure />,
                children: [
                  {
                    path: 'account',
                    lazy: async () => ({ Component: (await import('../features/account/AccountPage')).AccountPage }),
                  },
                  { path: 'labs/:labId', element: <LabRoute />, children: labRoutes() },
                  { path: '*', element: <NotFound /> },
                ],
              },
            ],
          },
        ],
      },
    ],
  },
];

function labRoutes(): RouteObject[] {
  return [
    { index: true, element: <Home /> },
    { path: 'today', lazy: async () => ({ Component: (await import('../features/today/TodayPage')).TodayPage }) },
    {
      path: 'systems',
      lazy: async () => ({ Component: (await import('../features/systems/SystemsPage')).SystemsPage }),
    },
    {
      path: 'systems/new',
      lazy: async () => ({ Component: (await import('../features/editor/SystemPage')).SystemPage }),
    },
    {
      path: 'systems/:systemId',
      lazy: async () => ({ Component: (await import('../features/editor/SystemPage')).SystemPage }),
    },
    { path: 'runs', lazy: async () => ({ Component: (await import('../features/runs/RunsPage')).RunsPage }) },
    { path: 'runs/:runId', lazy: async () => ({ Component: (await import('../features/viewer/RunPage')).RunPage }) },
    {
      path: 'series',
      lazy: async () => ({ Component: (await import('../features/series/SeriesListPage')).SeriesListPage }),
    },
    {
      path: 'series/:seriesId',
      lazy: async () => ({ Component: (await import('../features/series/SeriesPage')).SeriesPage }),
    },
    {
      lazy: async () => ({ Component: (await import('../features/lab/LabLayout')).LabLayout }),
      children: [
        {
          path: 'members',
          lazy: async () => ({ Component: (await import('../features/lab/MembersPage')).MembersPage }),
        },
        {
          path: 'workers',
          lazy: async () => ({ Component: (await import('../features/lab/WorkersPage')).WorkersPage }),
        },
      ],
    },
  ];
}

export const router = createBrowserRouter(routes);
