import { Navigate, useParams } from 'react-router-dom';
import { paths } from '../app/paths';

/** A proposal opens at its first section. */
export function Component() {
  return <Navigate to={paths.proposalSection.to(useParams()['proposalId'] ?? '', 'targets')} replace />;
}
