import { createBrowserRouter } from 'react-router-dom';
import { Loading } from '#src/ui/loading.tsx';
import { RouteProblem } from '#src/screens/route-problem.tsx';
import { Shell } from '#src/screens/shell.tsx';

/** One lazy line per screen; each screen's file exports `Component`. */
export const router = createBrowserRouter([
  {
    path: '/sign-in',
    lazy: () => import('#src/screens/sign-in.tsx'),
    ErrorBoundary: RouteProblem,
    HydrateFallback: Waiting,
  },
  {
    path: '/',
    Component: Shell,
    HydrateFallback: Waiting,
    ErrorBoundary: RouteProblem,
    children: [
      {
        ErrorBoundary: RouteProblem,
        children: [
          { index: true, lazy: () => import('#src/screens/work-list.tsx') },
          { path: 'cases/new', lazy: () => import('#src/screens/new-case.tsx') },
          { path: 'cases/:caseId', lazy: () => import('#src/screens/case.tsx') },
          { path: 'cases/:caseId/edit', lazy: () => import('#src/screens/edit-case.tsx') },
          { path: 'exposures/:exposureId', lazy: () => import('#src/screens/exposure.tsx') },
          { path: 'reviews', lazy: () => import('#src/screens/review-queue.tsx') },
          { path: 'reviews/:matchId', lazy: () => import('#src/screens/review.tsx') },
          { path: 'library', lazy: () => import('#src/screens/library.tsx') },
          { path: 'benches', lazy: () => import('#src/screens/benches.tsx') },
          { path: 'benches/new', lazy: () => import('#src/screens/new-bench.tsx') },
          { path: 'benches/:benchId', lazy: () => import('#src/screens/edit-bench.tsx') },
          { path: 'people', lazy: () => import('#src/screens/people.tsx') },
          { path: 'people/new', lazy: () => import('#src/screens/new-person.tsx') },
          { path: 'people/:personId', lazy: () => import('#src/screens/edit-person.tsx') },
          { path: 'mail', lazy: () => import('#src/screens/mail.tsx') },
          { path: 'audit', lazy: () => import('#src/screens/audit.tsx') },
          { path: 'password', lazy: () => import('#src/screens/password.tsx') },
          { path: '*', lazy: () => import('#src/screens/not-found.tsx') },
        ],
      },
    ],
  },
]);

function Waiting() {
  return (
    <main className="page-margin">
      <Loading what="the page" />
    </main>
  );
}
