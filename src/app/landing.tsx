import { useQuery } from '@tanstack/react-query';
import { Navigate } from 'react-router-dom';
import { sessionQuery } from '#src/lib/session.ts';
import { ErrorState, PageSkeleton } from '#src/ui/states.tsx';

/** Sends a visitor where they belong: sign-in, the first household, or making one. */
export function Landing() {
  const session = useQuery(sessionQuery);
  if (session.isPending) return <PageSkeleton />;
  if (session.isError) return <ErrorState error={session.error} retry={() => session.refetch()} />;
  if (session.data === null) return <Navigate to="/sign-in" replace />;
  const first = session.data.households[0];
  return <Navigate to={first ? `/h/${first.id}` : '/start'} replace />;
}
