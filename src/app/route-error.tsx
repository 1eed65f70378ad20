import { useRouteError } from 'react-router-dom';
import { ErrorState } from '#src/ui/states.tsx';

export function RouteError() {
  const error = useRouteError();
  return <ErrorState error={error} retry={() => window.location.reload()} />;
}
