import { createBrowserRouter, type RouteObject } from 'react-router-dom';
import { PageSkeleton } from '#src/ui/states.tsx';
import { HouseholdShell } from './household-shell.tsx';
import { Landing } from './landing.tsx';
import { RouteError } from './route-error.tsx';

// Function-form lazy routes: each screen is its own chunk and brings its own queries.
const householdRoutes: RouteObject[] = [
  {
    index: true,
    lazy: async () => ({ Component: (await import('#src/features/position/position-page.tsx')).PositionPage }),
  },
  { path: 'log', lazy: async () => ({ Component: (await import('#src/features/log/log-page.tsx')).LogPage }) },
  {
    path: 'cycles',
    lazy: async () => ({ Component: (await import('#src/features/cycles/cycles-page.tsx')).CyclesPage }),
  },
  {
    path: 'cycles/:to',
    lazy: async () => ({ Component: (await import('#src/features/cycles/cycle-page.tsx')).CyclePage }),
  },
  {
    path: 'money/loan',
    lazy: async () => ({ Component: (await import('#src/features/money/loan-page.tsx')).LoanPage }),
  },
  { path: 'money', lazy: async () => ({ Component: (await import('#src/features/money/money-page.tsx')).MoneyPage }) },
  { path: 'try', lazy: async () => ({ Component: (await import('#src/features/try/try-page.tsx')).TryPage }) },
  {
    path: 'credit',
    lazy: async () => ({ Component: (await import('#src/features/credit/credit-page.tsx')).CreditPage }),
  },
  { path: 'plan', lazy: async () => ({ Component: (await import('#src/features/plan/plan-page.tsx')).PlanPage }) },
  { path: 'setup', lazy: async () => ({ Component: (await import('#src/features/setup/setup-page.tsx')).SetupPage }) },
  {
    path: 'setup/:step',
    lazy: async () => ({ Component: (await import('#src/features/setup/setup-step-page.tsx')).SetupStepPage }),
  },
  {
    path: 'people',
    lazy: async () => ({ Component: (await import('#src/features/people/people-page.tsx')).PeoplePage }),
  },
  {
    path: 'account',
    lazy: async () => ({ Component: (await import('#src/features/account/account-page.tsx')).AccountPage }),
  },
];

export const router = createBrowserRouter([
  {
    HydrateFallback: PageSkeleton,
    ErrorBoundary: RouteError,
    children: [
      { path: '/', Component: Landing },
      {
        path: '/sign-in',
        lazy: async () => ({ Component: (await import('#src/features/session/sign-in-page.tsx')).SignInPage }),
      },
      {
        path: '/sign-up',
        lazy: async () => ({ Component: (await import('#src/features/session/sign-up-page.tsx')).SignUpPage }),
      },
      {
        path: '/start',
        lazy: async () => ({ Component: (await import('#src/features/setup/start-page.tsx')).StartPage }),
      },
      {
        path: '/h/:householdId',
        Component: HouseholdShell,
        children: [{ ErrorBoundary: RouteError, children: [...householdRoutes, { path: '*', Component: NotFound }] }],
      },
      { path: '*', Component: NotFound },
    ],
  },
]);

function NotFound() {
  return (
    <div className="page page-narrow">
      <h1>There is no page here.</h1>
      <p className="lede">
        Go to <a href="/">your position</a>.
      </p>
    </div>
  );
}
