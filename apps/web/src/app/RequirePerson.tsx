import type { Me } from '@faintward/contracts/accounts';
import { useQuery } from '@tanstack/react-query';
import { Navigate, Outlet, useLocation } from 'react-router-dom';
import { sessionQueries } from '../lib/queries/session';
import { NothingHere, SkeletonBlock } from '../ui/PageStates';
import { PageFrame } from '../ui/PageFrame';
import { ProblemDisplay } from '../ui/ProblemDisplay';
import { paths } from './paths';

/** Pages for signed-in people; others are sent to sign in and come back. The server decides again on every request. */
export function RequirePerson({ may = () => true }: { may?: (me: Me) => boolean }) {
  const query = useQuery(sessionQueries.me());
  const location = useLocation();
  if (query.data === undefined) {
    return (
      <PageFrame title="One moment">
        {query.error ? (
          <ProblemDisplay
            error={query.error}
            what="Your session could not be read"
            onRetry={() => void query.refetch()}
          />
        ) : (
          <SkeletonBlock label="Loading" />
        )}
      </PageFrame>
    );
  }
  if (query.data === null) return <Navigate to={paths.signIn.to(location.pathname + location.search)} replace />;
  if (!may(query.data)) {
    return (
      <PageFrame title="Not found" width="reading">
        <NothingHere />
      </PageFrame>
    );
  }
  return <Outlet />;
}
